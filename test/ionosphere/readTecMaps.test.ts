import { describe, expect, it } from 'vitest';
import { joinMaps, outsideMapsNote, readTecMaps, type TecMaps, tecAt } from '../../src/ionosphere/index.js';
import { exponentLine, ionexLines, ionexText, labelled, type MapText } from './ionexText.js';
import { sampleText, sampleTitle } from './samples.js';

const DAY = [2025, 3, 1];
const plane = (latitude: number, longitude: number): number => Math.round(100 + latitude + 2 * longitude);
const map = (hour: number, more: Partial<MapText> = {}): MapText => ({
  epoch: [...DAY, hour, 0, 0],
  value: plane,
  ...more,
});
const mapsOf = (text: string): TecMaps => readTecMaps(text, 'm.25i').maps!;

describe('readTecMaps', () => {
  it('reads grids in either direction, maps, errors and heights', () => {
    const { maps, messages } = readTecMaps(
      ionexText([
        map(0),
        map(2, { value: (latitude, longitude) => plane(latitude, longitude) + 7 }),
        map(0, { kind: 'RMS', value: () => 12 }),
        map(2, { kind: 'HEIGHT', value: () => 4000 }),
      ]),
      'm.25i',
    );
    expect(messages).toEqual([]);
    expect(maps).toMatchObject({
      system: 'GNSS',
      shellHeightKm: 450,
      baseRadiusKm: 6371,
      mappingFunction: 'COSZ',
      elevationCutoffDeg: 10,
      intervalSeconds: 7200,
    });
    expect([...maps!.latitudesDeg]).toEqual([50, 45, 40]);
    expect([...maps!.longitudesDeg]).toEqual([-10, -5, 0, 5, 10]);
    expect([...maps!.epochsMs]).toEqual([Date.UTC(2025, 2, 1), Date.UTC(2025, 2, 1, 2)]);
    expect([...maps!.tec[0]!.slice(0, 5)]).toEqual([13, 14, 15, 16, 17]);
    expect([...maps!.tec[1]!.slice(10)]).toEqual([12.7, 13.7, 14.7, 15.7, 16.7]);
    expect([...maps!.rms[0]!]).toEqual(Array(15).fill(1.2));
    expect(maps!.rms[1]).toBeNull();
    expect(maps!.heights[0]).toBeNull();
    expect([...maps!.heights[1]!]).toEqual(Array(15).fill(400));
  });

  it('gives the same field from a grid that runs the other way', () => {
    const there = mapsOf(ionexText([map(0)]));
    const back = mapsOf(ionexText([map(0)], { latitudes: [40, 50, 5], longitudes: [10, -10, -5] }));
    for (const [latitudeDeg, longitudeDeg] of [
      [50, -10],
      [40, 10],
      [46.3, 1.7],
      [41.1, -8.9],
    ] as const)
      expect(tecAt(back, back.epochsMs[0]!, { latitudeDeg, longitudeDeg })).toBeCloseTo(
        tecAt(there, there.epochsMs[0]!, { latitudeDeg, longitudeDeg }),
        10,
      );
  });

  it('cuts values at their columns, where neighbours touch, and keeps 9999 missing', () => {
    const text = ionexText([
      map(0, { value: (_, longitude) => (longitude === 0 ? 9999 : 10_000 + longitude) }),
    ]);
    expect(text).toContain('1000510010');
    const { maps, messages } = readTecMaps(text, 'm.25i');
    expect([...maps!.tec[0]!.slice(0, 5)]).toEqual([999, 999.5, Number.NaN, 1000.5, 1001]);
    expect(messages).toMatchObject([{ code: 'map-missing-values', severity: 'info', row: 17 }]);
  });

  it('lets an exponent in a map hold from there on, and says where it does in silence', () => {
    const before = (row: number) => (row === 1 ? [exponentLine(0), labelled('invented', 'COMMENT')] : []);
    const { maps, messages } = readTecMaps(
      ionexText([map(0, { value: () => 20, before }), map(2, { value: () => 20 })], { exponent: -2 }),
      'm.25i',
    );
    expect([...maps!.tec[0]!]).toEqual([...Array(5).fill(0.2), ...Array(10).fill(20)]);
    expect([...maps!.tec[1]!]).toEqual(Array(15).fill(20));
    expect(messages.map(({ code }) => code)).toEqual(['map-exponent']);
    const plain = mapsOf(ionexText([map(0, { value: () => 20 })], { exponent: null }));
    expect(plain.tec[0]![0]).toBe(2);
  });

  it('takes 24:00 for the next midnight', () => {
    const maps = mapsOf(ionexText([map(22), map(24)]));
    expect(new Date(maps.epochsMs[1]!).toISOString()).toBe('2025-03-02T00:00:00.000Z');
  });

  it('reads LF, CRLF and lone CR, cut trailing blanks and a byte-order mark alike', () => {
    const lines = ionexLines([map(0), map(2)]);
    const plain = mapsOf(lines.join('\n'));
    for (const text of [
      lines.join('\r\n'),
      lines.join('\r'),
      lines.map((line) => line.trimEnd()).join('\n'),
      `\uFEFF${lines.join('\n')}`,
    ])
      expect(mapsOf(text)).toEqual(plain);
  });

  it('passes over auxiliary data, even where it holds header labels', () => {
    const lines = ionexLines([map(0)]);
    lines.splice(
      -1 + lines.findIndex((line) => line.includes('END OF HEADER')),
      0,
      labelled('BIASES', 'START OF AUX DATA'),
      labelled('    01    -7.516     0.007', 'PRN / BIAS / RMS'),
      labelled('oops', 'EXPONENT'),
      labelled('BIASES', 'END OF AUX DATA'),
    );
    expect(mapsOf(lines.join('\n'))).toEqual(mapsOf(ionexText([map(0)])));
  });

  it('keeps the maps before the end of a file that breaks off', () => {
    const lines = ionexLines([map(0), map(2)]);
    const { maps, messages } = readTecMaps(lines.slice(0, -3).join('\n'), 'm.25i');
    expect(maps!.tec).toHaveLength(1);
    expect(messages.map(({ code, severity, row }) => [code, severity, row])).toEqual([
      ['map-file-truncated', 'warning', lines.length - 3],
      ['map-count', 'warning', null],
    ]);
    expect(messages[0]!.text).toBe(
      'Expected a row of values, came the end of the file. Get the file again. The one map of TEC before it is used.',
    );
  });

  it('misses the last map that the header announces', () => {
    const { messages } = readTecMaps(ionexText([map(0), map(2)], { mapCount: 3 }), 'm.25i');
    expect(messages.map(({ text }) => text)).toEqual([
      'Expected 3 maps from 2025-03-01 00:00 UTC to 2025-03-01 02:00 UTC as the header says, came 2 maps of TEC from 2025-03-01 00:00 UTC to 2025-03-01 02:00 UTC. Times outside them have no TEC: get the file again if it should hold more.',
    ]);
  });

  it('tells of a gap, of a repeated epoch, and of maps that match none', () => {
    const codes = (maps: readonly MapText[]): string[] =>
      readTecMaps(ionexText(maps), 'm.25i').messages.map(({ code }) => code);
    expect(codes([map(0), map(4)])).toEqual(['map-gap']);
    expect(codes([map(0), map(0), map(2)])).toEqual(['map-repeated']);
    expect(codes([map(0), map(2, { kind: 'RMS' })])).toEqual(['map-unmatched']);
  });
});

