import { describe, expect, it } from 'vitest';
import type { RecognizeOptions } from '../../src/logs/index.js';
import { testFolder } from '../files.js';
import { decisive, file, readAs, readRecognized, recognized } from './heads.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix';
const ROW = '2025-03-04T09:00:00Z,CP1,47.010000001,-8.000000001,500.123,fixed';
const withColumn = (name: string, cell: string): string => file(`${HEADER},${name}`, `${ROW},${cell}`);
const UTM_33 = '+proj=utm +zone=33 +ellps=WGS84';

describe('what would make numbers wrong is asked for', () => {
  it.each<[string, string, string, RecognizeOptions?]>([
    ['height-of', 'layout.heightOf', withColumn('Rod height', '2.000')],
    ['height-kind', 'heights.kind', file(HEADER.replace('height', 'Elevation'), ROW)],
    ['height-kind', 'heights.kind', file(HEADER.replace('height', 'Altitude (m)'), ROW)],
    ['which-foot', 'layout.units.height', file(HEADER.replace('height', 'Height (ft)'), ROW)],
    ['fix-values', 'layout.fixValues', file(HEADER, ROW.replace('fixed', '4'))],
    ['fix-values', 'layout.fixValues', file(HEADER, ROW.replace('fixed', 'RTK'))],
    [
      'mark-column',
      'layout.columns.mark',
      file(HEADER.replace('mark', 'Point,Code'), ROW.replace('CP1', '1,CP1')),
    ],
    [
      'maybe-fix',
      'layout.columns.fix',
      file(
        'CP1,147.123456789,47.123456789,500.1,2025-03-04T09:00:00Z,4',
        'CP1,147.123456789,47.123456789,500.1,2025-03-04T09:00:01Z,5',
      ),
    ],
    [
      'which-foot',
      'layout.units.length',
      file(
        'time,mark,Easting (ft),Northing (ft),height,fix',
        '2025-03-04T09:00:00Z,CP1,1640419.948,16348262.467,500.1,fixed',
      ),
      { coordinates: UTM_33 },
    ],
    [
      'projection',
      'coordinates',
      file('time,mark,E (m),N (m),H', '2025-03-04T09:00:00Z,CP1,500000.1,4982950.4,135.1'),
    ],
    ['no-date', 'layout.constants.date', file('mark,latitude,longitude,height,fix', ROW.slice(21))],
  ])('%s (%s)', (code, key, text, options = {}) => {
    const found = recognized(text, options);
    expect(found.complete).toBe(false);
    expect(decisive(found)).toEqual([code]);
    expect(found.unsure[0]).toMatchObject({ key });
    // What is asked for is not in the layout as well.
    const stated = key
      .split('.')
      .reduce<unknown>((at, step) => (at as Record<string, unknown> | undefined)?.[step], found);
    if (key !== 'coordinates') expect(stated).toBe(undefined);
  });

  it('and what the study or the file states is not', () => {
    const elevation = file(HEADER.replace('height', 'Elevation'), ROW);
    expect(recognized(elevation, { heights: 'ellipsoidal' })).toMatchObject({
      layout: { kind: 'delimited' },
      complete: true,
    });
    expect(recognized(withColumn('Rod height', '0.000')).complete).toBe(true);
    expect(recognized(file(HEADER, ROW.replace('fixed', 'FLOAT'))).complete).toBe(true);
  });

  it('a unit in the header is taken: US survey feet and international feet', async () => {
    // 500 km east and 4982950.4 m north in feet of exactly 1200/3937 m and 0.3048 m.
    for (const [name, unit, foot] of [
      ['usft', 'us-survey-foot', 1200 / 3937],
      ['US survey feet', 'us-survey-foot', 1200 / 3937],
      ['ift', 'international-foot', 0.3048],
    ] as const) {
      const [e, n, h] = [500000, 4982950.4, 135.1].map((metres) => (metres / foot).toFixed(6));
      const text = file(
        `time,mark,Easting (${name}),Northing (${name}),height (${name}),fix`,
        `2025-03-04T09:00:00Z,CP1,${e},${n},${h},fixed`,
      );
      const { found, log } = await readRecognized(folder, text, { coordinates: UTM_33 });
      expect(found.layout).toEqual({ kind: 'delimited', units: { length: unit } });
      expect(log.positions[0]!.latitudeDeg).toBeCloseTo(45, 8);
      expect(log.positions[0]!.longitudeDeg).toBeCloseTo(15, 9);
      expect(log.positions[0]!.heightM).toBeCloseTo(135.1, 5);
    }
  });

  it('heights in feet beside coordinates in degrees and metres', async () => {
    const text = file(HEADER.replace('height', 'Height (usft)'), ROW.replace('500.123', '1000'));
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited', units: { height: 'us-survey-foot' } });
    expect(log.positions[0]!.heightM).toBeCloseTo((1000 * 1200) / 3937, 9);
  });
});

describe('a doubt', () => {
  const all = [
    file('1,4982950.4,500000.0,135.1,CHK M03'),
    file(HEADER, ROW.replace('fixed', '4')),
    file('Point,X,Y,Z,Desc,Time', '1,1234.5,2345.6,35.1,CHK,01/02/25 10:15'),
    withColumn('Rod height', '2.000'),
    file('Title', HEADER, ROW.replace('Z', '')),
    file('CHK1,8.123456789,47.123456789,101.1,2025-03-14T10:00:00Z,fixed,0.012,4'),
  ].flatMap((text) => recognized(text).unsure);

  it('asks in one sentence, says why in another, and names a key', () => {
    expect(all.length).toBeGreaterThan(15);
    for (const { code, question, because, key } of all) {
      expect(code).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
      expect(question, code).toMatch(/^\p{Lu}[^?]*\?$/u);
      expect(because, code).toMatch(/^\p{Lu}.*\.$/su);
      expect(because, code).not.toMatch(/undefined|NaN|null|\[object| {2}|\.\./);
      expect(key, code).toMatch(/^(layout(\.[a-zA-Z]+)*|coordinates|heights\.kind)$/);
    }
  });

  it('comes first when it is decisive', () => {
    const { unsure } = recognized(file('1,4982950.4,500000.0,135.1,CHK M03'));
    const order = unsure.map((doubt) => doubt.decisive);
    expect(order).toEqual([...order].sort((a, b) => Number(b) - Number(a)));
  });

  it('answered in the layout leaves the file readable', async () => {
    const text = file('1,4982950.4,500000.0,135.1,M03', '2,4982951.4,500001.0,135.2,M04');
    const found = recognized(text, { coordinates: UTM_33 });
    const { layout } = found;
    if (layout.kind !== 'delimited') throw new Error('expected delimited text');
    const answered = {
      ...layout,
      columns: { ...layout.columns, mark: 5 },
      constants: { date: '2025-03-14' },
    };
    const { positions } = await readAs(folder, text, answered, { coordinates: UTM_33 });
    expect(positions.map(({ mark }) => mark)).toEqual(['M03', 'M04']);
  });
});
