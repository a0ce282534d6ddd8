import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { decisive, file, readRecognized, recognized } from './heads.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix';
const row = (time: string): string => `${time},CP1,47.01,8.02,500.0,fixed`;
const rowsOf = (...times: readonly string[]): string => file(HEADER, ...times.map(row));

describe('times in one column', () => {
  it.each([
    ['13.03.2025 14:15:00', 'dd.MM.yyyy HH:mm:ss', Date.UTC(2025, 2, 13, 14, 15)],
    ['3/13/2025 2:15:00 PM', 'MM/dd/yyyy hh:mm:ss a', Date.UTC(2025, 2, 13, 14, 15)],
    ['2025-072 14:15:00', 'day-of-year', Date.UTC(2025, 2, 13, 14, 15)],
    ['13-Mar-2025 14:15:00', 'dd-MMM-yyyy HH:mm:ss', Date.UTC(2025, 2, 13, 14, 15)],
    ['20250313141500', 'yyyyMMddHHmmss', Date.UTC(2025, 2, 13, 14, 15)],
    // Day 45729 is 2025-03-13 (a spreadsheet counts 1900-01-01 as day 1 and a 29 February 1900).
    ['45729.59375', 'excel', Date.UTC(2025, 2, 13, 14, 15)],
  ])('%j', async (text, format, utcMs) => {
    const { found, log } = await readRecognized(folder, rowsOf(text, text), { timeZone: 'UTC' });
    expect(found.layout).toEqual({ kind: 'delimited', time: { format } });
    expect(log.positions[0]!.utcMs).toBe(utcMs);
    expect(found.preview[0]!.time).toBe(new Date(utcMs).toISOString());
  });

  it('with a damaged one among them', async () => {
    const times = Array.from({ length: 20 }, (_, k) => `13.03.2025 14:15:${String(k).padStart(2, '0')}`);
    const { found, log } = await readRecognized(folder, rowsOf(...times, 'soon'), { timeZone: 'UTC' });
    expect(found.layout).toEqual({ kind: 'delimited', time: { format: 'dd.MM.yyyy HH:mm:ss' } });
    expect(log.positions).toHaveLength(20);
  });

  it('say their scale or zone in the text or in the name of the column', async () => {
    const utc = file(HEADER.replace('time', 'Time (UTC)'), row('2025-03-13 14:15:00'));
    expect((await readRecognized(folder, utc)).found.layout).toEqual({
      kind: 'delimited',
      time: { zone: 'UTC' },
    });
    const gps = file(HEADER.replace('time', 'GPS time'), row('2025-03-13 14:15:00'));
    const { found, log } = await readRecognized(folder, gps);
    expect(found.layout).toEqual({ kind: 'delimited', time: { scale: 'gps' } });
    expect(found.unsure.map(({ code }) => code)).toEqual(['gps-time']);
    // GPS time is ahead of UTC by 18 s since 2017 (IERS Bulletin C 52).
    expect(log.positions[0]!.utcMs).toBe(Date.UTC(2025, 2, 13, 14, 14, 42));
  });
});

