import { from } from 'arquero';
import { describe, expect, it } from 'vitest';
import {
  type DaySpan,
  dayIndices,
  dayTec,
  joinIndices,
  klobucharVerticalM,
  localDaySpan,
  readIndices,
  readTecMaps,
  solarDaySpan,
} from '../../src/ionosphere/index.js';
import { InputError } from '../../src/logs/index.js';
import { ionexText } from './ionexText.js';
import { fixtureText } from './samples.js';

const utc = (text: string): number => Date.parse(text);
const DAILY = readIndices(
  fixtureText('Kp_ap_Ap_SN_F107_sample_2024-01-21_2024-02-09.txt'),
  'daily.txt',
).indices;

describe('days as spans', () => {
  it('of a zone follow its clock, with the long and the short day', () => {
    const hours = ({ startMs, endMs }: DaySpan): number => (endMs - startMs) / 3_600_000;
    expect(localDaySpan('2024-01-22', '+05:00')).toEqual(localDaySpan('2024-01-22', 'Etc/GMT-5'));
    expect(localDaySpan('2024-01-22', 'Etc/GMT-5')).toEqual({
      day: '2024-01-22',
      startMs: utc('2024-01-21T19:00Z'),
      endMs: utc('2024-01-22T19:00Z'),
    });
    expect(hours(localDaySpan('2024-03-31', 'Europe/Lisbon'))).toBe(23);
    expect(hours(localDaySpan('2024-10-27', 'Europe/Lisbon'))).toBe(25);
  });

  it('begin when the clock goes on, where it skips midnight', () => {
    // tz database: Asuncion went from 00:00 to 01:00 on 2024-10-06, at 04:00 UTC
    expect(localDaySpan('2024-10-06', 'America/Asuncion').startMs).toBe(utc('2024-10-06T04:00Z'));
    expect(localDaySpan('2024-10-05', 'America/Asuncion').endMs).toBe(utc('2024-10-06T04:00Z'));
  });

  it('of the Sun hang on the longitude', () => {
    expect(solarDaySpan('2024-01-22', 90)).toEqual({
      day: '2024-01-22',
      startMs: utc('2024-01-21T18:00Z'),
      endMs: utc('2024-01-22T18:00Z'),
    });
  });

  it('refuse what is no date', () => {
    for (const day of ['2024-02-30', 'today', '2024-1-1', '2024-01-01T00:00Z'])
      expect(() => localDaySpan(day, 'UTC'), day).toThrow(RangeError);
  });
});

describe('dayIndices', () => {
  it('of a UTC day are those of the file (GFZ Potsdam)', () => {
    const [day] = dayIndices([localDaySpan('2024-01-22', 'UTC')], DAILY);
    // ap 3 2 4 5 6 7 15 18: mean 7.5, which the file rounds to 8
    expect(day).toEqual({
      day: '2024-01-22',
      apMean: 7.5,
      kpMax: 3.333,
      hp30Max: Number.NaN,
      hp60Max: Number.NaN,
      dstMin: Number.NaN,
      f107: 196.1,
      knownShare: 1,
    });
  });

  it('of a local day weigh each interval by what it shares', () => {
    // 19:00 to 19:00: one third of 18-21 h is out before, two thirds after
    const [day] = dayIndices([localDaySpan('2024-01-22', 'Etc/GMT-5')], DAILY);
    const expected = (3 * (2 / 3) + 4 + 3 + 2 + 4 + 5 + 6 + 7 + 15 * (1 / 3)) / 8;
    expect(day!.apMean).toBeCloseTo(expected, 12);
    expect(day!.kpMax).toBe(3);
    expect(day!.f107).toBe(196.1);
  });

  it('of a day with missing values say how much is known; of a day outside nothing is', () => {
    const [last, after] = dayIndices(
      [localDaySpan('2024-02-13', 'UTC'), localDaySpan('2024-03-01', 'UTC')],
      DAILY,
    );
    expect(last!.knownShare).toBe(0.75);
    expect(last!.kpMax).toBe(2.667);
    expect(last!.f107).toBeNaN();
    expect(after).toEqual({
      day: '2024-03-01',
      apMean: Number.NaN,
      kpMax: Number.NaN,
      hp30Max: Number.NaN,
      hp60Max: Number.NaN,
      dstMin: Number.NaN,
      f107: Number.NaN,
      knownShare: 0,
    });
  });
});

