import { describe, expect, it } from 'vitest';
import { formatMessage } from '../../src/logs/index.js';
import { readNmea } from '../../src/logs/nmea/readNmea.js';
import { testFolder } from '../files.js';
import { gga, gsa, gst, readSentences, rmc, sentence, times } from './sentences.js';

const folder = testFolder();
const DATE = { date: '2025-03-01' };

describe('readNmea', () => {
  it('reads whole blocks over midnight at the end of a month', async () => {
    // Checksums of the first block were formed in another language.
    const { rowsRead, positions, setAside, messages } = await readSentences(folder, [
      '$GNGGA,235959.00,4807.0380000,N,01131.0000000,E,4,12,0.6,545.400,M,46.900,M,1.0,0031*57',
      '$GNGSA,A,3,04,05,,09,12,,,24,,,,,2.5,1.3,2.1*27',
      '$GLGSA,A,3,65,66,,,,,,,,,,,2.5,1.3,2.1*2B',
      '$GNRMC,235959.00,A,4807.038,N,01131.000,E,0.0,0.0,310125,,,R*54',
      '$GNGST,235959.00,0.006,0.023,0.020,273.6,0.006,0.008,0.031*41',
      '$GPGSV,3,1,11,03,03,111,00,04,15,270,00,06,01,010,00,13,06,292,00*74',
      gga('000000.00', { latitude: '3352.1230000,S', longitude: '07039.5000000,W', quality: '5', age: '' }),
      gsa('1.7'),
      rmc('000000.00', '010225'),
    ]);
    expect(rowsRead).toBe(2);
    expect(setAside).toEqual([]);
    expect(messages).toEqual([]);
    expect(times(positions)).toEqual(['2025-01-31T23:59:59.000Z', '2025-02-01T00:00:00.000Z']);
    const [first, second] = positions;
    expect(first).toEqual({
      file: 'rover.nmea',
      row: 1,
      utcMs: Date.UTC(2025, 0, 31, 23, 59, 59),
      dateOnly: '',
      mark: '',
      pointNumber: '',
      description: '',
      base: '',
      setup: '',
      rover: '',
      crew: '',
      fix: 'fixed',
      epochs: 1,
      latitudeDeg: expect.closeTo(48.1173, 12),
      longitudeDeg: expect.closeTo(11 + 31 / 60, 12),
      // 545.4 + 46.9
      heightM: expect.closeTo(592.3, 9),
      satellites: 12,
      pdop: 2.5,
      ageSeconds: 1,
      // Root mean square of 6 and 8 mm: the square root of 50.
      horizontalSigmaM: expect.closeTo(0.00707107, 8),
      verticalSigmaM: 0.031,
      extras: expect.objectContaining({ station: '0031', corrections: '' }),
    });
    expect(second).toMatchObject({
      row: 7,
      fix: 'float',
      latitudeDeg: expect.closeTo(-(33 + 52.123 / 60), 12),
      longitudeDeg: -70.65833333333333,
      pdop: 1.7,
      ageSeconds: Number.NaN,
      horizontalSigmaM: Number.NaN,
    });
  });

  it('adds a negative separation', async () => {
    const line = '$GPGGA,172814.0,3723.46587704,N,12202.26957864,W,2,6,1.2,18.893,M,-25.669,M,2.0,0031*4F';
    const { positions } = await readSentences(folder, [line], DATE);
    // 18.893 − 25.669; 37 + 23.46587704 / 60; −(122 + 2.26957864 / 60)
    expect(positions[0]!.heightM).toBeCloseTo(-6.776, 9);
    expect(positions[0]!.latitudeDeg).toBeCloseTo(37.391097950667, 12);
    expect(positions[0]!.longitudeDeg).toBeCloseTo(-122.037826310667, 12);
  });

  it.each([
    ['0', 'other'],
    ['1', 'other'],
    ['2', 'other'],
    ['3', 'other'],
    ['4', 'fixed'],
    ['5', 'float'],
    ['6', 'other'],
    ['7', 'other'],
    ['8', 'other'],
    ['9', 'other'],
    ['', 'other'],
    ['44', 'other'],
  ])('quality %j is %s', async (quality, fix) => {
    const { positions } = await readSentences(folder, [gga('101500.00', { quality })], DATE);
    expect(positions[0]!.fix).toBe(fix);
    expect(Number.isNaN(positions[0]!.latitudeDeg)).toBe(quality === '0');
  });

  it.each([
    ['empty', sentence('GPGGA,101500.00,,,,,0,00,99.9,,,,,,')],
    [
      'zeros with quality 0',
      gga('101500.00', { latitude: '0000.000,N', longitude: '00000.000,E', quality: '0' }),
    ],
    ['blank longitude', gga('101500.00', { longitude: ',' })],
    ['blank height', gga('101500.00', { height: '' })],
  ])('a sentence without a position has no coordinates, never 0, 0: %s', async (_, line) => {
    const { positions, setAside, messages } = await readSentences(folder, [line], DATE);
    expect(setAside).toEqual([]);
    expect(messages).toEqual([]);
    const { latitudeDeg, longitudeDeg, heightM, utcMs } = positions[0]!;
    expect([latitudeDeg, longitudeDeg, heightM]).toEqual([Number.NaN, Number.NaN, Number.NaN]);
    expect(utcMs).toBe(Date.UTC(2025, 2, 1, 10, 15));
  });

  it('sets aside a sentence with neither time nor position', async () => {
    const { rowsRead, setAside } = await readSentences(folder, ['$GPGGA,,,,,,0,,,,,,,,*66'], DATE);
    expect(rowsRead).toBe(1);
    expect(setAside).toMatchObject([{ row: 1, reason: 'no-position' }]);
  });

  it.each<[string, string, string | null, string]>([
    [
      'no separation',
      gga('101500', { separation: '' }),
      'geoidSeparation',
      'expected the geoid separation, came a blank field: the height is orthometric, and an ellipsoidal height cannot be formed; state geoid: constant or grid under the heights of this log',
    ],
    ['time', gga('106000'), 'time', 'expected a time of day hhmmss, came "106000"'],
    ['no time', gga(''), 'time', 'expected a time of day hhmmss, came ""'],
    [
      'latitude',
      gga('101500', { latitude: '4867.038,N' }),
      'latitude',
      'expected ddmm.mmm with N or S, came "4867.038,N"',
    ],
    [
      'hemisphere',
      gga('101500', { longitude: '01131.000,' }),
      'longitude',
      'expected dddmm.mmm with E or W, came "01131.000,"',
    ],
    ['height', gga('101500', { height: '5x' }), 'height', 'expected a height in metres, came "5x,M"'],
    [
      'height of no place',
      gga('101500', { height: '1e6' }),
      'height',
      'expected a height from -10000 to 100000 metres, came 1000046.9',
    ],
    [
      'feet',
      sentence('GPGGA,101500,4807.038,N,01131.000,E,4,12,0.6,545.4,F,46.9,M,,'),
      'height',
      'expected a height in metres, came "545.4,F"',
    ],
    [
      'decimal commas',
      sentence('GPGGA,101500,4807,038,N,01131,000,E,4,12,0,6,545,4,M,46,9,M,,'),
      null,
      'expected 14 fields in a GGA sentence, came 19',
    ],
    [
      'cut',
      gga('101500').slice(0, 40),
      null,
      'expected a whole sentence from $ to its checksum, came a part of one',
    ],
    [
      'no checksum',
      gga('101500').slice(0, -3),
      null,
      'expected a sentence that ends with its checksum, came one without, which may be damaged unseen',
    ],
    [
      'checksum',
      '$GPGGA,121505,4807.038,N,01131.324,E,1,08,0.9,133.4,M,46.9,M, , *42',
      'checksum',
      'expected the checksum "42" that the sentence states, came characters with "48"',
    ],
  ])('sets a row aside as unreadable: %s', async (_, line, column, detail) => {
    const { rowsRead, positions, setAside } = await readSentences(folder, [gga('101459'), line], DATE);
    expect(rowsRead).toBe(2);
    expect(positions).toHaveLength(1);
    expect(setAside).toEqual([{ file: 'rover.nmea', row: 2, reason: 'unreadable', column, detail }]);
  });

  it('reads on through noise, split and doubled sentences, and any line ends', async () => {
    const [a, b, c] = [gga('101500.00'), gga('101501.00'), gga('101502.00')];
    const bytes = Buffer.concat([
      Buffer.from([0xb5, 0x62, 0x01, 0x07, 0x00, 0x24, 0xff]),
      Buffer.from(`${a}\n`),
      Buffer.from([0xd3, 0x00, 0x13, 0x0d, 0x0a]),
      Buffer.from(`${b.slice(0, 30)}\r\n${b.slice(30)}\r${b}${c}\n\n\n`),
      Buffer.from([0xc3]),
    ]);
    const { rowsRead, positions, setAside, messages } = await readSentences(folder, bytes, DATE);
    expect(rowsRead).toBe(4);
    expect(positions.map(({ row }) => row)).toEqual([1, 5, 5]);
    expect(times(positions).map((time) => time.slice(17, 19))).toEqual(['00', '01', '02']);
    expect(setAside.map(({ row, detail }) => [row, detail])).toEqual([
      [3, 'expected a whole sentence from $ to its checksum, came a part of one'],
    ]);
    expect(messages.map(formatMessage)).toEqual([
      'rover.nmea:2 info: Expected NMEA 0183 sentences, came 3 lines of other content: passed over. Nothing is wrong where the receiver records more than sentences.',
      'rover.nmea:3 warning: Expected whole sentences, came parts: 1 sentence is not read. Look for a line to the recorder that was too slow when there are many.',
    ]);
  });
});

