import { describe, expect, it } from 'vitest';
import { type DelimitedLayout, formatMessage, readLogs } from '../../src/logs/index.js';
import { collect, logFile, type ReadOptions, readText, testFolder } from '../files.js';

const folder = testFolder();

const read = (lines: readonly string[], layout: Partial<DelimitedLayout>, options: ReadOptions = {}) =>
  readText(folder, `${lines.join('\n')}\n`, { ...options, layout });

async function only(lines: readonly string[], layout: Partial<DelimitedLayout>, options?: ReadOptions) {
  const { positions, setAside } = await read(lines, layout, options);
  expect(setAside).toEqual([]);
  expect(positions).toHaveLength(1);
  return positions[0]!;
}

/** Details of the rows that are set aside, with their places. */
async function findings(lines: readonly string[], layout: Partial<DelimitedLayout>, options?: ReadOptions) {
  const { setAside } = await read(lines, layout, options);
  return setAside.map(({ row, reason, column, detail }) => `${row} ${reason} ${column}: ${detail}`);
}

const HEADER = 'time,mark,latitude,longitude,height';
const ROW = '2025-03-04T09:00:00Z,CP1,47.01,8.0,500.0';

describe('constants', () => {
  it('stand for columns that are not there, and for blank cells', async () => {
    const constants = {
      mark: 'CP9',
      base: 'B2',
      crew: 'North',
      fix: 'float',
      pdop: '1.7',
      date: '2025-03-04',
    };
    const { positions } = await read(
      ['mark,latitude,longitude,height,crew', 'CP1,47.01,8.0,500.0,', ',47.01,8.0,500.0,South'],
      { constants },
    );
    expect(
      positions.map(({ mark, base, crew, fix, pdop, dateOnly }) => [mark, base, crew, fix, pdop, dateOnly]),
    ).toEqual([
      ['CP1', 'B2', 'North', 'float', 1.7, '2025-03-04'],
      ['CP9', 'B2', 'South', 'float', 1.7, '2025-03-04'],
    ]);
  });

  it('of the fix take the place of the column, and nothing is said of it', async () => {
    const { messages, positions } = await read([HEADER, ROW], { constants: { fix: 'fixed' } });
    expect([positions[0]!.fix, messages]).toEqual(['fixed', []]);
  });

  it('give the date to a column of times of day', async () => {
    const lines = ['Clock,mark,latitude,longitude,height', '09:00:00.5,CP1,47.01,8.0,500.0'];
    const layout = {
      constants: { date: '04.03.2025' },
      time: { format: 'dd.MM.yyyy HH:mm:ss.SSS', zone: 'UTC' },
    };
    expect((await only(lines, layout)).utcMs).toBe(Date.UTC(2025, 2, 4, 9, 0, 0, 500));
  });

  it('may be a coordinate, with the decimal mark of the log or a point', async () => {
    const lines = ['time;mark;latitude;longitude', '2025-03-04T09:00:00Z;CP1;47,01;8,0'];
    for (const height of ['500,25', '500.25']) {
      const layout = { decimal: 'comma', constants: { height } };
      expect((await only(lines, layout)).heightM).toBe(500.25);
    }
  });

  it('that are no number where one is needed are told with their value', async () => {
    const lines = ['time,mark,latitude,longitude', '2025-03-04T09:00:00Z,CP1,47.01,8.0'];
    expect(await findings(lines, { constants: { height: 'high' } })).toEqual([
      '2 unreadable height: expected a number, came "high"',
    ]);
  });
});