describe('a faulty map file', () => {
  const lines = ionexLines([map(0)]);
  const at = (part: string): number => lines.findIndex((line) => line.includes(part));
  const changed = (part: string, line: string | null): string => {
    const copy = [...lines];
    copy.splice(at(part), 1, ...(line === null ? [] : [line]));
    return copy.join('\n');
  };

  it.each<[string, string, string, number | null, string]>([
    ['nothing', '', 'map-layout-unknown', null, 'came an empty file'],
    ['another file', 'time,tec\n1,2', 'map-layout-unknown', 1, 'came "time,tec"'],
    [
      'another version',
      changed('VERSION', labelled('     2.0            I', 'IONEX VERSION / TYPE')),
      'map-layout-unknown',
      1,
      'Expected version 1.0 or 1.1, came 2',
    ],
    [
      'another type',
      changed('VERSION', labelled('     1.0            OBSERVATION', 'IONEX VERSION / TYPE')),
      'map-layout-unknown',
      1,
      'came "OBSERVATION"',
    ],
    [
      'no grid',
      changed('LAT1', null),
      'map-header-incomplete',
      at('END OF HEADER'),
      '"LAT1 / LAT2 / DLAT" is missing',
    ],
    [
      'an impossible grid',
      changed('LAT1', labelled('    50.0  40.0   3.0', 'LAT1 / LAT2 / DLAT')),
      'map-header-incomplete',
      at('END OF HEADER') + 1,
      'came 50 to 40 by 3',
    ],
    [
      'several shells',
      changed('HGT1', labelled('   350.0 550.0 100.0', 'HGT1 / HGT2 / DHGT')),
      'map-three-dimensional',
      at('END OF HEADER') + 1,
      'came shells from 350 to 550 km',
    ],
    [
      'no end of the header',
      lines.slice(0, 8).join('\n'),
      'map-file-truncated',
      8,
      'Expected the label "END OF HEADER"',
    ],
    [
      'a word in the header',
      changed('INTERVAL', labelled('  oops', 'INTERVAL')),
      'map-row-unreadable',
      at('INTERVAL') + 1,
      'came "  oops"',
    ],
    [
      'a word among values',
      changed('  130  140', '  130  1x0  150  160  170'),
      'map-row-unreadable',
      at('  130  140') + 1,
      'in columns 6 to 10 of a row of values, came "  1x0"',
    ],
    [
      'a row of values that is short',
      changed('  130  140', '  130  140  150  160'),
      'map-row-unreadable',
      at('  130  140') + 1,
      'in columns 21 to 25 of a row of values, came ""',
    ],
    [
      'a row of values that is long',
      changed('  130  140', '  130  140  150  160  170  180'),
      'map-row-unreadable',
      at('  130  140') + 1,
      'came "  180"',
    ],
    [
      'a date that does not exist',
      changed('EPOCH OF CURRENT', labelled('  2025     2    30     0     0     0', 'EPOCH OF CURRENT MAP')),
      'map-row-unreadable',
      at('EPOCH OF CURRENT') + 1,
      'Expected a date and a time of day',
    ],
    [
      'no epoch',
      changed('EPOCH OF CURRENT', null),
      'map-row-unreadable',
      at('START OF TEC') + 1,
      'The epoch of the map is missing',
    ],
    [
      'another grid in a map',
      changed('  45.0 -10.0', labelled('    46.0 -10.0  10.0   5.0 450.0', 'LAT/LON1/LON2/DLON/H')),
      'map-row-unreadable',
      at('  45.0 -10.0') + 1,
      'came latitude 46',
    ],
    ['no maps', ionexText([]), 'map-none', null, 'Expected at least one map of TEC'],
  ])('with %s is named with its line', (_, text, code, row, part) => {
    const { maps, messages } = readTecMaps(text, 'm.25i');
    expect(maps).toBeNull();
    expect(messages).toHaveLength(1);
    expect(messages[0]).toMatchObject({ severity: 'error', code, file: 'm.25i', row });
    expect(messages[0]!.text).toContain(part);
  });

  it('with a latitude left out is named', () => {
    const copy = [...lines];
    copy.splice(at('  45.0 -10.0'), 2);
    const { messages } = readTecMaps(copy.join('\n'), 'm.25i');
    expect(messages[0]!.text).toContain('each of the 3 latitudes in the map, came none for 45 degrees');
  });
});

