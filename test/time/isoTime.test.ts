import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { daysFromDate, isoDate } from '../../src/time/calendarDates.js';
import { parseIsoTime } from '../../src/time/isoTime.js';

describe('parseIsoTime', () => {
  it.each([
    ['2025-03-01T10:11:12Z', Date.UTC(2025, 2, 1, 10, 11, 12)],
    ['2025-03-01t10:11:12z', Date.UTC(2025, 2, 1, 10, 11, 12)],
    ['2025-03-01 10:11:12.3Z', Date.UTC(2025, 2, 1, 10, 11, 12, 300)],
    ['2025-03-01T10:11:12,25Z', Date.UTC(2025, 2, 1, 10, 11, 12, 250)],
    ['2025-03-01T10:11Z', Date.UTC(2025, 2, 1, 10, 11)],
    ['2025-03-01T00:30:00+01:00', Date.UTC(2025, 1, 28, 23, 30)],
    ['2025-03-01T00:30:00.000-03:30', Date.UTC(2025, 2, 1, 4, 0)],
    ['2025-03-01 00:30+01', Date.UTC(2025, 1, 28, 23, 30)],
    ['2024-02-29T23:59:59.999Z', Date.UTC(2024, 1, 29, 23, 59, 59, 999)],
    ['2000-02-29T00:00:00Z', Date.UTC(2000, 1, 29)],
    ['1969-12-31T23:59:59Z', -1000],
  ])('%s is an instant', (text, utcMs) => {
    expect(parseIsoTime(text)).toEqual({ kind: 'instant', utcMs });
  });
  it('keeps parts of a millisecond, whatever the length', () => {
    const at = (text: string) => {
      const time = parseIsoTime(text);
      return time.kind === 'instant' ? time.utcMs - Date.UTC(2025, 2, 1) : undefined;
    };
    // doubles of this size step by 2^-12 ms
    expect(at('2025-03-01T00:00:00.0005Z')).toBeCloseTo(0.5, 3);
    expect(at('2025-03-01T00:00:00.123456789012345678901234567890Z')).toBeCloseTo(123.4568, 3);
    expect(at('2025-03-01T00:00:00.1000000000000000000000Z')).toBe(100);
    expect(at('2025-03-01T00:00:00.123Z')).toBe(123);
  });
  it('tells a clock time without offset and a date alone', () => {
    expect(parseIsoTime('2025-03-01T10:11:12')).toEqual({
      kind: 'local',
      wallMs: Date.UTC(2025, 2, 1, 10, 11, 12),
    });
    expect(parseIsoTime('2025-03-01 10:11')).toEqual({ kind: 'local', wallMs: Date.UTC(2025, 2, 1, 10, 11) });
    expect(parseIsoTime('2025-03-01')).toEqual({ kind: 'date', wallMs: Date.UTC(2025, 2, 1) });
    expect(parseIsoTime('0099-03-01')).toEqual({ kind: 'date', wallMs: Date.parse('0099-03-01T00:00:00Z') });
  });
  it.each([
    '',
    '2025',
    '2025-03',
    '2025-3-1',
    '2025-02-29',
    '1900-02-29',
    '2025-04-31',
    '2025-00-10',
    '2025-13-10',
    '2025-01-00',
    '2025-01-32',
    '2025/03/01',
    '01-03-2025',
    '20250301T101112Z',
    '2025-03-01T',
    '2025-03-01T10',
    '2025-03-01T10:1',
    '2025-03-01T10:11:',
    '2025-03-01T10:11:1',
    '2025-03-01T10:11:12.',
    '2025-03-01T10:11:12.Z',
    '2025-03-01T10:11.5Z',
    '2025-03-01T24:00:00Z',
    '2025-03-01T23:60:00Z',
    '2025-03-01T23:59:60Z',
    '2025-03-01T10:11:12ZZ',
    '2025-03-01T10:11:12Z ',
    ' 2025-03-01T10:11:12Z',
    '2025-03-01_10:11:12Z',
    '2025-03-01T10:11:12+',
    '2025-03-01T10:11:12+1',
    '2025-03-01T10:11:12+0100',
    '2025-03-01T10:11:12+01:0',
    '2025-03-01T10:11:12+01:60',
    '2025-03-01T10:11:12+24:00',
    '2025-03-01T10:11:12+01:00:00',
    '2025-03-01T10:11:12 +01:00',
    '2025-03-01T1O:11:12Z',
    'x025-03-01',
  ])('refuses "%s"', (text) => {
    expect(parseIsoTime(text)).toEqual({ kind: 'invalid' });
  });
  it('reads what the run-time prints', () => {
    const date = fc.date({
      min: new Date('0000-01-01T00:00:00Z'),
      max: new Date('9999-12-31T23:59:59Z'),
      noInvalidDate: true,
    });
    fc.assert(
      fc.property(date, (value) => {
        expect(parseIsoTime(value.toISOString())).toEqual({ kind: 'instant', utcMs: value.getTime() });
        expect(isoDate(Math.floor(value.getTime() / 86_400_000))).toBe(value.toISOString().slice(0, 10));
      }),
      { seed: 21, numRuns: 2000 },
    );
  });
  it('agrees with the run-time on which dates exist', () => {
    for (const year of [1900, 2000, 2023, 2024])
      for (let month = 0; month <= 13; month += 1)
        for (let day = 0; day <= 32; day += 1) {
          const text = `${year}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
          const date = new Date(Date.UTC(year, month - 1, day));
          const exists = date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
          expect(parseIsoTime(text).kind, text).toBe(exists ? 'date' : 'invalid');
        }
  });
});

describe('calendar dates', () => {
  it('counts days from 1970', () => {
    expect(daysFromDate(1970, 1, 1)).toBe(0);
    // Julian date 2448908.5 is 1992-10-13 0h; 1970-01-01 is 2440587.5
    expect(daysFromDate(1992, 10, 13)).toBe(2448908.5 - 2440587.5);
    expect(isoDate(0)).toBe('1970-01-01');
    expect(isoDate(-1)).toBe('1969-12-31');
  });
  it('refuses days without a four-figure year', () => {
    for (const days of [Number.NaN, 0.5, 3e6, -1e6, 1e12, Number.POSITIVE_INFINITY])
      expect(() => isoDate(days)).toThrow(
        new RangeError(
          `days: expected a whole number of days within the years 0000 to 9999, received ${days}`,
        ),
      );
  });
});