describe('values from the file name', () => {
  const readNamed = async (
    file: string,
    fromFileName: string,
    text = `mark,latitude,longitude,height\n${ROW.slice(21)}\n`,
  ) =>
    collect(
      readLogs([logFile(folder.write(file, text), file, { layout: { fromFileName } })], { timeZone: null }),
    );

  it('are those of its named groups, whatever the folder is called', async () => {
    const { positions } = await readNamed(
      '2020-01-01 NO/CREW_North_2025-03-04.csv',
      '^CREW_(?<crew>\\w+)_(?<date>\\d{4}-\\d{2}-\\d{2})',
    );
    expect(positions.map(({ crew, dateOnly, utcMs }) => [crew, dateOnly, utcMs])).toEqual([
      ['North', '2025-03-04', Number.NaN],
    ]);
  });

  it('go before constants', async () => {
    const file = 'R7.csv';
    const log = logFile(folder.write(file, `${HEADER}\n${ROW}\n`), file, {
      layout: { fromFileName: '^(?<rover>R\\d+)', constants: { rover: 'R1', crew: 'North' } },
    });
    const { positions } = await collect(readLogs([log], { timeZone: null }));
    expect([positions[0]!.rover, positions[0]!.crew]).toEqual(['R7', 'North']);
  });

  it('that the name does not give leave the rows without', async () => {
    const { positions, setAside, messages } = await readNamed('other.csv', '^(?<date>\\d{4}-\\d{2}-\\d{2})');
    expect([positions, setAside.length]).toEqual([[], 1]);
    expect(messages.map(formatMessage)[0]).toBe(
      'other.csv:1 [time] error: Expected a column for the time ("time", "date", "start", "gpsWeek"), came "mark", "latitude", "longitude", "height". Add the column or name it in the layout.',
    );
  });

  it.each([
    [
      '(?<date>\\d{4}',
      'a.csv error: Expected a regular expression as fromFileName, came "(?<date>\\\\d{4}": Invalid regular expression: /(?<date>\\d{4}/: Unterminated group. Correct it.',
    ],
    [
      '(\\d{4})',
      'a.csv error: Expected groups named like roles in fromFileName, such as (?<date>…), came no named group. Correct the pattern.',
    ],
    [
      '(?<day>\\d{4})',
      'a.csv error: Expected groups named like roles in fromFileName, such as (?<date>…), came the group "day". Correct the pattern.',
    ],
  ])('%s is refused', async (pattern, text) => {
    await expect(readNamed('a.csv', pattern)).rejects.toThrow(text);
  });
});

describe('antenna heights', () => {
  const lines = (rod: string) => [`${HEADER},antennaHeight`, `${ROW},${rod}`];

  it('are taken off only where heights are those of the antenna', async () => {
    expect((await only(lines('2.000'), {})).heightM).toBe(500);
    expect((await only(lines('2.000'), { heightOf: 'mark' })).heightM).toBe(500);
    expect((await only(lines('2.000'), { heightOf: 'antenna' })).heightM).toBe(498);
  });

  it('have the unit of heights, and may be a constant', async () => {
    const layout = { heightOf: 'antenna', units: { height: 'international-foot' } } as const;
    // 500 ft − 6.5 ft, a foot of 0.3048 m.
    expect((await only(lines('6.5'), layout)).heightM).toBeCloseTo(493.5 * 0.3048, 9);
    const constant = { ...layout, constants: { antennaHeight: '6.5' } };
    expect((await only([HEADER, ROW], constant)).heightM).toBeCloseTo(493.5 * 0.3048, 9);
  });

  it('that are missing or no number set the row aside: an antenna is never taken for a mark', async () => {
    const layout = { heightOf: 'antenna' } as const;
    const start =
      '2 unreadable antennaHeight: heights are those of the antenna: expected its height above the mark, came';
    expect(await findings(lines(''), layout)).toEqual([`${start} ""`]);
    expect(await findings(lines('two'), layout)).toEqual([`${start} "two"`]);
    expect(await findings([HEADER, ROW], layout)).toEqual([`${start} ""`]);
  });
});

