import { describe, expect, it } from 'vitest';
import { indexAt, indexStatusAt, mergeIndices, readIndices } from '../../src/ionosphere/index.js';
import { fixtureText, sampleText, sampleTitle } from './samples.js';

const utc = (text: string): number => Date.parse(text);
const codes = (reading: { messages: readonly { code: string }[] }): string[] =>
  reading.messages.map(({ code }) => code);

const DAILY = fixtureText('Kp_ap_Ap_SN_F107_sample_2024-01-21_2024-02-09.txt');
const HALF_HOUR = fixtureText('Hp30_ap30_sample_2025-06-19.txt');
const dailyRows = DAILY.split('\n').filter((line) => /^\d/.test(line));

interface StormDay {
  readonly date: string;
  readonly kp: readonly number[];
  readonly ap: readonly number[];
  readonly Ap: number;
  readonly F107obs: number;
}
const { days: STORM_DAYS } = JSON.parse(fixtureText('storm-days.json')) as { days: StormDay[] };

const ROTATION_ONE = Date.UTC(1832, 1, 8);
const COUNT_START = Date.UTC(1932, 0, 1);
const pad = (value: number, width: number): string => String(value).padStart(width);

/** A row of the daily file. */
function dailyRow({ date, kp, ap, Ap, F107obs }: StormDay): string {
  const days = (utc(`${date}T00:00Z`) - COUNT_START) / 86_400_000;
  return [date.replaceAll('-', ' '), days, days + 0.5, 2500, 1, ...kp, ...ap, Ap, -1, F107obs, -1, 1].join(
    ' ',
  );
}

/** A row of the fixed columns: Bartels rotation and day, Kp in coded tenths, their sum, ap, Ap, Cp, C9. */
function wdcRow({ date, kp, ap, Ap }: StormDay): string {
  const days = (utc(`${date}T00:00Z`) - ROTATION_ONE) / 86_400_000;
  const code = (thirds: number) => 10 * Math.floor(thirds / 3) + [0, 3, 7][thirds % 3]!;
  const thirds = kp.map((value) => Math.round(value * 3));
  return [
    date.slice(2).replaceAll('-', ''),
    pad(Math.floor(days / 27) + 1, 4),
    pad((days % 27) + 1, 2),
    ...thirds.map((value) => pad(code(value), 2)),
    pad(code(thirds.reduce((a, b) => a + b)), 3),
    ...ap.map((value) => pad(value, 3)),
    pad(Ap, 3),
    '0.0',
    '0',
  ].join('');
}

