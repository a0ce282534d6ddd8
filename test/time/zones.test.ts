import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { solarDay, solarHour } from '../../src/time/solarTime.js';
import { calendarDay, isTimeZone, localToUtc, zoneOffsetMs } from '../../src/time/zones.js';

const HOUR = 3_600_000;
const utc = (text: string) => Date.parse(`${text}Z`);

describe('isTimeZone', () => {
  it('knows IANA names', () => {
    for (const name of ['Europe/Oslo', 'America/New_York', 'Etc/GMT+1', 'UTC'])
      expect(isTimeZone(name), name).toBe(true);
    for (const name of ['', 'Europe/Atlantis', 'GMT+1 ', 'local', 'Mars'])
      expect(isTimeZone(name), name).toBe(false);
  });
  it('knows offsets, on every run-time the same', () => {
    for (const name of ['+02:00', '-0330', '-3', '+14', '\u221203:00', '+00:00'])
      expect(isTimeZone(name), name).toBe(true);
    for (const name of ['+17', '+02:60', '+', '+2h', 'UTC+2', 'GMT-3'])
      expect(isTimeZone(name), name).toBe(false);
  });
  it.each([
    ['UTC+2', '+02:00'],
    ['GMT -3:30', '-03:30'],
    ['utc+0545', '+05:45'],
  ])('%s is refused with the offset that was meant', (came, meant) => {
    expect(() => zoneOffsetMs(came, 0)).toThrow(`which for ${came} is written "${meant}", came "${came}"`);
  });
  it('an unknown zone is refused by name', () => {
    expect(() => zoneOffsetMs('Europe/Atlantis', 0)).toThrow(
      new RangeError(
        'timeZone: expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came "Europe/Atlantis"',
      ),
    );
  });
  it('times beyond the tables are refused', () => {
    for (const time of [
      Number.NaN,
      Number.POSITIVE_INFINITY,
      utc('1899-12-31T23:59:59'),
      utc('2200-01-01T00:00:00'),
    ])
      expect(() => zoneOffsetMs('Europe/Oslo', time)).toThrow(
        new RangeError(`utcMs: expected a time in the years 1900 to 2199, received ${time}`),
      );
  });
});

describe('zoneOffsetMs', () => {
  // Dates of change: IANA time zone database (from memory); European clocks change at 01:00 UTC (directive 2000/84/EC)
  it.each([
    ['Europe/Oslo', '2025-03-30T00:59:59.999', 1],
    ['Europe/Oslo', '2025-03-30T01:00:00', 2],
    ['Europe/Oslo', '2025-10-26T00:59:59.999', 2],
    ['Europe/Oslo', '2025-10-26T01:00:00', 1],
    ['America/New_York', '2025-03-09T06:59:59.999', -5],
    ['America/New_York', '2025-03-09T07:00:00', -4],
    ['America/New_York', '2025-11-02T06:00:00', -5],
    ['Asia/Kolkata', '2025-06-01T00:00:00', 5.5],
    ['Asia/Kathmandu', '2025-06-01T00:00:00', 5.75],
    ['Australia/Lord_Howe', '2025-01-01T00:00:00', 11],
    ['Australia/Lord_Howe', '2025-07-01T00:00:00', 10.5],
    ['Pacific/Apia', '2011-12-30T09:59:59.999', -10],
    ['Pacific/Apia', '2011-12-30T10:00:00', 14],
    // POSIX signs: Etc/GMT+1 is one hour behind Greenwich
    ['Etc/GMT+1', '2025-06-01T00:00:00', -1],
    // offsets as ISO 8601 signs them: ahead of UTC is plus
    ['+02:00', '2025-06-01T00:00:00', 2],
    ['-0330', '1900-01-01T00:00:00', -3.5],
    ['UTC', '2025-06-01T00:00:00', 0],
  ])('%s at %s', (zone, time, hours) => {
    expect(zoneOffsetMs(zone, utc(time))).toBe(hours * HOUR);
  });
  it('answers alike whatever was asked before', () => {
    const times = [
      '2025-03-30T00:59:59',
      '2025-12-31T23:59:59',
      '2025-03-30T01:00:00',
      '2026-01-01T00:00:00',
    ].map(utc);
    const zones = ['Europe/Oslo', 'America/New_York'];
    const ask = (order: readonly number[]) =>
      order.map((i) => [i, zoneOffsetMs(zones[i % 2]!, times[i >> 1]!)]).sort((a, b) => a[0]! - b[0]!);
    expect(ask([7, 2, 5, 0, 3, 6, 1, 4])).toEqual(ask([0, 1, 2, 3, 4, 5, 6, 7]));
  });
  it('is what the run-time prints, in zones with odd rules', () => {
    const zones = [
      'Europe/Oslo',
      'America/St_Johns',
      'Australia/Lord_Howe',
      'Pacific/Apia',
      'Africa/Casablanca',
      'America/Caracas',
      'Asia/Pyongyang',
    ];
    const formats = new Map(
      zones.map((timeZone) => [
        timeZone,
        new Intl.DateTimeFormat('sv-SE', { timeZone, dateStyle: 'short', timeStyle: 'medium' }),
      ]),
    );
    fc.assert(
      fc.property(
        fc.constantFrom(...zones),
        fc.integer({ min: utc('1990-01-01T00:00:00') / 1000, max: utc('2030-12-31T00:00:00') / 1000 }),
        (zone, second) => {
          // Swedish style prints "2025-03-30 01:00:00"
          const printed = Date.parse(
            `${formats
              .get(zone)!
              .format(second * 1000)
              .replace(' ', 'T')}Z`,
          );
          expect(zoneOffsetMs(zone, second * 1000)).toBe(printed - second * 1000);
        },
      ),
      { seed: 22, numRuns: 3000 },
    );
  });
});

