import { describe, expect, it } from 'vitest';
import { formatMessage, readLogs } from '../../src/logs/index.js';
import { collect, logFile, readText, testFolder } from '../files.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix,corrections';
const row = (second: number, corrections: string): string =>
  `2025-03-04T09:00:${String(second).padStart(2, '0')}Z,A,47,8,500,fixed,${corrections}`;

const corrections = async (lines: readonly string[], layout: object = {}): Promise<string[]> =>
  (await readText(folder, [HEADER, ...lines].join('\n'), { layout })).positions.map(
    ({ extras }) => extras!.corrections,
  );

describe('the corrections column', () => {
  it('knows the words themselves in any case', async () => {
    expect(
      await corrections([row(0, 'Network'), row(1, ' single-base '), row(2, ''), row(3, 'SATELLITE')]),
    ).toEqual(['network', 'single-base', '', 'satellite']);
  });

  it('takes other words from the layout', async () => {
    const layout = { correctionValues: { VRS: 'virtual-base', 'own base': 'single-base', 3: 'network' } };
    expect(await corrections([row(0, 'vrs'), row(1, 'Own Base'), row(2, '3')], layout)).toEqual([
      'virtual-base',
      'single-base',
      'network',
    ]);
  });

  it('tells words that nobody has explained, with their rows', async () => {
    const text = [HEADER, row(0, 'A7'), row(1, 'network'), row(2, 'A7'), row(3, 'B')].join('\n');
    const { messages, positions } = await readText(folder, text);
    expect(positions).toHaveLength(4);
    expect(messages.map(formatMessage)).toEqual([
      'log.csv:2 [corrections] warning: Expected one of "single-base", "network", "virtual-base", "satellite" as corrections, came "A7" in 2 rows, "B" in 1 row: these count as not from a single base. Say in correctionValues of the layout what they mean.',
    ]);
  });

  it('is filled by the entry of the log where a cell is blank', async () => {
    const path = folder.write('c.csv', [HEADER, row(0, ''), row(1, 'single-base')].join('\n'));
    const log = { ...logFile(path, 'c.csv'), corrections: 'network' as const };
    const { positions } = await collect(readLogs([log], { timeZone: null }));
    expect(positions.map(({ extras }) => extras!.corrections)).toEqual(['network', 'single-base']);
  });
});

