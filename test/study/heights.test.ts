import { describe, expect, it } from 'vitest';
import { stringify } from 'yaml';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { readStudy, readStudyErrors, runStudy, type StudyErrors } from '../../src/study/index.js';
import { testFolder } from '../files.js';

/*
 * Kinds of heights, coordinate systems and what is said where they cannot go together.
 */

const folder = testFolder();

interface Parts {
  readonly top?: object;
  readonly marks?: readonly string[];
  readonly marksKeys?: object;
  readonly bases?: readonly string[];
  readonly basesKeys?: object;
  readonly log?: readonly string[];
  readonly logKeys?: object;
}

const MARKS = ['mark,latitude,longitude,height', 'A,48.01,9.6,600', 'B,48.05,9.65,640'];
const BASES = ['base,latitude,longitude,height', 'B1,48,9.6,620'];
const LOG = [
  'time,mark,fix,latitude,longitude,height',
  '2025-03-04T09:00:00Z,A,fixed,48.01,9.6,600',
  '2025-03-04T10:00:00Z,B,fixed,48.05,9.65,640',
];
/** Separation 47 m everywhere, from 47.9 to 48.1 and from 9.5 to 9.7 degrees. */
const GRID = `ncols 3\nnrows 3\nxllcenter 9.5\nyllcenter 47.9\ncellsize 0.1\n${'47 47 47\n'.repeat(3)}`;

async function study(parts: Parts): Promise<string> {
  folder.write('marks.csv', (parts.marks ?? MARKS).join('\n'));
  folder.write('bases.csv', (parts.bases ?? BASES).join('\n'));
  folder.write('log.csv', (parts.log ?? LOG).join('\n'));
  folder.write('geoid.asc', GRID);
  return folder.write(
    'study.yaml',
    stringify({
      timeZone: 'UTC',
      ...parts.top,
      marks: { file: 'marks.csv', ...parts.marksKeys },
      bases: { file: 'bases.csv', ...parts.basesKeys },
      logs: [{ files: 'log.csv', layout: { kind: 'delimited' }, ...parts.logKeys }],
    }),
  );
}

const read = async (parts: Parts): Promise<StudyErrors> =>
  readStudyErrors(await readStudy(await study(parts)));

async function refusal(parts: Parts): Promise<string[]> {
  try {
    await read(parts);
    return [];
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.messages.map((told) => formatMessage(told).replace(/^.*study\.yaml/, 'study.yaml'));
  }
}

const ups = ({ errors }: StudyErrors): number[] => errors.map(({ up }) => Number(up.toFixed(3)) + 0);
const raise = (lines: readonly string[], by: number): string[] =>
  lines.map((line, k) => (k === 0 ? line : line.replace(/(\d+)$/, (height) => String(Number(height) + by))));

const ORTHOMETRIC = { heights: { kind: 'orthometric' } };
const BY_GRID = { heights: { kind: 'orthometric', geoid: 'grid', file: 'geoid.asc' } };
const BY_CONSTANT = { heights: { kind: 'orthometric', geoid: 'constant', separationM: 47 } };