describe('times in two columns', () => {
  it.each([
    ['Date,Time', '03/14/2025,2:15:00 PM', 'MM/dd/yyyy hh:mm:ss a'],
    ['Date,Time', '14.03.2025,14:15:00', 'dd.MM.yyyy HH:mm:ss'],
    ['Date,Time', '20250314,141500', 'yyyyMMdd HHmmss'],
  ])('%s: %s', async (names, cells, format) => {
    const text = file(`${names},mark,latitude,longitude,height,fix`, `${cells},CP1,47.01,8.02,500.0,fixed`);
    const { found, log } = await readRecognized(folder, text, { timeZone: 'UTC' });
    expect(found.layout).toEqual({ kind: 'delimited', columns: { timeOfDay: 'Time' }, time: { format } });
    expect(log.positions[0]!.utcMs).toBe(Date.UTC(2025, 2, 14, 14, 15));
  });

  it('in ISO need no format', async () => {
    const text = file(
      'Date,Time,mark,latitude,longitude,height,fix',
      '2025-03-14,14:15:00,CP1,47.01,8.02,500,fixed',
    );
    const { found, log } = await readRecognized(folder, text, { timeZone: 'UTC' });
    expect(found.layout).toEqual({ kind: 'delimited', columns: { timeOfDay: 'Time' } });
    expect(log.positions[0]!.utcMs).toBe(Date.UTC(2025, 2, 14, 14, 15));
  });

  it('week and seconds of GPS, with a header and without', async () => {
    // Week 2357 began on 2025-03-09 (week 0 on 1980-01-06, IS-GPS-200); 18 leap seconds.
    const utcMs = Date.UTC(2025, 2, 9, 4, 59, 42);
    const named = file(
      'GPS week,TOW,mark,latitude,longitude,height,fix',
      '2357,18000,CP1,47.01,8.02,500.0,fixed',
    );
    const { found, log } = await readRecognized(folder, named);
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(log.positions[0]!.utcMs).toBe(utcMs);
    const bare = file(
      '2357 18000.0 CP1 -147.010000001 -47.010000001 500.0',
      '2357 18001.0 CP1 -147.010000002 -47.010000001 500.1',
    );
    const second = await readRecognized(folder, bare);
    expect(second.found.layout).toMatchObject({
      columns: { gpsWeek: 1, gpsSeconds: 2, mark: 3, longitude: 4 },
    });
    expect(second.log.positions[0]!.utcMs).toBe(utcMs);
  });

  it('a time of day alone takes the date from the name of the file', async () => {
    const text = file('Time (UTC),mark,latitude,longitude,height,fix', '14:15:00,CP1,47.01,8.02,500.0,fixed');
    for (const [name, extra] of [
      ['crew2_2025-03-14.csv', {}],
      ['crew2_20250314.csv', { format: 'yyyyMMdd HH:mm:ss' }],
    ] as const) {
      const { found, log } = await readRecognized(folder, text, {}, name);
      expect(found.layout).toMatchObject({
        columns: { timeOfDay: 'Time (UTC)' },
        time: { ...extra, zone: 'UTC' },
      });
      expect(log.positions[0]!.utcMs, name).toBe(Date.UTC(2025, 2, 14, 14, 15));
    }
    for (const name of [
      '14-03-2025.csv',
      '140325.csv',
      '2025-03-14_2025-03-16.csv',
      '20251399.csv',
      'log.csv',
    ]) {
      expect(decisive(recognized(text, {}, name)), name).toEqual(['no-date']);
    }
  });
});

describe('times that the data do not decide are asked for', () => {
  it('the order of day and month', () => {
    const found = recognized(rowsOf('01/03/2025 14:15', '02/03/2025 14:15'), { timeZone: 'UTC' });
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(found.unsure).toMatchObject([
      {
        code: 'date-order',
        key: 'layout.time.format',
        choices: ['dd/MM/yyyy HH:mm', 'MM/dd/yyyy HH:mm'],
        decisive: true,
      },
    ]);
    expect(found.preview[0]!.time).toBe(null);
    expect(recognized(rowsOf('01/03/2025 14:15', '13/03/2025 14:15'), { timeZone: 'UTC' }).complete).toBe(
      true,
    );
  });

  it('a year of two digits, though its order be clear', () => {
    const found = recognized(rowsOf('31.12.45 14:15'), { timeZone: 'UTC' });
    expect(found.unsure[0]).toMatchObject({
      code: 'two-digit-year',
      choices: ["dd.MM.'20'yy HH:mm"],
      decisive: true,
    });
    expect(decisive(recognized(rowsOf('11-12-10 14:15'), { timeZone: 'UTC' }))).toEqual(['date-order']);
  });

  it('the zone, unless the study has one', () => {
    const found = recognized(rowsOf('2025-03-13T14:15:00'));
    expect(found.unsure).toMatchObject([{ code: 'time-zone', key: 'layout.time.zone', decisive: true }]);
    expect(recognized(rowsOf('2025-03-13T14:15:00'), { timeZone: 'Europe/Lisbon' }).complete).toBe(true);
    expect(recognized(rowsOf('2025-03-13')).complete).toBe(true);
    expect(decisive(recognized(rowsOf('2025-03-13T14:15:00', '2025-03-13T14:15:00Z')))).toEqual([
      'time-zone',
    ]);
  });

  it('the half of the day, where times fall back at one o’clock', () => {
    const morning = recognized(rowsOf('13.03.2025 9:15', '13.03.2025 10:15'), { timeZone: 'UTC' });
    expect(morning.unsure).toMatchObject([{ code: 'half-day', decisive: false }]);
    const lunch = recognized(rowsOf('13.03.2025 12:55', '13.03.2025 1:05'), { timeZone: 'UTC' });
    expect(lunch.unsure).toMatchObject([{ code: 'half-day', decisive: true }]);
  });

  it('texts that no format reads', () => {
    const found = recognized(rowsOf('yesterday', 'today'), { timeZone: 'UTC' });
    expect(found.unsure[0]).toMatchObject({ code: 'time-format', choices: [], decisive: true });
  });
});