describe('sentences of one time of day', () => {
  const sigmas = async (lines: readonly string[]): Promise<(readonly number[])[]> =>
    (await readSentences(folder, lines, DATE)).positions.map(
      ({ pdop, verticalSigmaM }) => [pdop, verticalSigmaM] as const,
    );
  const [g1, g2] = [gga('101501.00'), gga('101502.00')];
  const [s1, s2] = [gst('101501.00', '0', '0', '0.01'), gst('101502.00', '0', '0', '0.02')];
  const [a1, a2] = [gsa('1.1'), gsa('1.2')];
  const both = [
    [1.1, 0.01],
    [1.2, 0.02],
  ];

  it.each([
    ['GGA GSA GST', [g1, a1, s1, g2, a2, s2]],
    ['GGA GST GSA', [g1, s1, a1, g2, s2, a2]],
    ['GST GSA GGA', [s1, a1, g1, s2, a2, g2]],
    ['GSA GST GGA', [a1, s1, g1, a2, s2, g2]],
    ['GSA GGA GST', [a1, g1, s1, a2, g2, s2]],
    ['GSA GSA GGA GST', [a1, a1, g1, s1, a2, a2, g2, s2]],
    ['a late GST', [g1, a1, g2, s1, a2, s2]],
  ])('are joined in the order %s', async (_, lines) => {
    expect(await sigmas(lines)).toEqual(both);
  });

  it('are found when a file that begins with GSA began within a block', async () => {
    expect(await sigmas([gsa('9.9'), g1, a1, s1, g2, s2, a2])).toEqual([
      [9.9, 0.01],
      [1.2, 0.02],
    ]);
  });

  it('are not joined to another time', async () => {
    expect(await sigmas([g1, g2, s2])).toEqual([
      [Number.NaN, Number.NaN],
      [Number.NaN, 0.02],
    ]);
    expect(await sigmas([g1, gga('101503.00'), gga('101504.00'), gga('101505.00'), s1])).toEqual(
      Array(4).fill([Number.NaN, Number.NaN]),
    );
  });

  it('give their values to each of two positions of one time', async () => {
    expect(await sigmas([g1, g1, a1, s1])).toEqual([both[0], both[0]]);
  });

  it('do not pile up when the clock stands still', async () => {
    const rows = 10_000;
    const path = folder.write('still.nmea', `${g1}\n`.repeat(rows));
    const counts: number[] = [];
    for await (const { positions } of readNmea({ path, file: 'still.nmea', ...DATE, mostHeld: 100 })) {
      counts.push(positions.length);
    }
    expect(counts.reduce((sum, count) => sum + count)).toBe(rows);
    // The file is read in several pieces, and none waits for the end.
    expect(counts.length).toBeGreaterThan(2);
    expect(counts.at(-1)).toBeLessThan(1000);
  });
});