describe('heights of two kinds', () => {
  it('ellipsoidal logs against orthometric marks are compared as orthometric ones', async () => {
    for (const keys of [BY_GRID, BY_CONSTANT]) {
      const both = { marks: raise(MARKS, -47), marksKeys: keys, bases: raise(BASES, -47), basesKeys: keys };
      const run = await read({ ...both, logKeys: { heights: { kind: 'ellipsoidal' } } });
      expect(ups(run)).toEqual([0, 0]);
      expect(run.results.heights).toBe('orthometric');
    }
  });

  it('orthometric logs against ellipsoidal marks are compared as ellipsoidal ones', async () => {
    for (const keys of [BY_GRID, BY_CONSTANT]) {
      const run = await read({ log: raise(LOG, -47), logKeys: keys });
      expect(ups(run)).toEqual([0, 0]);
      expect(run.results.heights).toBe('ellipsoidal');
    }
  });

  it('orthometric heights on both sides need no separation, and no warning of it', async () => {
    const run = await read({ top: ORTHOMETRIC });
    expect(ups(run)).toEqual([0, 0]);
    expect(run.results.heights).toBe('orthometric');
    const constant = await read({ top: BY_CONSTANT });
    expect(constant.results.messages.map(({ code }) => code)).not.toContain('constant-separation');
    const used = await read({ log: raise(LOG, -47), logKeys: BY_CONSTANT });
    expect(used.results.messages.map(({ code }) => code)).toContain('constant-separation');
  });

  it('with a separation in each row', async () => {
    const log = raise(LOG, -47).map((line, k) => `${line},${k === 0 ? 'geoidSeparation' : 47}`);
    const logKeys = { heights: { kind: 'orthometric', geoid: 'column' } };
    expect(ups(await read({ log, logKeys }))).toEqual([0, 0]);
    const blank = log.map((line, k) => (k === 2 ? line.replace(/,47$/, ',') : line));
    const { results } = await read({ log: blank, logKeys });
    expect(results.files[0]!.setAside.unreadable!.count).toBe(1);
    expect(results.messages.map(({ text }) => text).join(' ')).toContain(
      'expected a geoid separation in the row, since its height is orthometric and those of the marks are ellipsoidal, came none',
    );
  });

  it('without any separation are refused, with the remedy', async () => {
    expect(await refusal({ logKeys: ORTHOMETRIC })).toEqual([
      'study.yaml:7 [logs[0]] error: The heights of the logs are orthometric and those of the marks ellipsoidal: expected geoid separations that lead from one to the other, came none. State geoid: column, constant or grid under heights.',
    ]);
    expect((await refusal({ marksKeys: ORTHOMETRIC }))[0]).toContain(
      'The heights of the bases are ellipsoidal and those of the marks orthometric',
    );
  });

  it('where a grid does not cover the site', async () => {
    const away = [...LOG, '2025-03-04T11:00:00Z,B,fixed,48.5,9.65,640'];
    const { results } = await read({ log: away, logKeys: BY_GRID });
    expect(results.files[0]).toMatchObject({ read: 3, used: 2 });
    expect(results.messages.map(({ text }) => text).join(' ')).toMatch(/grid/i);
    const marks = [...MARKS, 'C,48.6,9.6,600'];
    const [told] = await refusal({
      marks,
      marksKeys: BY_GRID,
      top: { heights: { kind: 'ellipsoidal' } },
      basesKeys: BY_GRID,
      logKeys: BY_GRID,
    });
    expect(told).toBeUndefined();
    const [refused] = await refusal({
      marks,
      marksKeys: { heights: { kind: 'ellipsoidal' } },
      bases: ['base,latitude,longitude,height', 'B1,48.6,9.6,573'],
      basesKeys: BY_GRID,
    });
    expect(refused).toMatch(
      /^bases\.csv:2 \[height\] error: The coordinates cannot be used: .*grid.*\. Correct them\.$/,
    );
  });

  it('a grid file that is none', async () => {
    const logKeys = { heights: { kind: 'orthometric', geoid: 'grid', file: 'log.csv' } };
    expect((await refusal({ logKeys }))[0]).toMatch(
      /^study\.yaml:\d+ \[logs\[0\]\.heights\.file\] error: Expected an ASCII grid of geoid separations in "log\.csv", came a file that is none: .*\. Convert the grid to ASCII with longitudes and latitudes\.$/,
    );
    const missing = { heights: { kind: 'orthometric', geoid: 'grid', file: 'nowhere.asc' } };
    expect((await refusal({ logKeys: missing }))[0]).toContain('Expected the file "nowhere.asc"');
  });

  it('geocentric coordinates hold ellipsoidal ones, whatever stands at the top', async () => {
    // X, Y, Z of 48.01, 9.6, 647 and 48.05, 9.65, 687 on WGS 84, from PROJ's formulas in test/geodesy.
    const { geodeticToGeocentric } = await import('../../src/geodesy/index.js');
    const cells = (latitudeDeg: number, longitudeDeg: number, heightM: number): string => {
      const { xM, yM, zM } = geodeticToGeocentric({ latitudeDeg, longitudeDeg, heightM });
      return [xM, yM, zM].map((value) => value.toFixed(5)).join(',');
    };
    const log = [
      'time,mark,fix,x,y,z',
      `2025-03-04T09:00:00Z,A,fixed,${cells(48.01, 9.6, 647)}`,
      `2025-03-04T10:00:00Z,B,fixed,${cells(48.05, 9.65, 687)}`,
    ];
    const run = await read({ top: BY_CONSTANT, log, logKeys: { coordinates: 'geocentric' } });
    expect(ups(run).every((up) => Math.abs(up) < 0.05)).toBe(true);
    expect(run.results.heights).toBe('orthometric');
    expect((await refusal({ log, logKeys: { coordinates: 'geocentric', ...BY_CONSTANT } }))[0]).toMatch(
      /Expected ellipsoidal heights for geocentric coordinates, which hold no others, came orthometric ones\. Remove heights, or state the coordinates in which the heights stand\.$/,
    );
  });
});