describe('joinMaps', () => {
  const day = (date: number, tec: number): TecMaps =>
    mapsOf(
      ionexText(
        [0, 12, 24].map((hour) => ({ epoch: [2025, 3, date, hour, 0, 0], value: () => tec })),
        { intervalSeconds: 43_200 },
      ),
    );
  const place = { latitudeDeg: 45, longitudeDeg: 0 };

  it('makes one series of days, midnight from the day that begins', () => {
    const { maps, messages } = joinMaps([day(2, 300), day(1, 100)]);
    expect(messages).toEqual([]);
    expect([...maps.epochsMs].map((ms) => new Date(ms).getUTCHours())).toEqual([0, 12, 0, 12, 0]);
    const at = (hour: number): number => tecAt(maps, Date.UTC(2025, 2, 1, hour), place, 'linear');
    expect([0, 12, 18, 24, 36].map(at)).toEqual([10, 10, 20, 30, 30]);
  });

  it('does not reach over a day whose file is absent', () => {
    const { maps } = joinMaps([day(1, 100), day(4, 100)]);
    expect(tecAt(maps, Date.UTC(2025, 2, 3), place)).toBeNaN();
    const times = [Date.UTC(2025, 2, 1, 5), Date.UTC(2025, 2, 3)];
    expect(outsideMapsNote(maps, times)!.text).toBe(
      'Expected maps for 2 times, came maps from 2025-03-01 00:00 UTC to 2025-03-05 00:00 UTC: 1 of them lie outside or in a gap, from 2025-03-03 to 2025-03-03, and have no TEC. Give the map files of these days.',
    );
    expect(outsideMapsNote(maps, [times[0]!])).toBeNull();
  });

  it('leaves out another grid, and tells of files of the same day', () => {
    const other = mapsOf(ionexText([map(0)], { heightKm: 350 }));
    expect(joinMaps([day(1, 100), other]).messages.map(({ code }) => code)).toEqual(['map-other-grid']);
    const twice = joinMaps([day(1, 100), day(1, 200)]);
    expect(twice.messages.map(({ text }) => text)).toEqual([
      'Expected map files of different times, came 3 epochs in more than one file. The map of the file that begins later is used; leave out the other.',
    ]);
    expect(twice.maps.epochsMs).toHaveLength(3);
  });
});