describe('the daily file', () => {
  const reading = readIndices(DAILY, 'daily.txt');

  it('is recognised, and every row used', () => {
    expect(reading.layout).toBe('the daily file of Kp, ap, Ap, SN and F10.7');
    expect([reading.rowsRead, reading.rowsUsed]).toEqual([24, 24]);
    // the sunspot column of this copy holds missing marks alone
    expect(Object.keys(reading.indices.series)).toEqual([
      'kp',
      'ap',
      'apDaily',
      'f107Observed',
      'f107Adjusted',
    ]);
  });

  it('gives every value of every row at its interval', () => {
    for (const row of dailyRows) {
      const cells = row.trim().split(/\s+/);
      const day = utc(`${cells.slice(0, 3).join('-')}T00:00Z`);
      const value = (cell: string): number => (Number(cell) < 0 ? Number.NaN : Number(cell));
      for (let k = 0; k < 8; k++) {
        const within = day + (3 * k + 1) * 3_600_000;
        expect(indexAt(reading.indices, 'kp', within)).toBe(value(cells[7 + k]!));
        expect(indexAt(reading.indices, 'ap', within)).toBe(value(cells[15 + k]!));
      }
      const noon = day + 43_200_000;
      expect(indexAt(reading.indices, 'apDaily', noon)).toBe(value(cells[23]!));
      expect(indexAt(reading.indices, 'f107Observed', noon)).toBe(value(cells[25]!));
      expect(indexAt(reading.indices, 'f107Adjusted', noon)).toBe(value(cells[26]!));
    }
  });

  it('keeps what is missing missing, and says what may change', () => {
    expect(indexAt(reading.indices, 'kp', utc('2024-02-13T19:00Z'))).toBeNaN();
    expect(indexStatusAt(reading.indices, 'kp', utc('2024-02-13T19:00Z'))).toBeNull();
    expect(indexStatusAt(reading.indices, 'kp', utc('2024-01-31T23:59Z'))).toBe('definitive');
    expect(indexStatusAt(reading.indices, 'kp', utc('2024-02-01T00:00Z'))).toBe('preliminary');
    expect(indexStatusAt(reading.indices, 'f107Observed', utc('2024-02-01T00:00Z'))).toBe('not-stated');
    expect(codes(reading)).toEqual(['index-missing-values', 'index-preliminary', 'index-missing-values']);
    expect(reading.messages[1]!.text).toBe(
      'Of 192 values of Kp 102 are not final, from 2024-02-01 00:00 UTC to 2024-02-13 15:00 UTC. They may still change: get the file again later and repeat the study before resting much on them.',
    );
  });

  it('takes rows of nines for missing too', () => {
    const row = dailyRows[0]!.replace('178.5', '999.9').replace(/ 4 {2}-1/, '999  -1');
    const { indices, rowsUsed } = readIndices(`${row}\n${dailyRows[1]}`, 'daily.txt');
    expect(rowsUsed).toBe(2);
    expect(indexAt(indices, 'f107Observed', utc('2024-01-21T12:00Z'))).toBeNaN();
    expect(indexAt(indices, 'apDaily', utc('2024-01-21T12:00Z'))).toBeNaN();
    expect(indexAt(indices, 'f107Adjusted', utc('2024-01-21T12:00Z'))).toBe(172.9);
  });

  it('gives the great storms their values (GFZ Potsdam)', () => {
    const { indices, messages } = readIndices(STORM_DAYS.map(dailyRow).join('\n'), 'storms.txt');
    expect(indexAt(indices, 'apDaily', utc('2024-05-11T12:00Z'))).toBe(271);
    expect(indexAt(indices, 'kp', utc('2024-05-10T18:00Z'))).toBe(8.667);
    expect(indexAt(indices, 'kp', utc('2024-05-10T23:59:59Z'))).toBe(8.667);
    expect(indexAt(indices, 'apDaily', utc('2004-12-24T12:00Z'))).toBe(3);
    expect(indexAt(indices, 'apDaily', utc('2003-11-20T12:00Z'))).toBe(150);
    expect(messages.map(({ code }) => code)).toEqual(['index-gap', 'index-gap']);
  });
});

describe('the half-hour file', () => {
  const reading = readIndices(HALF_HOUR, 'hp30.txt');

  it('gives every row its value from its start to its end', () => {
    expect(reading.layout).toBe('the half-hour file of Hp30 and ap30');
    const rows = HALF_HOUR.split('\n').filter((line) => /^\d/.test(line));
    expect(rows).toHaveLength(96);
    for (const row of rows) {
      const cells = row.trim().split(/\s+/);
      const start = utc(`${cells.slice(0, 3).join('-')}T00:00Z`) + Number(cells[3]) * 3_600_000;
      for (const ms of [start, start + 1_799_999]) {
        expect(indexAt(reading.indices, 'hp30', ms)).toBe(Number(cells[7]));
        expect(indexAt(reading.indices, 'ap30', ms)).toBe(Number(cells[8]));
      }
    }
    expect(indexAt(reading.indices, 'hp30', utc('2025-06-18T23:59:59Z'))).toBeNaN();
    expect(indexAt(reading.indices, 'hp30', utc('2025-06-21T00:00Z'))).toBeNaN();
  });

  it('says nothing of status, since the file reserves its column, and knows no upper end', () => {
    expect(codes(reading)).toEqual([]);
    expect(indexStatusAt(reading.indices, 'hp30', utc('2025-06-19T12:00Z'))).toBe('not-stated');
    const { indices } = readIndices(
      '2024 05 11 00.0 00.25 33734.00000 33734.01042 11.667  940 0',
      'storm.txt',
    );
    expect(indexAt(indices, 'hp30', utc('2024-05-11T00:10Z'))).toBe(11.667);
  });

  it('differs from the hourly and the 3-hour file by the length of its intervals', () => {
    const hour = readIndices('2024 05 11 01.0 01.50 33734.04167 33734.06250  9.333  445 0', 'a');
    expect(indexAt(hour.indices, 'hp60', utc('2024-05-11T01:59Z'))).toBe(9.333);
    const three = readIndices('2024 05 11 03.0 04.50 33734.12500 33734.18750  8.333  236 1', 'b');
    expect(indexAt(three.indices, 'kp', utc('2024-05-11T05:59Z'))).toBe(8.333);
    expect(indexStatusAt(three.indices, 'ap', utc('2024-05-11T05:59Z'))).toBe('definitive');
    expect(indexAt(three.indices, 'kp', utc('2024-05-11T06:00Z'))).toBeNaN();
  });
});