describe('joinIndices', () => {
  const rows = ['2024-01-22T00:00Z', '2024-01-22T20:59:59Z', '2024-01-23T00:00Z'].map((time) => ({
    startMs: utc(time),
    east: 1,
  }));

  it('looks up each occupation at its start, from records and tables alike', () => {
    for (const input of [Object.freeze(rows), from(rows)]) {
      const { columns, withoutValue, messages } = joinIndices(input, DAILY);
      expect([...columns.kp]).toEqual([0.667, 3, 2]);
      expect([...columns.ap]).toEqual([3, 15, 7]);
      expect([...columns.apDaily]).toEqual([8, 8, 6]);
      expect([...columns.f107]).toEqual([196.1, 196.1, 180.3]);
      expect([...columns.dst]).toEqual([Number.NaN, Number.NaN, Number.NaN]);
      expect(withoutValue).toEqual({ kp: 0, ap: 0, hp30: 3, hp60: 3, dst: 3, f107: 0, apDaily: 0 });
      // an index that no file held is nothing to complain of
      expect(messages).toEqual([]);
    }
  });

  it('says when the file is of another year', () => {
    const { messages, withoutValue } = joinIndices([{ startMs: utc('2025-01-22T00:00Z') }], DAILY);
    expect(withoutValue.kp).toBe(1);
    expect(messages.map(({ code }) => code)).toEqual(Array(4).fill('index-other-period'));
    expect(messages[0]!.text).toBe(
      'Expected Kp for 1 occupation, came values of 2024-01-21 to 2024-02-13: none of the occupations has a value (2025-01-22). Give the file of the same years, and check the dates of the logs.',
    );
  });

  it('thinks of the time zone when occupations lie within hours of the ends', () => {
    const { messages } = joinIndices([...rows, { startMs: utc('2024-02-14T03:00Z') }], DAILY);
    expect(messages[0]).toMatchObject({ code: 'index-no-value', severity: 'warning' });
    expect(messages[0]!.text).toContain('1 of the occupations has none (2024-02-14)');
    expect(messages[0]!.text).toContain('check the time zone of the logs');
  });

  it('counts occupations in a gap of the file', () => {
    const { messages, columns } = joinIndices([...rows, { startMs: utc('2024-02-13T22:00Z') }], DAILY);
    expect(columns.kp[3]).toBeNaN();
    expect(messages[0]!.text).toContain('The file lacks these intervals: complete it.');
  });

  it('names the column it needs, and says when nothing was read', () => {
    expect(() => joinIndices([{ time: 1 }], DAILY)).toThrow(InputError);
    expect(joinIndices(rows, { series: {} }).messages.map(({ code }) => code)).toEqual(['index-none-given']);
    expect(joinIndices([], DAILY).messages).toEqual([]);
  });
});

describe('dayTec', () => {
  // two days of hourly maps: 10 TECU at 0 h, one more every hour, 20 more on the second day; 0.5 TECU a degree northward
  const maps = [1, 2]
    .map((date) =>
      readTecMaps(
        ionexText(
          Array.from({ length: 25 }, (_, hour) => ({
            epoch: [2025, 3, date, hour, 0, 0],
            value: (latitude: number) => 100 + 10 * hour + 200 * (date - 1) + 5 * (latitude - 45),
          })),
          { intervalSeconds: 3600, longitudes: [-180, 180, 5] },
        ),
        'm.25i',
      ),
    )
    .map((reading) => reading.maps!);
  const site = { latitudeDeg: 45, longitudeDeg: 0 };
  const days = ['2025-03-01', '2025-03-02', '2025-03-03'].map((day) => localDaySpan(day, 'UTC'));
  const gradientPer100Km = (100 * 0.5 * 180) / Math.PI / (6371 + 450);

  it('gives mean and maximum of the daytime, gradient and change, by hand', () => {
    const { days: found, messages } = dayTec(maps[0]!, site, days.slice(0, 1));
    expect(messages).toEqual([]);
    // 8 to 18 h: 18 to 28 TECU
    expect(found[0]!.tecMax).toBeCloseTo(28, 9);
    expect(found[0]!.tecMean).toBeCloseTo(23, 9);
    expect(found[0]!.gradientMean).toBeCloseTo(gradientPer100Km, 9);
    expect(found[0]!.gradientMax).toBeCloseTo(gradientPer100Km, 9);
    expect(found[0]!.changeFromDayBefore).toBeNaN();
    expect(found[0]!.klobucharMax).toBeNaN();
    expect(found[0]!.knownShare).toBe(1);
  });

  it('counts the daytime by the Sun at the site', () => {
    const east = dayTec(maps[0]!, { latitudeDeg: 45, longitudeDeg: 60 }, [solarDaySpan('2025-03-01', 60)]);
    expect(east.days[0]!.tecMax).toBeCloseTo(24, 9);
  });

  it('takes the change from the calendar day before, and says what the maps do not hold', () => {
    const { days: found, messages } = dayTec(maps[1]!, site, days);
    expect(found.map(({ knownShare }) => knownShare)).toEqual([0, 1, 0]);
    expect(found[1]!.tecMean).toBeCloseTo(43, 9);
    expect(found[1]!.changeFromDayBefore).toBeNaN();
    expect(messages.map(({ code }) => code)).toEqual(['map-other-day']);
    expect(messages[0]!.text).toContain('82 of them lie outside');
  });

  it('puts the broadcast model beside the maps', () => {
    const klobuchar = {
      alpha: [0.382e-7, 0.149e-7, -0.179e-6, 0],
      beta: [0.143e6, 0, -0.328e6, 0.113e6],
    } as const;
    const { days: found } = dayTec(maps[0]!, site, days.slice(0, 1), { klobuchar });
    const peak = klobucharVerticalM(45, 0, 14 * 3600, klobuchar) / 0.162372447512;
    expect(found[0]!.klobucharMax).toBeCloseTo(peak, 8);
    expect(found[0]!.klobucharMean).toBeLessThan(peak);
  });

  it('refuses an impossible daytime', () => {
    expect(() => dayTec(maps[0]!, site, days, { fromHour: 18, toHour: 8 })).toThrow(RangeError);
    expect(() => dayTec(maps[0]!, site, days, { stepMinutes: 0 })).toThrow(RangeError);
  });
});