/* Public maps of the IGS: values computed by an independent script. */
const JPL = 'jplg0010.17i.gz';
const jpl = sampleText(JPL);
describe.skipIf(jpl === null)(sampleTitle(JPL, jpl), () => {
  const { maps, messages } = jpl === null ? { maps: null, messages: [] } : readTecMaps(jpl, JPL);
  const hours = (value: number): number => Date.UTC(2017, 0, 1) + value * 3_600_000;

  it('holds 13 maps of TEC and of its errors', () => {
    expect(messages).toEqual([]);
    expect(maps!.tec).toHaveLength(13);
    expect(maps!.rms.every((one) => one !== null)).toBe(true);
    expect(maps!.shellHeightKm).toBe(450);
  });

  it.each([
    [52.5, 5, 5.3],
    [50, 5, 6.4],
    [0, -75, 24.1],
    [-12.5, -75, 26.3],
  ])('has at %d, %d the node %d TECU', (latitudeDeg, longitudeDeg, tecu) => {
    expect(tecAt(maps!, hours(0), { latitudeDeg, longitudeDeg })).toBe(tecu);
  });

  it.each([
    [13.25, 52.2, 6.9, 8.5254, 9.6446, 8.5037, 9.7301],
    [18.5, -12.3, -76.8, 34.5909, 34.1375, 34.1117, 33.3476],
    [12.75, 52.2, 6.9, 8.4674, 9.5079, 8.4892, 9.7717],
  ])(
    'gives at %d h in the four schemes',
    (hour, latitudeDeg, longitudeDeg, nearest, turned, linear, rotated) => {
      const at = (scheme: Parameters<typeof tecAt>[3]): number =>
        tecAt(maps!, hours(hour), { latitudeDeg, longitudeDeg }, scheme);
      expect(at('nearest')).toBeCloseTo(nearest, 4);
      expect(at('nearest-rotated')).toBeCloseTo(turned, 4);
      expect(at('linear')).toBeCloseTo(linear, 4);
      expect(at('rotated')).toBeCloseTo(rotated, 4);
    },
  );
});

const CODE = 'CKMG0090.21I';
const code = sampleText(CODE);
it.skipIf(code === null)(sampleTitle(CODE, code), () => {
  const { maps, messages } = readTecMaps(code!, CODE);
  expect(messages).toEqual([]);
  expect([maps!.tec.length, maps!.latitudesDeg.length, maps!.longitudesDeg.length]).toEqual([25, 71, 73]);
  expect(maps!.rms.every((one) => one === null)).toBe(true);
  expect(maps!.shellHeightKm).toBe(350);
  const all = maps!.tec.flatMap((one) => [...one]);
  expect([all.reduce((a, b) => Math.min(a, b)), all.reduce((a, b) => Math.max(a, b))]).toEqual([9.2, 27.2]);
  const mean = (map: number): number => maps!.tec[map]!.reduce((a, b) => a + b) / maps!.tec[map]!.length;
  expect(mean(0)).toBeCloseTo(11.089, 3);
  expect(mean(6)).toBeCloseTo(11.062, 3);
  const at = (hour: number, latitudeDeg: number, longitudeDeg: number): number =>
    tecAt(maps!, Date.UTC(2021, 0, 9, hour), { latitudeDeg, longitudeDeg });
  expect(at(0, -6, 106.8)).toBeCloseTo(9.315, 3);
  expect(at(6, -6, 106.8)).toBeCloseTo(24.728, 3);
  expect(at(6, 51.986, 4.388)).toBeCloseTo(9.2, 3);
});