describe('units', () => {
  const UTM = '+proj=utm +zone=32 +ellps=WGS84';
  // One place in the middle of zone 32, so that the easting is 500 000 m exactly, in three units.
  const place = async (
    easting: number,
    northing: number,
    height: number,
    units: DelimitedLayout['units'],
  ) => {
    const { latitudeDeg, longitudeDeg, heightM } = await only(
      ['time,mark,easting,northing,height', `2025-03-04T09:00:00Z,CP1,${easting},${northing},${height}`],
      { units },
      { coordinates: UTM },
    );
    return { latitudeDeg, longitudeDeg, heightM };
  };

  it('of plan and heights are one, or each its own', async () => {
    const metres = await place(500_000, 5_200_000, 480, undefined);
    expect(metres.longitudeDeg).toBeCloseTo(9, 10);
    // 1200/3937 m and 0.3048 m to the foot.
    const survey = 3937 / 1200;
    const cases = [
      await place(500_000 * survey, 5_200_000 * survey, 480 * survey, 'us-survey-foot'),
      await place(500_000 * survey, 5_200_000 * survey, 480 * survey, { length: 'us-survey-foot' }),
      await place(500_000 * survey, 5_200_000 * survey, 480, { length: 'us-survey-foot', height: 'metre' }),
      await place(500_000, 5_200_000, 480 / 0.3048, { height: 'international-foot' }),
      await place(500_000 / 0.3048, 5_200_000 / 0.3048, 480 * survey, {
        length: 'international-foot',
        height: 'us-survey-foot',
      }),
    ];
    for (const { latitudeDeg, longitudeDeg, heightM } of cases) {
      // 1e-11 degrees are a thousandth of a millimetre.
      expect(Math.abs(latitudeDeg - metres.latitudeDeg)).toBeLessThan(1e-11);
      expect(Math.abs(longitudeDeg - metres.longitudeDeg)).toBeLessThan(1e-11);
      expect(heightM).toBeCloseTo(480, 6);
    }
  });

  it('of angles may be degrees, minutes and seconds', async () => {
    const lines = [HEADER, '2025-03-04T09:00:00Z,CP1,47 00 36.0 N,W 8:30:00,500.0'];
    const { latitudeDeg, longitudeDeg } = await only(lines, { units: { angle: 'dms' } });
    expect([latitudeDeg, longitudeDeg]).toEqual([47.01, -8.5]);
    expect(await findings([HEADER, ROW.replace('47.01', '47 61 00 N')], { units: { angle: 'dms' } })).toEqual(
      ['2 unreadable latitude: expected degrees, minutes and seconds like 53 48 33.82 N, came "47 61 00 N"'],
    );
    expect(await findings(lines, {})).toEqual([
      '2 unreadable latitude: expected a number, came "47 00 36.0 N"; are these degrees, minutes and seconds (units: {angle: dms})?',
    ]);
  });
});

describe('lines at the top', () => {
  it('are passed over as many as the layout says, and rows keep their line numbers', async () => {
    const lines = ['Job: harbour, 2025', 'time,mark', HEADER, ROW];
    expect((await only(lines, { skipLines: 2 })).row).toBe(4);
  });

  it('are comments by the sign that the layout gives', async () => {
    const lines = ['// exported', HEADER, '//', ROW, '# no comment here'];
    const { positions, setAside } = await read(lines, { comment: '//' });
    expect([positions.length, setAside.map(({ row }) => row)]).toEqual([1, [5]]);
  });
});

describe('a log without a header', () => {
  const columns = { pointNumber: 1, latitude: 2, longitude: 3, height: 4, description: 5 };
  const layout = { header: false, columns, constants: { date: '2025-03-04' } } as const;
  const pointsOf = async (lines: readonly string[], other: Partial<DelimitedLayout> = layout) => {
    const { positions, setAside } = await read(lines, other);
    const points = positions.map(
      ({ pointNumber, heightM, description }) => `${pointNumber} ${heightM} ${description}`,
    );
    return [points, setAside.map(({ row }) => row)];
  };

  it('has its columns by number, from the first line on', async () => {
    expect(await pointsOf(['1,47.01,8.0,500.0,CHK CP1', '2,47.05,8.1,620.0,TREE'])).toEqual([
      ['1 500 CHK CP1', '2 620 TREE'],
      [],
    ]);
  });

  it('may have a line of names nevertheless', async () => {
    const { header: _, ...unsaid } = layout;
    const lines = ['Nr,B,L,H,Code', '1,47.01,8.0,500.0,CHK CP1'];
    expect(await pointsOf(lines, unsaid)).toEqual([['1 500 CHK CP1'], []]);
    // Where the layout says that there is none, it is a row that cannot be read.
    expect(await pointsOf(lines)).toEqual([['1 500 CHK CP1'], [1]]);
  });

  it('is not judged by its first row: a delimiter in its description, or no description', async () => {
    const rest = ['2,47.05,8.1,620.0,CHK CP2', '3,47.05,8.1,621.0,CHK CP2', '4,47.05,8.1,622.0,a, b, c'];
    const read3 = ['2 620 CHK CP2', '3 621 CHK CP2', '4 622 a, b, c'];
    expect(await pointsOf(['1,47.01,8.0,500.0,EP, left', ...rest])).toEqual([
      ['1 500 EP, left', ...read3],
      [],
    ]);
    // The shortened row might be cut off in its height.
    expect(await pointsOf(['1,47.01,8.0,500.0', ...rest])).toEqual([read3, [1]]);
    expect(await pointsOf(['1,47.01,8.0,500.0,', ...rest])).toEqual([['1 500 ', ...read3], []]);
  });

  it('may have more columns than the layout numbers', async () => {
    const { description: _, ...four } = columns;
    const lines = ['1,47.01,8.0,500.0,x,y', '2,47.05,8.1,620.0,x,y', '3,47.05,8.1,620.0,x,y,z'];
    expect(await pointsOf(lines, { ...layout, columns: four })).toEqual([['1 500 ', '2 620 '], [3]]);
  });

  it('that has fewer columns than the layout numbers is refused as a whole', async () => {
    const { messages, setAside } = await read(['1,47.01,8.0,500.0', '2,47.05,8.1,620.0'], layout);
    expect(messages.map(formatMessage)[0]).toBe(
      'log.csv:1 [description] error: The layout names column 5 for description, the rows have 4 cells. Correct the layout.',
    );
    expect(setAside).toHaveLength(2);
  });

  it('cannot have columns by name', async () => {
    const { messages } = await read(['1,47.01,8.0,500.0,CP1'], {
      ...layout,
      columns: { ...columns, height: 'H' },
    });
    expect(messages.map(formatMessage)[0]).toBe(
      'log.csv:1 [height] error: The layout names a column "H" for height, the file has no header. Give the number of the column, from 1.',
    );
  });
});

