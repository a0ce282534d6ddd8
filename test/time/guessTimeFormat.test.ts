import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileTimeFormat, guessTimeFormats, timeReader } from '../../src/time/index.js';

const NO_ZONE = 'no zone: it must be named';
const HALF_DAY = 'no hour is 0 or past 12 and none has AM or PM: the 24-hour clock is a guess';
const ORDER = 'the samples do not decide the order of day, month and year: also read by';
const SERIALS_1904 = 'serial numbers that count from 1904 look the same and would be read four years early';
const CENTURY_20 = 'the year has two digits: century 20 is a guess';

describe('guessTimeFormats', () => {
  it.each([
    [['2025-03-01T10:15:00Z', '2025-03-01 10:15:01.5+01:00'], 'iso', []],
    [['2025-03-01T10:15:00', ''], 'iso', [NO_ZONE]],
    [['2025-03-01T10:15:00', '2025-03-01T10:15:00Z'], 'iso', ['some samples have no zone: it must be named']],
    [['13.03.2025 14:15:00'], 'dd.MM.yyyy HH:mm:ss', [NO_ZONE]],
    [['13.03.2025 14:15:00.5', '14.03.2025 9:15:01'], 'dd.MM.yyyy HH:mm:ss.SSS', [NO_ZONE]],
    [['3/13/2025 10:15'], 'MM/dd/yyyy HH:mm', [HALF_DAY, NO_ZONE]],
    [['3/13/2025 10:15:00 a.m.', '3/14/2025 1:05:00 PM'], 'MM/dd/yyyy hh:mm:ss a', [NO_ZONE]],
    [['2025/03/13,14:15:00,250'], 'yyyy/MM/dd,HH:mm:ss,SSS', [NO_ZONE]],
    [['14:15:00 13/03/2025'], 'HH:mm:ss dd/MM/yyyy', [NO_ZONE]],
    [['20250313141500'], 'yyyyMMddHHmmss', [NO_ZONE]],
    [['20250313 141500.25'], 'yyyyMMdd HHmmss.SSS', [NO_ZONE]],
    [['13-MAR-2025 14:15', '2-Apr-2025 09:00'], 'dd-MMM-yyyy HH:mm', [NO_ZONE]],
    [['March 13, 2025 2:15:00 PM'], 'MMM dd, yyyy hh:mm:ss a', [NO_ZONE]],
    [['2025-061 14:15:00'], 'day-of-year', [NO_ZONE]],
    [['2025 061 14 15 00'], 'day-of-year', [NO_ZONE]],
    [['2025 03 13 14 15 00'], 'yyyy MM dd HH mm ss', [NO_ZONE]],
    [['2025-61 14:15:00'], 'yyyy-DDD HH:mm:ss', [NO_ZONE]],
    [['45658.42708333', '45678.5'], 'excel', [NO_ZONE, SERIALS_1904]],
    [['31.12.45 14:15'], "dd.MM.'20'yy HH:mm", [CENTURY_20, NO_ZONE]],
  ])('%j: %s alone', (samples, format, ambiguous) => {
    expect(guessTimeFormats(samples)).toEqual([{ format, kind: 'date-time', ambiguous }]);
  });
  it('takes a scale that the samples name', () => {
    expect(guessTimeFormats(['20250313T101500Z'])).toEqual([
      { format: "yyyyMMdd'T'HHmmss'Z'", kind: 'date-time', zone: 'UTC', ambiguous: [] },
    ]);
    expect(guessTimeFormats(['2025/03/13 14:15:00 UTC'])).toEqual([
      { format: "yyyy/MM/dd HH:mm:ss 'UTC'", kind: 'date-time', zone: 'UTC', ambiguous: [] },
    ]);
    expect(guessTimeFormats(['2025/03/13 14:15:00 GPS'])).toEqual([
      { format: "yyyy/MM/dd HH:mm:ss 'GPS'", kind: 'date-time', scale: 'gps', ambiguous: [] },
    ]);
  });
  it('tells dates and times of day alone', () => {
    expect(guessTimeFormats(['2025-03-01'])).toEqual([{ format: 'iso', kind: 'date', ambiguous: [] }]);
    expect(guessTimeFormats(['13.03.2025'])).toEqual([{ format: 'dd.MM.yyyy', kind: 'date', ambiguous: [] }]);
    expect(guessTimeFormats(['20250313'])).toEqual([{ format: 'yyyyMMdd', kind: 'date', ambiguous: [] }]);
    expect(guessTimeFormats(['14:15:00', '9:15:00'])).toEqual([
      { format: 'HH:mm:ss', kind: 'time-of-day', ambiguous: [] },
    ]);
    expect(guessTimeFormats(['141500.25'])).toEqual([
      { format: 'HHmmss.SSS', kind: 'time-of-day', ambiguous: [] },
    ]);
    expect(guessTimeFormats(['141500', '91500'])).toEqual([
      { format: 'Hmmss', kind: 'time-of-day', ambiguous: [] },
    ]);
    expect(guessTimeFormats(['2:15 PM'])).toEqual([
      { format: 'hh:mm a', kind: 'time-of-day', ambiguous: [] },
    ]);
  });
  it('lists both orders of day and month, and one as soon as the samples decide', () => {
    const guess = (format: string, other: string) => ({
      format,
      kind: 'date-time',
      ambiguous: [`${ORDER} ${other}`, NO_ZONE],
    });
    const european = 'dd/MM/yyyy HH:mm';
    const american = 'MM/dd/yyyy HH:mm';
    // 3 March is the same in both orders and decides nothing
    for (const samples of [['01/03/2025 14:15'], ['03/03/2025 14:15']])
      expect(guessTimeFormats(samples)).toEqual([guess(european, american), guess(american, european)]);
    expect(guessTimeFormats(['01/03/2025 14:15', '13/03/2025 14:15']).map((g) => g.format)).toEqual([
      european,
    ]);
    expect(guessTimeFormats(['01/03/2025 14:15', '03/13/2025 14:15']).map((g) => g.format)).toEqual([
      american,
    ]);
  });
  it('lists the orders of a two-digit year and its centuries', () => {
    expect(guessTimeFormats(['11-12-10']).map((g) => g.format)).toEqual([
      "dd-MM-'20'yy",
      "MM-dd-'20'yy",
      "'20'yy-MM-dd",
      'HH-mm-ss',
    ]);
    expect(guessTimeFormats(['31.12.85 14:15'])).toEqual([
      {
        format: "dd.MM.'19'yy HH:mm",
        kind: 'date-time',
        ambiguous: [
          "also read by dd.MM.'20'yy HH:mm",
          'the year has two digits: century 19 is a guess',
          NO_ZONE,
        ],
      },
      {
        format: "dd.MM.'20'yy HH:mm",
        kind: 'date-time',
        ambiguous: ["also read by dd.MM.'19'yy HH:mm", CENTURY_20, NO_ZONE],
      },
    ]);
  });
  it('a number may be a time of day that lost its 0, or a serial number', () => {
    expect(guessTimeFormats(['45658'])).toEqual([
      { format: 'excel', kind: 'date', ambiguous: ['also read by Hmmss', SERIALS_1904] },
      { format: 'Hmmss', kind: 'time-of-day', ambiguous: ['also read by excel'] },
    ]);
  });
  it.each([
    [[]],
    [['', '  ']],
    [['x']],
    [['12.5']],
    [['1740823200']],
    [['-0.153']],
    [['31.04.2025']],
    [['1925-03-01']],
    [['2025-03-01', 'x']],
    [['13/13/2025']],
    [['10:15:61']],
    [["10'15"]],
  ])('nothing reads %j', (samples) => {
    expect(guessTimeFormats(samples)).toEqual([]);
  });
  it('every guess reads every sample, whatever their order', () => {
    const pad = (value: number) => String(value).padStart(2, '0');
    const styles: readonly ((t: Date) => string)[] = [
      (t) => t.toISOString(),
      (t) =>
        `${pad(t.getUTCDate())}.${pad(t.getUTCMonth() + 1)}.${t.getUTCFullYear()} ${t.toISOString().slice(11, 19)}`,
      (t) =>
        `${t.getUTCMonth() + 1}/${t.getUTCDate()}/${t.getUTCFullYear()} ${t.getUTCHours()}:${pad(t.getUTCMinutes())}`,
      (t) => t.toISOString().slice(2, 10),
      (t) => t.toISOString().slice(11, 23),
      (t) => t.toISOString().slice(2, 19).replaceAll(/\D/g, ''),
      (t) => String(25_569 + t.getTime() / 86_400_000),
    ];
    const time = fc.date({
      min: new Date('1990-01-01T00:00:00Z'),
      max: new Date('2060-01-01T00:00:00Z'),
      noInvalidDate: true,
    });
    fc.assert(
      fc.property(
        fc.constantFrom(...styles),
        fc.array(time, { minLength: 1, maxLength: 8 }),
        (style, times) => {
          const samples = times.map(style);
          const guesses = guessTimeFormats(samples);
          expect(guesses.length, samples.join()).toBeGreaterThan(0);
          expect(guessTimeFormats([...samples].reverse())).toEqual(guesses);
          for (const { format, kind, zone, scale } of guesses)
            for (const sample of samples) {
              if (kind === 'time-of-day') expect(compileTimeFormat(format)(sample)).not.toBeNull();
              else
                expect(
                  timeReader({ format, zone: zone ?? 'UTC', ...(scale && { scale }) }, null)(sample).kind,
                ).not.toBe('invalid');
            }
        },
      ),
      { seed: 37, numRuns: 300 },
    );
  });
});