describe('the fixed columns of Kp', () => {
  it('hold the values of the storms, in either century', () => {
    const { layout, indices, messages, rowsUsed } = readIndices(
      STORM_DAYS.map(wdcRow).join('\r\n'),
      'kp.wdc',
    );
    expect(layout).toBe('the fixed columns of Kp and ap, one day a row');
    expect(rowsUsed).toBe(STORM_DAYS.length);
    for (const { date, kp, ap, Ap } of STORM_DAYS) {
      const day = utc(`${date}T00:00Z`);
      kp.forEach((value, k) => {
        expect(indexAt(indices, 'kp', day + k * 10_800_000)).toBe(value);
        expect(indexAt(indices, 'ap', day + k * 10_800_000)).toBe(ap[k]);
      });
      expect(indexAt(indices, 'apDaily', day)).toBe(Ap);
      expect(indexStatusAt(indices, 'kp', day)).toBe('not-stated');
    }
    expect(messages.map(({ code }) => code)).toEqual(['index-gap']);
  });

  it('read a row written by hand: 3-, 3, 3+ are 27, 30, 33', () => {
    // 2024-01-21 is day 18 of rotation 2597, as the daily file says
    const row = '2401212597182730330003030710113 12 15 18  0  2  2  3  4  70.30';
    const { indices, messages } = readIndices(row, 'kp.wdc');
    const kp = [2.667, 3, 3.333, 0, 0.333, 0.333, 0.667, 1];
    kp.forEach((value, k) => {
      expect(indexAt(indices, 'kp', utc('2024-01-21T00:00Z') + k * 10_800_000)).toBe(value);
    });
    expect(messages).toEqual([]);
    const otherSum = readIndices(row.replace('113', '120'), 'kp.wdc');
    expect(otherSum.messages[0]!.text).toContain('the eight Kp add up to 113, and the row holds 120');
  });

  it('keep 99 and blanks missing, and refuse a date that the solar rotation contradicts', () => {
    const [storm] = STORM_DAYS as [StormDay];
    const row = wdcRow(storm);
    const blank = `${row.slice(0, 12)}99  ${row.slice(16)}`;
    const { indices } = readIndices(blank, 'kp.wdc');
    expect(indexAt(indices, 'kp', utc('1989-03-13T01:00Z'))).toBeNaN();
    expect(indexAt(indices, 'kp', utc('1989-03-13T04:00Z'))).toBeNaN();
    expect(indexAt(indices, 'kp', utc('1989-03-13T07:00Z'))).toBe(8.667);
    const wrong = readIndices([row, row.replace(/^890313/, '900313')].join('\n'), 'kp.wdc');
    expect(wrong.rowsUsed).toBe(1);
    expect(wrong.messages[0]).toMatchObject({ code: 'index-date-mismatch', file: 'kp.wdc', row: 2 });
  });
});

/** A row of Dst; values in nT beside the base value in hundreds. */
function dstRow(date: string, version: string, base: number, values: readonly number[]): string {
  const mean = Math.round(values.filter((v) => v !== 9999).reduce((a, b) => a + b, 0) / 24);
  const century = date.slice(0, 2);
  return `DST${date.slice(2, 4)}${date.slice(5, 7)}*${date.slice(8)}RRX${version}${century}${pad(base, 4)}${[...values, mean].map((v) => pad(v, 4)).join('')}`;
}