describe('ragged rows', () => {
  const header = `${HEADER},fix,satellites,pdop,age`;
  const full = `${ROW},fixed,14,1.3,1.0`;

  it('are used when they are short and lack nothing that is needed', async () => {
    const { positions, setAside } = await read([header, full, `${ROW},fixed,14,1.3`, `${ROW},fixed,14`], {});
    expect(setAside).toEqual([]);
    expect(positions.map(({ satellites, pdop, ageSeconds }) => [satellites, pdop, ageSeconds])).toEqual([
      [14, 1.3, 1],
      [14, 1.3, Number.NaN],
      [14, Number.NaN, Number.NaN],
    ]);
  });

  it('are set aside when they end with a value that is needed, for it may be cut off, or before it', async () => {
    for (const line of [`${ROW},fixed`, ROW, '2025-03-04T09:00:00Z,CP1']) {
      expect(await findings([header, line], {})).toEqual([
        `2 unreadable null: expected 9 cells as in the header, came ${line.split(',').length}`,
      ]);
    }
  });

  it('a short last line without a line end is never used', async () => {
    const cut = [header, full, `${ROW},fixed,14,1.`].join('\n');
    expect((await readText(folder, cut)).setAside.map(({ row }) => row)).toEqual([3]);
    const whole = [header, full, full].join('\n');
    expect((await readText(folder, whole)).setAside).toEqual([]);
  });

  it('need no more than one of several names', async () => {
    // The description names a mark too, but the point number does it in this row.
    const lines = ['time,pointNumber,latitude,longitude,height,code number,description', `${ROW},7`];
    expect((await only(lines, {})).pointNumber).toBe('CP1');
  });

  it('a description at the end may hold the delimiter, in quotes anywhere', async () => {
    const described = await read(
      [
        `${HEADER},description`,
        `${ROW},CHK, windy, 5" rod`,
        `${ROW},CHK, windy`,
        `${ROW},"CHK, ""windy"""`,
        `${ROW},CHK`,
      ],
      {},
    );
    expect(described.positions.map(({ description }) => description)).toEqual([
      // Beside a quote cells are cut one by one, and blanks between them are lost.
      'CHK,windy,5" rod',
      'CHK, windy',
      'CHK, "windy"',
      'CHK',
    ]);
    const inside = await read(
      [
        'time,mark,description,latitude,longitude,height',
        '2025-03-04T09:00:00Z,CP1,CHK, windy,47.01,8.0,500.0',
      ],
      {},
    );
    expect(inside.positions).toEqual([]);
    expect(inside.setAside).toHaveLength(1);
  });
});