const sentence = (body: string): string => {
  const sum = [...body].reduce((total, letter) => total ^ letter.charCodeAt(0), 0);
  return `$${body}*${sum.toString(16).toUpperCase().padStart(2, '0')}`;
};
const nmea = (height: string, separation: string): string[] => [
  sentence('GPRMC,090000.00,A,4800.6000,N,00936.0000,E,0.0,0.0,040325,,,A'),
  sentence(
    `GPGGA,090000.00,4800.6000,N,00936.0000,E,4,12,0.8,${height},M,${separation},${separation && 'M'},1.0,0001`,
  ),
];
const NMEA_LAYOUT = { layout: { kind: 'nmea', constants: { mark: 'A' } } };

describe('heights of NMEA sentences', () => {
  it('are ellipsoidal by their own separation', async () => {
    expect(ups(await read({ log: nmea('553.000', '47.0'), logKeys: NMEA_LAYOUT }))).toEqual([0]);
  });

  it('are taken as they stand against orthometric marks, or by the separation that the study states', async () => {
    const marks = raise(MARKS, -47);
    const both = { marks, bases: raise(BASES, -47), log: nmea('553.000', '46.0'), logKeys: NMEA_LAYOUT };
    expect(ups(await read({ ...both, top: ORTHOMETRIC }))).toEqual([0]);
    // 553 + 46 − 47 = 552 m: the study's geoid counts, not the receiver's.
    expect(ups(await read({ ...both, top: BY_CONSTANT }))).toEqual([-1000]);
  });

  it('without a separation are refused with the remedy, and read with it', async () => {
    const blank = { log: nmea('553.000', ''), logKeys: NMEA_LAYOUT };
    const { results } = await read(blank);
    expect(results.files[0]!.setAside.unreadable!.count).toBe(1);
    expect(results.messages.map(({ text }) => text).join(' ')).toContain(
      'state geoid: constant or grid under the heights of this log',
    );
    for (const keys of [BY_CONSTANT, BY_GRID]) {
      expect(ups(await read({ ...blank, logKeys: { ...NMEA_LAYOUT, ...keys } }))).toEqual([0]);
    }
  });
});