describe('the fixed columns of Dst', () => {
  const values = Array.from({ length: 24 }, (_, k) => -10 * k);

  it('give an hour each, with the base value and the status of the row', () => {
    const text = [
      dstRow('1989-03-13', '2', 0, values),
      dstRow('2024-05-10', '1', -1, values),
      dstRow('2024-05-11', '0', 0, values),
    ].join('\n');
    const { layout, indices, messages } = readIndices(text, 'dst.txt');
    expect(layout).toBe('the fixed columns of Dst, one day a row');
    expect(text.split('\n')[0]).toHaveLength(120);
    expect(indexAt(indices, 'dst', utc('1989-03-13T23:30Z'))).toBe(-230);
    expect(indexAt(indices, 'dst', utc('2024-05-10T05:00Z'))).toBe(-150);
    const status = (time: string) => indexStatusAt(indices, 'dst', utc(time));
    expect(['1989-03-13T00:00Z', '2024-05-10T00:00Z', '2024-05-11T00:00Z'].map(status)).toEqual([
      'definitive',
      'provisional',
      'preliminary',
    ]);
    expect(messages.map(({ code }) => code)).toEqual(['index-gap', 'index-preliminary']);
  });

  it('keep 9999 missing and name a row that is cut short', () => {
    const text = [
      dstRow('2024-05-10', '2', 0, [9999, ...values.slice(1)]),
      dstRow('2024-05-11', '2', 0, values).slice(0, 80),
    ].join('\n');
    const { indices, messages, rowsUsed } = readIndices(text, 'dst.txt');
    expect(indexAt(indices, 'dst', utc('2024-05-10T00:30Z'))).toBeNaN();
    expect(indexAt(indices, 'dst', utc('2024-05-10T01:30Z'))).toBe(-10);
    expect(rowsUsed).toBe(1);
    expect(messages[0]).toMatchObject({ code: 'index-row-unreadable', file: 'dst.txt', row: 2 });
    expect(messages[0]!.text).toBe(
      '1 row is left out, here: expected 120 columns in the row, came 80. Get the file again, or complete the row.',
    );
  });
});

describe('faulty index files', () => {
  it.each([
    ['', 'a file without any row'],
    ['# only a comment\n', 'a file without any row'],
    ['hello world', 'rows such as "hello world"'],
    ['time,kp\n2024-01-01,3', 'rows such as "time,kp"'],
  ])('%j is no known layout', (text, came) => {
    const reading = readIndices(text, 'x.txt');
    expect(reading.layout).toBeNull();
    expect(reading.messages).toHaveLength(1);
    expect(reading.messages[0]).toMatchObject({
      severity: 'error',
      code: 'index-layout-unknown',
      file: 'x.txt',
    });
    expect(reading.messages[0]!.text).toContain(came);
  });

  const broken = (change: (rows: string[]) => void) => {
    const rows = [...dailyRows.slice(0, 5)];
    change(rows);
    return readIndices(rows.join('\n'), 'daily.txt');
  };

  it.each<[string, (rows: string[]) => void, string, number, string]>([
    [
      'a truncated row',
      (r) => {
        r[1] = r[1]!.slice(0, 60);
      },
      'index-row-unreadable',
      2,
      'expected 28 numbers in the row, came',
    ],
    [
      'a truncated first row',
      (r) => {
        r[0] = r[0]!.slice(0, 60);
      },
      'index-row-unreadable',
      1,
      'expected 28 numbers in the row, came',
    ],
    [
      'a word',
      (r) => {
        r[2] = r[2]!.replace('2597', 'oops');
      },
      'index-row-unreadable',
      3,
      'expected a number, came "oops"',
    ],
    [
      'the wrong year',
      (r) => {
        r[3] = r[3]!.replace(/^2024/, '2025');
      },
      'index-date-mismatch',
      4,
      'the date 2025-01-24 is day 33992 since 1932-01-01, and the row counts 33626',
    ],
    [
      'no date of the calendar',
      (r) => {
        r[3] = r[3]!.replace('01 24', '02 31');
      },
      'index-row-unreadable',
      4,
      'expected a date of the calendar, came 2024-02-31',
    ],
    [
      'a Kp that does not exist',
      (r) => {
        r[0] = r[0]!.replace('1.333', '1.500');
      },
      'index-row-unreadable',
      1,
      'expected a Kp from 0 to 9 in thirds, came 1.5',
    ],
    [
      'an unknown flag',
      (r) => {
        r[0] = r[0]!.replace(/1$/, '7');
      },
      'index-row-unreadable',
      1,
      'expected 0, 1 or 2 as D, came 7',
    ],
  ])('name %s', (_, change, code, row, text) => {
    const reading = broken(change);
    const found = reading.messages.find((one) => one.code === code)!;
    expect(found).toMatchObject({ severity: 'warning', file: 'daily.txt', row });
    expect(found.text).toContain(text);
    expect(reading.rowsUsed).toBe(4);
  });

  it('use a row that contradicts itself, and say so', () => {
    const reading = broken((rows) => {
      rows[0] = rows[0]!.replace(/ 4 {2}-1/, '99  -1');
    });
    expect(reading.rowsUsed).toBe(5);
    expect(reading.messages.find(({ code }) => code === 'index-inconsistent')!.text).toBe(
      '1 row contradicts itself, here: the mean of the eight ap is 4.25, and the row holds Ap 99. The values are used as they stand: compare the row with the published file.',
    );
  });

  it('count the rows of another layout', () => {
    const rows = HALF_HOUR.split('\n').filter((line) => /^\d/.test(line));
    const reading = readIndices([...dailyRows, ...rows.slice(0, 3)].join('\n'), 'both.txt');
    expect(reading.messages[0]).toMatchObject({ code: 'index-layouts-mixed', row: dailyRows.length + 1 });
    expect(reading.messages[0]!.text).toContain('3 rows are left out, here: expected the daily file');
    expect(reading.indices.series.hp30).toBeUndefined();
  });

  it('tell of gaps, and of two values for one interval', () => {
    const gap = readIndices(dailyRows.filter((_, i) => i !== 2 && i !== 3).join('\n'), 'd.txt');
    expect(gap.messages[0]).toMatchObject({ code: 'index-gap', severity: 'warning' });
    expect(gap.messages[0]!.text).toContain('lacks 16 intervals in one gap, from 2024-01-23 00:00 UTC on');
    const twice = readIndices(
      [dailyRows[0]!, dailyRows[0]!.replace('178.5', '199.9'), ...dailyRows.slice(1, 3)].join('\n'),
      'd.txt',
    );
    expect(twice.messages[0]!.text).toContain(
      'F10.7 observed at 2024-01-21 00:00 UTC: 199.9 is kept, 178.5 is not.',
    );
  });

  it('do not hang on the order of rows', () => {
    const reading = readIndices([...dailyRows].reverse().join('\n'), 'd.txt');
    expect(reading.indices).toEqual(readIndices(DAILY, 'd.txt').indices);
  });
});

