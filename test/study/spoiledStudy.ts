import { type ErrorModel, fitErrorModel } from '../../src/fit/index.js';
import { type Geodetic, geocentricToGeodetic, localFrame, projection } from '../../src/geodesy/index.js';
import { normalDeviates, randomStream } from '../../src/stats/index.js';
import { type Results, readStudy, readStudyErrors, runStudy, type Study } from '../../src/study/index.js';
import type { TestFolder } from '../files.js';

export const ZONE_32 = projection('EPSG:25832');
export const BASE: Geodetic = { latitudeDeg: 48.1, longitudeDeg: 9.6, heightM: 640 };

/** Eight marks around the base: direction and distance, height above the base. */
const MARKS = [
  [20, 0.6, 4],
  [75, 1.9, -12],
  [140, 3.1, 25],
  [190, 4.6, -30],
  [235, 6.2, 18],
  [290, 8.1, 55],
  [335, 9.9, -21],
  [60, 11.5, 40],
] as const;

export interface PlaneRow {
  readonly time: string;
  readonly mark: string;
  readonly base: string;
  readonly eastingM: number;
  readonly northingM: number;
  readonly heightM: number;
}

const placeFrom = (base: Geodetic, azimuthDeg: number, km: number, upM: number): Geodetic => {
  const azimuth = (azimuthDeg * Math.PI) / 180;
  // The earth falls away under the horizon by km² / 12.742 m.
  const drop = (km * km) / 12.742;
  const frame = localFrame(base);
  return geocentricToGeodetic(
    frame.toGeocentric({
      eastM: 1000 * km * Math.sin(azimuth),
      northM: 1000 * km * Math.cos(azimuth),
      upM: upM - drop,
    }),
  );
};

export const MARK_PLACES: ReadonlyMap<string, Geodetic> = new Map(
  MARKS.map(([azimuth, km, up], k) => [`P${k + 1}`, placeFrom(BASE, azimuth, km, up)]),
);

/** Check shots of 24 days, four at each mark a day: 5 mm and 0.6 ppm an axis in plan, 9 mm and 1 ppm in height. */
export function planeRows(seed = 7): PlaneRow[] {
  const random = randomStream(seed);
  const deviates = normalDeviates(random);
  const rows: PlaneRow[] = [];
  for (let day = 0; day < 24; day++) {
    for (const [shot, [mark, place]] of [...MARK_PLACES].flatMap((one) => [one, one]).entries()) {
      const km = MARKS[[...MARK_PLACES.keys()].indexOf(mark)]![1];
      const [plan, height] = [Math.hypot(5, 0.6 * km), Math.hypot(9, km)];
      const measured = localFrame(place).toGeocentric({
        eastM: (plan * deviates()) / 1000,
        northM: (plan * deviates()) / 1000,
        upM: (height * deviates()) / 1000,
      });
      const { latitudeDeg, longitudeDeg, heightM } = geocentricToGeodetic(measured);
      const time = new Date(Date.UTC(2025, 3, 1 + day, 7, 20 * shot)).toISOString();
      rows.push({ time, mark, base: 'B1', ...ZONE_32.forward({ latitudeDeg, longitudeDeg }), heightM });
    }
  }
  return rows;
}

export interface StudyParts {
  /** Further keys of the log entry, and of its layout. */
  readonly logKeys?: string;
  readonly layoutKeys?: string;
  readonly rows?: readonly PlaneRow[];
  readonly marksKeys?: string;
  readonly marks?: ReadonlyMap<string, Geodetic>;
  readonly base?: Geodetic;
  readonly columns?: readonly string[];
}

const line = (name: string, place: Geodetic): string => {
  const { eastingM, northingM } = ZONE_32.forward(place);
  return [name, eastingM.toFixed(5), northingM.toFixed(5), place.heightM.toFixed(5)].join(',');
};

let count = 0;

/** A study whose marks, bases and log are all in the plane of zone 32. */
function written(folder: TestFolder, parts: StudyParts): Promise<Study> {
  const { rows = planeRows(), marks = MARK_PLACES, base = BASE } = parts;
  const { logKeys = '', layoutKeys = '', marksKeys = '' } = parts;
  const header = parts.columns ?? ['easting', 'northing', 'height'];
  count += 1;
  const at = `study-${count}`;
  const points = (what: string, list: Iterable<readonly [string, Geodetic]>): string =>
    [`${what},easting,northing,height`, ...[...list].map(([name, place]) => line(name, place))].join('\n');
  folder.write(`${at}/marks.csv`, points('mark', marks));
  folder.write(`${at}/bases.csv`, points('base', [['B1', base]]));
  const body = rows.map(({ time, mark, eastingM, northingM, heightM }) =>
    [time, mark, eastingM.toFixed(5), northingM.toFixed(5), heightM.toFixed(5)].join(','),
  );
  folder.write(`${at}/log.csv`, [['time', 'mark', ...header].join(','), ...body].join('\n'));
  const path = folder.write(
    `${at}/study.yaml`,
    [
      'title: Spoiled',
      'timeZone: UTC',
      'coordinates: EPSG:25832',
      `marks: {file: marks.csv${marksKeys}}`,
      'bases: bases.csv',
      `logs: [{files: log.csv, layout: {kind: delimited${layoutKeys}}${logKeys}}]`,
    ].join('\n'),
  );
  return readStudy(path);
}

/** The whole job. */
export const runWhole = async (folder: TestFolder, parts: StudyParts): Promise<Results> =>
  (await runStudy(await written(folder, parts))).results;

/** What reading finds, with the two fits of each component, and none of the rest of a run, which takes long. */
export type SpoiledRun = Omit<Results, 'fits'> & { readonly fits: readonly ErrorModel[] };

export async function runParts(folder: TestFolder, parts: StudyParts): Promise<SpoiledRun> {
  const { errors, results } = await readStudyErrors(await written(folder, parts));
  const fits = (['horizontal', 'vertical'] as const).flatMap((component) =>
    (['absolute', 'repeatability'] as const).flatMap((reference) =>
      // Occupations that are all far off leave nothing to fit.
      errors.length === 0 ? [] : [fitErrorModel(errors, { component, reference, screen: false })],
    ),
  );
  return { ...results, fits };
}