describe('base coordinates in a log', () => {
  const read = async (columns: string, cells: string, layout: object = {}) =>
    readText(
      folder,
      [
        `time,mark,latitude,longitude,height,fix,${columns}`,
        `2025-03-04T09:00:00Z,A,47,8,500,fixed,${cells}`,
      ].join('\n'),
      { layout },
    );

  it('may be in degrees, minutes and seconds with a decimal comma', async () => {
    const text = [
      'time;mark;latitude;longitude;height;fix;baseLatitude;baseLongitude;baseHeight',
      '2025-03-04T09:00:00Z;A;47 0 0,0 N;8 0 0,0 E;500,5;fixed;47 30 18,36 N;8 0 36,0 E;510,25',
    ].join('\n');
    const layout = { decimal: 'comma', delimiter: 'semicolon', units: { angle: 'dms' as const } };
    const { positions } = await readText(folder, text, { layout });
    expect(positions[0]!.extras!.baseLatitudeDeg).toBeCloseTo(47.5051, 12);
    expect(positions[0]!.extras!.baseLongitudeDeg).toBeCloseTo(8.01, 12);
    expect(positions[0]!.extras!.baseHeightM).toBe(510.25);
  });

  it('count in plan without a height, and not at all without a plan', async () => {
    const plan = await read('baseLatitude,baseLongitude', '47.1,8.1');
    expect(plan.positions[0]!.extras).toMatchObject({ baseLatitudeDeg: 47.1, baseHeightM: Number.NaN });
    const half = await read('baseLatitude,baseHeight', '47.1,500');
    expect(half.positions[0]!.extras!.baseLatitudeDeg).toBeNaN();
    expect(half.positions[0]!.extras!.baseHeightM).toBeNaN();
  });

  it('that cannot be set the row aside', async () => {
    const { setAside } = await read('baseLatitude,baseLongitude,baseHeight', '147.1,8.1,500');
    expect(setAside.map(({ reason, column, detail }) => [reason, column, detail])).toEqual([
      [
        'unreadable',
        'baseLatitude',
        'expected a latitude from -90 to 90 degrees, came 147.1 (are latitude and longitude swapped?)',
      ],
    ]);
  });

  it('are of the heights and frame of the log', async () => {
    const path = folder.write(
      'd.csv',
      'time,mark,latitude,longitude,height,fix,baseLatitude,baseLongitude,baseHeight\n2025-03-04T09:00:00Z,A,47,8,500,fixed,47.1,8.1,510\n',
    );
    const changes = { height: ({ heightM }: { heightM: number }) => heightM + 47.3 };
    const { positions } = await collect(
      readLogs([{ ...logFile(path, 'd.csv'), changes }], { timeZone: null }),
    );
    expect(positions[0]).toMatchObject({ heightM: 547.3, extras: { baseHeightM: 557.3 } });
    // Separations of rows are those of the rover.
    const rows = { ...changes, rowSeparations: true };
    const text = folder.write(
      'e.csv',
      'time,mark,latitude,longitude,height,geoidSeparation,fix,baseLatitude,baseLongitude,baseHeight\n2025-03-04T09:00:00Z,A,47,8,500,47.3,fixed,47.1,8.1,510\n',
    );
    const own = await collect(readLogs([{ ...logFile(text, 'e.csv'), changes: rows }], { timeZone: null }));
    expect(own.positions[0]!.extras).toMatchObject({ baseLatitudeDeg: 47.1, baseHeightM: Number.NaN });
  });
});

describe('constants of NMEA sentences', () => {
  const SENTENCES = [
    '$GPRMC,090000.00,A,4700.0000,N,00800.0000,E,0.0,0.0,040325,,,A*69',
    '$GPGGA,090000.00,4700.0000,N,00800.0000,E,4,12,0.8,453.2,M,46.8,M,1.0,0001*6A',
  ];
  const checksum = (line: string): string => {
    const body = line.slice(1, line.indexOf('*'));
    const sum = [...body].reduce((total, letter) => total ^ letter.charCodeAt(0), 0);
    return `$${body}*${sum.toString(16).toUpperCase().padStart(2, '0')}`;
  };
  const read = (constants: object, log: object = {}) => {
    const path = folder.write('log.nmea', `${SENTENCES.map(checksum).join('\n')}\n`);
    const file = { ...logFile(path, 'log.nmea'), layout: { kind: 'nmea' as const, constants }, ...log };
    return collect(readLogs([file], { timeZone: null }));
  };

  it('tell names, corrections and the base', async () => {
    const { positions } = await read(
      { pointNumber: 'A', base: 'B1', baseLatitude: '47.1', baseLongitude: '8.1', baseHeight: '510' },
      { corrections: 'virtual-base' },
    );
    expect(positions).toHaveLength(1);
    expect(positions[0]).toMatchObject({
      pointNumber: 'A',
      base: 'B1',
      extras: { corrections: 'virtual-base', baseLatitudeDeg: 47.1, baseHeightM: 510, station: '0001' },
    });
  });

  it('that are no numbers, or that sentences tell themselves, are refused', async () => {
    await expect(read({ baseLatitude: '47,1', baseLongitude: '8.1' })).rejects.toThrow(
      'The layout of this log cannot be used: baseLatitude: expected a number, came "47,1". Correct it.',
    );
    await expect(read({ antennaHeight: '1.8' })).rejects.toThrow(
      'constants of NMEA sentences may be mark, pointNumber, description, base, setup, rover, crew, baseLatitude, baseLongitude, baseHeight, tilt, corrections, support, date, came "antennaHeight", which the sentences tell themselves or cannot carry',
    );
  });
});