describe('localToUtc', () => {
  it.each([
    ['Europe/Oslo', '2025-03-30T01:59:59', '2025-03-30T00:59:59'],
    ['Europe/Oslo', '2025-03-30T03:00:00', '2025-03-30T01:00:00'],
    ['Europe/Oslo', '2025-10-26T03:00:00', '2025-10-26T02:00:00'],
    ['America/New_York', '2025-07-01T12:00:00', '2025-07-01T16:00:00'],
    ['Pacific/Apia', '2011-12-29T23:59:59', '2011-12-30T09:59:59'],
    ['Pacific/Apia', '2011-12-31T00:00:00', '2011-12-30T10:00:00'],
    ['Etc/GMT+1', '2025-01-01T00:00:00', '2025-01-01T01:00:00'],
  ])('%s: %s is %s UTC', (zone, wall, expected) => {
    expect(localToUtc(zone, utc(wall))).toEqual({ kind: 'one', utcMs: utc(expected) });
  });
  it.each([
    ['Europe/Oslo', '2025-03-30T02:00:00'],
    ['Europe/Oslo', '2025-03-30T02:59:59.999'],
    ['Australia/Lord_Howe', '2025-10-05T02:15:00'],
    ['Pacific/Apia', '2011-12-30T00:00:00'],
    ['Pacific/Apia', '2011-12-30T23:59:59'],
  ])('%s: %s was skipped', (zone, wall) => {
    expect(localToUtc(zone, utc(wall))).toEqual({ kind: 'gap' });
  });
  it.each([
    ['Europe/Oslo', '2025-10-26T02:00:00', '2025-10-26T00:00:00', '2025-10-26T01:00:00'],
    ['Europe/Oslo', '2025-10-26T02:59:59', '2025-10-26T00:59:59', '2025-10-26T01:59:59'],
    ['America/New_York', '2025-11-02T01:30:00', '2025-11-02T05:30:00', '2025-11-02T06:30:00'],
    ['Australia/Lord_Howe', '2025-04-06T01:45:00', '2025-04-05T14:45:00', '2025-04-05T15:15:00'],
  ])('%s: %s happened twice', (zone, wall, earlier, later) => {
    expect(localToUtc(zone, utc(wall))).toEqual({
      kind: 'overlap',
      earlierUtcMs: utc(earlier),
      laterUtcMs: utc(later),
    });
  });
  it('undoes the clock', () => {
    const zone = fc.constantFrom(
      'Europe/Oslo',
      'Pacific/Apia',
      'Australia/Lord_Howe',
      'Africa/Casablanca',
      'America/St_Johns',
    );
    const time = fc.integer({ min: utc('2005-01-01T00:00:00'), max: utc('2027-12-31T00:00:00') });
    fc.assert(
      fc.property(zone, time, (name, utcMs) => {
        const found = localToUtc(name, utcMs + zoneOffsetMs(name, utcMs));
        const instants =
          found.kind === 'one'
            ? [found.utcMs]
            : found.kind === 'overlap'
              ? [found.earlierUtcMs, found.laterUtcMs]
              : [];
        expect(instants).toContain(utcMs);
        if (found.kind === 'overlap') expect(found.earlierUtcMs).toBeLessThan(found.laterUtcMs);
      }),
      { seed: 23, numRuns: 3000 },
    );
  });
});

describe('days', () => {
  it('calendarDay follows the clock', () => {
    const time = utc('2025-03-01T23:30:00');
    expect(calendarDay(time, 0)).toBe('2025-03-01');
    expect(calendarDay(time, HOUR)).toBe('2025-03-02');
    expect(calendarDay(utc('2024-02-29T00:30:00'), -HOUR)).toBe('2024-02-28');
    expect(calendarDay(utc('2025-01-01T00:00:00') - 0.25, 0)).toBe('2024-12-31');
    expect(() => calendarDay(Number.NaN, 0)).toThrow(RangeError);
  });
});

describe('solar time', () => {
  it('is UTC and four minutes a degree', () => {
    // 18:00 UTC at 105.1° W: 18 − 105.1/15 = 10.993333 h
    expect(solarHour(utc('2025-06-01T18:00:00'), -105.1)).toBeCloseTo(10.993333, 6);
    expect(solarHour(utc('2025-06-01T00:00:00'), 0)).toBe(0);
    expect(solarHour(utc('2025-06-01T20:00:00'), 90)).toBe(2);
    expect(solarHour(utc('1969-12-31T23:00:00'), 0)).toBe(23);
  });
  it('has its own midnight', () => {
    expect(solarDay(utc('2025-06-01T20:00:00'), 90)).toBe('2025-06-02');
    expect(solarDay(utc('2025-06-01T05:59:59'), -90)).toBe('2025-05-31');
    expect(solarDay(utc('2025-06-01T06:00:00'), -90)).toBe('2025-06-01');
  });
  it('stays within the day, and goes with the day', () => {
    const time = fc.double({ min: -1e12, max: 4e12, noNaN: true });
    const longitude = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(time, longitude, (utcMs, longitudeDeg) => {
        const hour = solarHour(utcMs, longitudeDeg);
        expect(hour >= 0 && hour < 24).toBe(true);
        // day and hour together give the time back (to a rounding of the day's length)
        const back = Date.parse(`${solarDay(utcMs, longitudeDeg)}T00:00:00Z`) + hour * HOUR;
        const error = Math.abs(back - (utcMs + longitudeDeg * 240_000));
        expect(Math.min(error, Math.abs(error - 24 * HOUR))).toBeLessThan(0.01);
      }),
      { seed: 24, numRuns: 1000 },
    );
  });
});