describe('GPS week and seconds', () => {
  const HEAD = 'gpsWeek,gpsSeconds,mark,latitude,longitude,height';
  const at = (week: string, seconds: string) => [HEAD, `${week},${seconds},CP1,47.01,8.0,500.0`];

  it('are a moment 18 s ahead of UTC since 2017', async () => {
    // Week 2356 began on Sunday 2025-03-02, 2356 weeks after 1980-01-06.
    expect((await only(at('2356', '0'), {})).utcMs).toBe(Date.UTC(2025, 2, 1, 23, 59, 42));
    expect((await only(at('2356', '604799.5'), {})).utcMs).toBe(Date.UTC(2025, 2, 8, 23, 59, 41, 500));
  });

  it('have the decimal mark of the log, and may be constants', async () => {
    const lines = ['gpsSeconds;mark;latitude;longitude;height', '18,25;CP1;47,01;8,0;500,0'];
    const layout = { decimal: 'comma', constants: { gpsWeek: '2356' } };
    expect((await only(lines, layout)).utcMs).toBe(Date.UTC(2025, 2, 2, 0, 0, 0, 250));
  });

  it('of a week counted from a rollover are refused, with the remedy', async () => {
    // 2356 − 2 · 1024 = 308.
    expect(await findings(at('308', '18'), {})).toEqual([
      '2 unreadable gpsSeconds: expected a full GPS week of at least 1024, came 308, which may mean several eras; add the multiple of 1024 that was left out',
    ]);
  });

  it('that cannot be are told', async () => {
    expect(await findings(at('2356', '604800'), {})).toEqual([
      '2 unreadable gpsSeconds: expected seconds of the GPS week from 0 to below 604800, came 604800',
    ]);
    expect(await findings(at('2356', '0x10'), {})).toEqual([
      '2 unreadable gpsSeconds: expected a GPS week and its seconds, came "2356 0x10"',
    ]);
    expect(await findings(at('2356', ''), {})).toEqual([
      '2 outside-study gpsSeconds: the row has neither time nor date; state the date in the constants of the layout or take it fromFileName',
    ]);
  });
});

describe('date and time of day apart', () => {
  const lines = (date: string, timeOfDay: string) => [
    'date,timeOfDay,mark,latitude,longitude,height',
    `${date},${timeOfDay},CP1,47.01,8.0,500.0`,
  ];

  it.each([
    ['yyyy-MM-dd HH:mm:ss', '2025-03-04', '09:00:00'],
    ['d MMM yyyy HH:mm', '4 Mar 2025', '09:00'],
    ["dd/MM/'20'yy hh:mm:ss a", '04/03/25', '09:00:00 AM'],
    ["'day' dd.MM.yyyy H:mm", 'day 04.03.2025', '9:00'],
    ['day-of-year', '2025-063', '09:00:00'],
  ])('%s', async (format, date, timeOfDay) => {
    const layout = { time: { format, zone: 'UTC' } };
    const timed = await only(lines(date, timeOfDay), layout);
    expect([timed.utcMs, timed.dateOnly]).toEqual([Date.UTC(2025, 2, 4, 9), '']);
    // A row without a time of day keeps its date.
    const dated = await only(lines(date, ''), layout);
    expect([dated.utcMs, dated.dateOnly]).toEqual([Number.NaN, '2025-03-04']);
  });

  it('a row without a date is set aside with the remedy', async () => {
    expect(await findings(lines('', '09:00:00'), { time: { zone: 'UTC' } })).toEqual([
      '2 outside-study timeOfDay: the row has neither time nor date; state the date in the constants of the layout or take it fromFileName',
    ]);
  });
});

describe('a layout that cannot be', () => {
  it.each([
    [
      { time: { format: 'yyyy-QQ' } },
      /^log\.csv error: The layout of this log cannot be used: format: expected /,
    ],
    [
      { time: { zone: 'Mars/Olympus' } },
      /^log\.csv error: The layout of this log cannot be used: zone: expected /,
    ],
  ])('%j is a mistake of the user', async (layout, text) => {
    await expect(read([HEADER, ROW], layout)).rejects.toThrow(text);
  });
});

describe('codes of the fix column', () => {
  it('may be numbers', async () => {
    const fixValues = { 1: 'fixed', 2: 'float', 5: 'other' } as const;
    const { positions, messages } = await read(
      [`${HEADER},Q`, `${ROW},1`, `${ROW},2`, `${ROW},5`, `${ROW},fixed`],
      { fixValues },
    );
    expect(positions.map(({ fix }) => fix)).toEqual(['fixed', 'float', 'other', 'fixed']);
    expect(messages).toEqual([]);
  });
});