describe('coordinates that are not what is stated', () => {
  const outcome = async (parts: Parts): Promise<string> => {
    const run = await runStudy(await readStudy(await study(parts)));
    return run.results.messages.map(({ text }) => text).join('\n');
  };
  const plane = (easting: string, northing: string): string[] => [
    'time,mark,fix,easting,northing,height',
    `2025-03-04T09:00:00Z,A,fixed,${easting},${northing},600`,
  ];

  it('an unknown code', async () => {
    expect((await refusal({ logKeys: { coordinates: 'EPSG:999999' } }))[0]).toMatch(
      /Expected "geographic", "geocentric", an EPSG code or a proj string, came "EPSG:999999": .*\. Correct it\.$/,
    );
  });

  it('degrees under a code of metres', async () => {
    const text = await outcome({ log: plane('9.6', '48.01'), logKeys: { coordinates: 'EPSG:25832' } });
    expect(text).toContain('came easting 9.6 and northing 48.01, which look like degrees');
    const marks = ['mark,easting,northing,height', 'A,9.6,48.01,600'];
    expect((await refusal({ marks, marksKeys: { coordinates: 'EPSG:25832' } }))[0]).toBe(
      'marks.csv:2 [easting] error: The coordinates cannot be used: expected metres on the grid of EPSG:25832, came easting 9.6 and northing 48.01, which look like degrees. Correct them.',
    );
  });

  it('metres under a code of degrees', async () => {
    const log = [
      'time,mark,fix,latitude,longitude,height',
      '2025-03-04T09:00:00Z,A,fixed,5317886.1,544743.2,600',
    ];
    expect(await outcome({ log, logKeys: { coordinates: 'EPSG:4258' } })).toContain(
      'expected a latitude from -90 to 90 degrees, came 5317886.1 (is this a length? State the projection under coordinates)',
    );
    const [told] = await refusal({
      log: plane('544743.2', '5317886.1'),
      logKeys: { coordinates: 'EPSG:4258' },
    });
    expect(
      told ?? (await outcome({ log: plane('544743.2', '5317886.1'), logKeys: { coordinates: 'EPSG:4258' } })),
    ).toMatch(/latitude/);
  });

  it('latitude and longitude swapped', async () => {
    const far = ['mark,latitude,longitude,height', 'A,148.01,9.6,600'];
    expect((await refusal({ marks: far }))[0]).toContain(
      'expected a latitude from -90 to 90 degrees, came 148.01 (are latitude and longitude swapped?)',
    );
    const log = LOG.map((line) => line.replace(/(48\.\d+),(9\.\d+)/, '$2,$1'));
    const text = await outcome({ log });
    // Read the other way they agree to the last digit.
    expect(text).toContain('latitude and longitude look swapped');
    expect(text).toContain('(median of 2 marks)');
  });

  it('geocentric coordinates in feet, in degrees, or with x and y swapped', async () => {
    const { geodeticToGeocentric, metresPer } = await import('../../src/geodesy/index.js');
    const shot = (change: (value: number) => number, order = [0, 1, 2]): string[] => {
      const { xM, yM, zM } = geodeticToGeocentric({ latitudeDeg: 48.01, longitudeDeg: 9.6, heightM: 600 });
      const values = [xM, yM, zM].map((value) => change(value).toFixed(4));
      return ['time,mark,fix,x,y,z', `2025-03-04T09:00:00Z,A,fixed,${order.map((k) => values[k]).join(',')}`];
    };
    const logKeys = { coordinates: 'geocentric' };
    const feet = shot((value) => value / metresPer('us-survey-foot'));
    expect(await outcome({ log: feet, logKeys })).toContain('(are these feet? State length under units)');
    const right = { ...logKeys, layout: { kind: 'delimited', units: 'us-survey-foot' } };
    expect((await read({ log: feet, logKeys: right })).errors).toHaveLength(1);
    const degrees = ['time,mark,fix,x,y,z', '2025-03-04T09:00:00Z,A,fixed,48.01,9.6,600'];
    expect(await outcome({ log: degrees, logKeys })).toContain(
      '(are these degrees? State coordinates: geographic)',
    );
    expect(await outcome({ log: shot((value) => value, [1, 0, 2]), logKeys })).toContain(
      'x and y look swapped',
    );
  });

  it('a code in feet gives its unit to lengths', async () => {
    // EPSG:2227 is in US survey feet: its false easting is 6 561 666.667 of them, 2 000 000 m.
    const { metresPer, projection } = await import('../../src/geodesy/index.js');
    const { eastingM, northingM } = projection('EPSG:2227').forward({
      latitudeDeg: 37.5,
      longitudeDeg: -121,
    });
    const foot = metresPer('us-survey-foot');
    const cells = `${(eastingM / foot).toFixed(5)},${(northingM / foot).toFixed(5)},${(100 / foot).toFixed(5)}`;
    const run = await read({
      marks: ['mark,latitude,longitude,height', 'A,37.5,-121,100'],
      bases: ['base,latitude,longitude,height', 'B1,37.51,-121,100'],
      log: ['time,mark,fix,easting,northing,height', `2025-03-04T09:00:00Z,A,fixed,${cells}`],
      logKeys: { coordinates: 'EPSG:2227' },
    });
    expect(
      run.errors.map(({ east, north, up }) => Math.max(Math.abs(east), Math.abs(north), Math.abs(up)) < 0.05),
    ).toEqual([true]);
  });
});
