import { existsSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  gpsMinusUtcSeconds,
  gpsToUtcMs,
  gpsWeekToUtcMs,
  LEAP_SECONDS,
  LEAP_SECONDS_KNOWN_UNTIL,
} from '../../src/time/index.js';

const utc = (text: string) => Date.parse(`${text}Z`);
const instant = (text: string) => ({ kind: 'instant', utcMs: utc(text) });
const DAY_MS = 86_400_000;

interface ListedStep {
  readonly utcMs: number;
  readonly taiMinusUtcSeconds: number;
}

const fromGpsStart = (steps: readonly ListedStep[]) =>
  steps.filter(({ utcMs }) => utcMs >= utc('1980-01-01T00:00:00'));
const known = (steps: readonly ListedStep[], untilMs: number) => steps.filter(({ utcMs }) => utcMs < untilMs);
const ownSteps: readonly ListedStep[] = LEAP_SECONDS.map(({ utcMs, taiMinusUtcSeconds }) => ({
  utcMs,
  taiMinusUtcSeconds,
}));
const knownUntilMs = utc(`${LEAP_SECONDS_KNOWN_UNTIL}T00:00:00`);

describe('LEAP_SECONDS', () => {
  it('steps by one second at the beginning of January or July', () => {
    for (const [i, { from, utcMs, taiMinusUtcSeconds }] of LEAP_SECONDS.entries()) {
      expect(from).toMatch(/^\d{4}-0[17]-01$/);
      expect(utcMs).toBe(utc(`${from}T00:00:00`));
      expect(taiMinusUtcSeconds).toBe(19 + i);
    }
  });

  const list = '/usr/share/zoneinfo/leap-seconds.list';
  if (existsSync(list))
    it(`is the list of this system, ${list}`, () => {
      // seconds since 1900 and TAI − UTC in a row; the line that begins #@ holds the expiry
      const ntpMs = (seconds: string) => (Number(seconds) - 2_208_988_800) * 1000;
      const text = readFileSync(list, 'utf8');
      const steps = [...text.matchAll(/^(\d+)\s+(\d+)/gm)].map((row) => ({
        utcMs: ntpMs(row[1]!),
        taiMinusUtcSeconds: Number(row[2]),
      }));
      const untilMs = Math.min(knownUntilMs, ntpMs(/^#@\s*(\d+)/m.exec(text)![1]!));
      expect(steps.length).toBeGreaterThan(20);
      expect(known(fromGpsStart(steps), untilMs)).toEqual(known(ownSteps, untilMs));
    });
  else
    it(`could not be compared with a list: this system has no ${list}`, () => {
      expect(existsSync(list)).toBe(false);
    });

  const right = '/usr/share/zoneinfo/right/UTC';
  if (existsSync(right))
    it(`is what this system's clock tables hold, ${right}`, () => {
      // RFC 9636: a first block in 32-bit times, then one in 64-bit times with the leap seconds after its zone types
      const bytes = readFileSync(right);
      const counts = (at: number) =>
        [20, 24, 28, 32, 36, 40].map((offset) => bytes.readUInt32BE(at + offset));
      const [ut, standard, leaps, times, types, letters] = counts(0) as [
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const second = 44 + times * 5 + types * 6 + letters + leaps * 8 + standard + ut;
      const block = counts(second) as [number, number, number, number, number, number];
      const start = second + 44 + block[3] * 9 + block[4] * 6 + block[5];
      const steps = Array.from({ length: block[2] }, (_, i) => {
        const count = bytes.readInt32BE(start + i * 12 + 8);
        // the times count the leap seconds before them; TAI − UTC was 10 s before the first
        const seconds = Number(bytes.readBigInt64BE(start + i * 12)) - (count - 1);
        return { utcMs: seconds * 1000, taiMinusUtcSeconds: 10 + count };
      });
      expect(steps.length).toBeGreaterThan(20);
      const lastMs = steps.at(-1)!.utcMs + 1;
      // GPS time began between the steps of 1980-01-01 and 1981-07-01
      expect(fromGpsStart(steps)).toEqual(known(ownSteps, lastMs));
    });
  else
    it(`could not be compared with clock tables: this system has no ${right}`, () => {
      expect(existsSync(right)).toBe(false);
    });
});

describe('gpsMinusUtcSeconds', () => {
  // IERS Bulletin C: TAI − UTC at these dates less 19 s
  it.each([
    ['1980-01-06T00:00:00', 0],
    ['1981-06-30T23:59:59.999', 0],
    ['1981-07-01T00:00:00', 1],
    ['1988-01-01T00:00:00', 5],
    ['1999-01-01T00:00:00', 13],
    ['2005-12-31T23:59:59', 13],
    ['2006-01-01T00:00:00', 14],
    ['2015-07-01T00:00:00', 17],
    ['2016-12-31T23:59:59.999', 17],
    ['2017-01-01T00:00:00', 18],
    ['2026-06-27T00:00:00', 18],
    // an assumption, see LEAP_SECONDS_KNOWN_UNTIL
    ['2050-01-01T00:00:00', 18],
  ])('at %s it is %i s', (time, seconds) => {
    expect(gpsMinusUtcSeconds(utc(time))).toBe(seconds);
  });
  it('times before the scale are refused', () => {
    expect(() => gpsMinusUtcSeconds(-1)).toThrow(
      new RangeError('utcMs: expected a time from 1980-01-01 on, received -1'),
    );
    expect(() => gpsToUtcMs(Number.NaN)).toThrow(
      new RangeError('gpsWallMs: expected a time from 1980-01-01 on, received NaN'),
    );
  });
});

describe('gpsToUtcMs', () => {
  it('takes the leap seconds off', () => {
    expect(gpsToUtcMs(utc('2025-03-01T10:15:18'))).toBe(utc('2025-03-01T10:15:00'));
    expect(gpsToUtcMs(utc('2017-01-01T00:00:16.5'))).toBe(utc('2016-12-31T23:59:59.5'));
    expect(gpsToUtcMs(utc('2017-01-01T00:00:18'))).toBe(utc('2017-01-01T00:00:00'));
    expect(gpsToUtcMs(utc('1980-01-06T00:00:00'))).toBe(utc('1980-01-06T00:00:00'));
  });
  it('gives the inserted second the milliseconds of the next, as POSIX time does', () => {
    expect(gpsToUtcMs(utc('2017-01-01T00:00:17.25'))).toBe(utc('2017-01-01T00:00:00.25'));
  });
  it('undoes gpsMinusUtcSeconds', () => {
    const time = fc.integer({ min: utc('1980-01-06T00:00:00'), max: utc('2099-12-31T00:00:00') });
    const nearStep = fc
      .tuple(fc.constantFrom(...LEAP_SECONDS.slice(1)), fc.integer({ min: -3000, max: 3000 }))
      .map(([{ utcMs }, ms]) => utcMs + ms);
    fc.assert(
      fc.property(fc.oneof(time, nearStep), (utcMs) => {
        expect(gpsToUtcMs(utcMs + gpsMinusUtcSeconds(utcMs) * 1000)).toBe(utcMs);
      }),
      { seed: 31, numRuns: 2000 },
    );
  });
});

describe('gpsWeekToUtcMs', () => {
  // week rollovers: IS-GPS-200 counts weeks from 1980-01-06 modulo 1024; the others by hand from 604800 s a week and the
  // leap seconds of IERS Bulletin C
  it.each([
    [1024, 0, '1999-08-21T23:59:47'],
    [2048, 0, '2019-04-06T23:59:42'],
    [3072, 0, '2038-11-20T23:59:42'],
    [1042, 518_413, '2000-01-01T00:00:00'],
    [1930, 16, '2016-12-31T23:59:59'],
    [1930, 18, '2017-01-01T00:00:00'],
    [2111, 345_618, '2020-06-25T00:00:00'],
    [2313, 475_218, '2024-05-10T12:00:00'],
    [2313, 475_218.25, '2024-05-10T12:00:00.250'],
  ])('week %i second %d is %s', (week, seconds, time) => {
    expect(gpsWeekToUtcMs(week, seconds)).toEqual(instant(time));
  });
  it('a week below 1024 needs a reference time, and goes to the nearest era', () => {
    // 2313 − 2 · 1024 = 265
    expect(gpsWeekToUtcMs(265, 475_218)).toEqual({ kind: 'ambiguous' });
    expect(gpsWeekToUtcMs(1023, 0)).toEqual({ kind: 'ambiguous' });
    expect(gpsWeekToUtcMs(265, 475_218, utc('2025-01-01T00:00:00'))).toEqual(instant('2024-05-10T12:00:00'));
    expect(gpsWeekToUtcMs(265, 475_218, utc('2015-01-01T00:00:00'))).toEqual(instant('2024-05-10T12:00:00'));
    // one era earlier: 1024 weeks before in GPS time, when GPS − UTC was 13 s
    expect(gpsWeekToUtcMs(265, 475_218, utc('2014-01-01T00:00:00'))).toEqual(instant('2004-09-24T12:00:05'));
    // a full week of the first era
    expect(gpsWeekToUtcMs(0, 0, utc('1980-02-01T00:00:00'))).toEqual(instant('1980-01-06T00:00:00'));
    expect(gpsWeekToUtcMs(0, 0, utc('1970-01-01T00:00:00'))).toEqual(instant('1980-01-06T00:00:00'));
  });
  it('a full week stays whatever the reference', () => {
    expect(gpsWeekToUtcMs(1024, 0, utc('2025-01-01T00:00:00'))).toEqual(instant('1999-08-21T23:59:47'));
  });
  it('what is no week or no second of one is invalid', () => {
    const week = (came: number) => ({
      kind: 'invalid',
      detail: `expected a GPS week, a whole number from 0 on, came ${came}`,
    });
    const seconds = (came: number) => ({
      kind: 'invalid',
      detail: `expected seconds of the GPS week from 0 to below 604800, came ${came}`,
    });
    for (const came of [-1, 2313.5, Number.NaN]) expect(gpsWeekToUtcMs(came, 0)).toEqual(week(came));
    for (const came of [-0.001, 604_800, 604_801, Number.NaN])
      expect(gpsWeekToUtcMs(2313, came)).toEqual(seconds(came));
    expect(gpsWeekToUtcMs(2313, 604_799.999).kind).toBe('instant');
    expect(gpsWeekToUtcMs(475_218, 2313)).toEqual({
      kind: 'invalid',
      detail: 'expected a GPS week up to the year 2099, came 475218',
    });
    expect(() => gpsWeekToUtcMs(265, 0, Number.NaN)).toThrow(
      new RangeError('referenceMs: expected UTC milliseconds, received NaN'),
    );
  });
  it('finds a rolled-over week of any time from a reference within 9 years', () => {
    const day = fc.integer({
      min: utc('1999-08-23T00:00:00') / DAY_MS,
      max: utc('2089-01-01T00:00:00') / DAY_MS,
    });
    const away = fc.integer({ min: -9 * 365, max: 9 * 365 });
    fc.assert(
      fc.property(day, away, (days, daysAway) => {
        const utcMs = days * DAY_MS;
        const gpsSeconds = (utcMs - utc('1980-01-06T00:00:00')) / 1000 + gpsMinusUtcSeconds(utcMs);
        const week = Math.floor(gpsSeconds / 604_800);
        expect(gpsWeekToUtcMs(week % 1024, gpsSeconds % 604_800, utcMs + daysAway * DAY_MS)).toEqual({
          kind: 'instant',
          utcMs,
        });
      }),
      { seed: 32, numRuns: 1000 },
    );
  });
});