describe('mergeIndices', () => {
  it('puts the series of files together, the more final value first', () => {
    const preliminary = '2024 05 11 03.0 04.50 33734.12500 33734.18750  8.667  300 0';
    const definitive = '2024 05 11 03.0 04.50 33734.12500 33734.18750  8.333  236 1';
    const [a, b] = [preliminary, definitive].map((row) => readIndices(row, 'kp.txt').indices);
    const hp = readIndices(HALF_HOUR, 'hp30.txt').indices;
    for (const files of [
      [a!, b!, hp],
      [b!, hp, a!],
    ]) {
      const { indices, messages } = mergeIndices(files);
      expect(indexAt(indices, 'kp', utc('2024-05-11T03:00Z'))).toBe(8.333);
      expect(indices.series.hp30!.values).toHaveLength(96);
      expect(messages.map(({ code }) => code)).toEqual(['index-files-differ']);
      expect(messages[0]!.text).toContain('2 intervals with two values');
    }
  });
});

/*
 * Facts of the files of GFZ Potsdam for 2016 (CC BY 4.0), counted by independent scripts.
 */
const THREE_HOURS = 'Kp_ap_2016_Jan-Jun.txt';
const threeHours = sampleText(THREE_HOURS);
it.skipIf(threeHours === null)(sampleTitle(THREE_HOURS, threeHours), () => {
  const { indices, rowsUsed, messages } = readIndices(threeHours!, THREE_HOURS);
  const { kp, ap } = indices.series;
  expect(rowsUsed).toBe(1456);
  expect(messages).toEqual([]);
  expect(Math.max(...kp!.values)).toBe(6.333);
  const greatest = [...kp!.startMs].filter((_, i) => kp!.values[i] === 6.333);
  expect(greatest.map((ms) => new Date(ms).toISOString().slice(5, 13))).toEqual([
    '03-06T21',
    '05-08T03',
    '05-08T21',
    '05-09T00',
    '06-14T18',
  ]);
  expect([...kp!.values].filter((value) => value >= 5)).toHaveLength(38);
  expect(ap!.values.reduce((a, b) => a + b) / 1456).toBeCloseTo(9.839, 3);
});

const SPRING = 'Kp_daily_2016_Mar-May.txt';
const spring = sampleText(SPRING);
it.skipIf(spring === null)(sampleTitle(SPRING, spring), () => {
  const { indices, rowsUsed } = readIndices(spring!, SPRING);
  expect(rowsUsed).toBe(92);
  expect(Math.max(...indices.series.kp!.values)).toBe(6.333);
  expect([...indices.series.kp!.values].filter((value) => value >= 5)).toHaveLength(22);
});
