import type { GeoidGrid } from '../geodesy/index.js';
import { type CoordinateChanges, type CoordinateSystem, systemOf } from '../logs/index.js';
import {
  type ChangeContext,
  coordinateChanges,
  type HeightKind,
  isLevelledByConstant,
  MissingSeparation,
  type SourceSettings,
  separationAt,
} from './coordinateChanges.js';
import type { HeightSettings } from './coordinateSettings.js';
import type { Path } from './places.js';
import type { StudySettings } from './settings.js';

/** Tells of a setting that cannot be used. */
export type ReportMistake = (code: string, text: string, path: Path) => void;

/** What must be done to the coordinates of marks, bases and each log so that they can be compared. */
export interface Sources {
  /** Kind of heights that the study compares: that of the marks. */
  readonly heightKind: HeightKind;
  readonly marks: CoordinateChanges;
  readonly bases: CoordinateChanges;
  /** Of each file of job points. */
  readonly jobs: readonly CoordinateChanges[];
  /** @param system coordinates of the log; null for NMEA sentences: ellipsoidal heights with a separation in each row */
  readonly ofLog: (entry: number, system: CoordinateSystem | null) => CoordinateChanges;
  /** One separation leads from one kind of height to the other, in some source that was asked for. */
  readonly constantSeparation: () => boolean;
}

const ELLIPSOIDAL: HeightSettings = { kind: 'ellipsoidal' };
/** NMEA 0183 gives the height above the geoid and the separation; the reader forms their sum. */
const NMEA_HEIGHTS: HeightSettings = { kind: 'ellipsoidal', geoid: 'column' };

/** Works out the changes of every source; what cannot be is reported, and that source is left as it is. */
export function sources(
  settings: StudySettings,
  grids: ReadonlyMap<string, GeoidGrid>,
  report: ReportMistake,
): Sources {
  const { heights: common, logs } = settings;
  const marksOwn = ownSettings(settings.marks);
  const ownHeights = ({ heights }: SourceSettings, system: CoordinateSystem, path: Path): HeightSettings => {
    if (!isGeocentric(system)) return heights ?? common ?? ELLIPSOIDAL;
    if (heights?.kind === 'orthometric') {
      report(
        'bad-setting',
        'Expected ellipsoidal heights for geocentric coordinates, which hold no others, came orthometric ones. Remove heights, or state the coordinates in which the heights stand.',
        [...path, 'heights'],
      );
    }
    return { ...common, ...heights, kind: 'ellipsoidal' };
  };
  const systemFor = (own: SourceSettings & { readonly coordinates?: string | undefined }): CoordinateSystem =>
    own.coordinates ?? settings.coordinates;
  const marksHeights = ownHeights(marksOwn, systemFor(marksOwn), ['marks']);
  const heightKind = marksHeights.kind;
  const context: ChangeContext = { studyKind: heightKind, fallbacks: [common, marksOwn.heights], grids };
  let constantSeparation = false;
  const changesOf = (
    own: HeightSettings,
    source: SourceSettings,
    path: Path,
    what: string,
  ): CoordinateChanges => {
    try {
      const changes = coordinateChanges(own, source, context);
      constantSeparation ||= isLevelledByConstant(own, context);
      return changes;
    } catch (error) {
      if (error instanceof MissingSeparation) {
        report(
          'no-separation',
          `The heights of ${what} are ${own.kind} and those of the marks ${heightKind}: expected geoid separations that lead from one to the other, came none. State geoid: column, constant or grid under heights.`,
          path,
        );
      } else if (error instanceof RangeError) {
        report('bad-setting', `${sentence(error.message)} Correct the setting.`, path);
      } else throw error;
      return {};
    }
  };
  const basesOwn = ownSettings(settings.bases);
  const basesHeights = ownHeights(basesOwn, systemFor(basesOwn), ['bases']);
  const told = new Map<string, CoordinateChanges>();
  return {
    heightKind,
    marks: changesOf(marksHeights, marksOwn, ['marks'], 'the marks'),
    bases: changesOf(basesHeights, basesOwn, ['bases'], 'the bases'),
    jobs: settings.jobs.map((entry, k) => {
      const own = ownSettings(entry);
      return changesOf(ownHeights(own, systemFor(own), ['jobs', k]), own, ['jobs', k], 'the job points');
    }),
    ofLog(entry, system) {
      // One report for an entry, however many files it has.
      const key = `${entry} ${system}`;
      const known = told.get(key);
      if (known !== undefined) return known;
      const log = logs[entry]!;
      const path = ['logs', entry];
      const changes =
        system === null
          ? nmeaChanges(log.heights ?? common, (own) => changesOf(own, log, path, 'the logs'), context)
          : changesOf(ownHeights(log, system, path), log, path, 'the logs');
      told.set(key, changes);
      return changes;
    },
    constantSeparation: () => constantSeparation,
  };
}

/** What the study file states of separations holds for sentences too: it stands in for those that give none. */
function nmeaChanges(
  stated: HeightSettings | undefined,
  changesOf: (own: HeightSettings) => CoordinateChanges,
  context: ChangeContext,
): CoordinateChanges {
  const changes = changesOf({ ...NMEA_HEIGHTS, ...stated, kind: NMEA_HEIGHTS.kind });
  const separation = [stated, ...context.fallbacks]
    .map((each) => (each === undefined ? null : separationAt(each, context)))
    .find((each) => each !== null);
  return separation == null ? changes : { ...changes, separation };
}

/** Codes that are not known are reported elsewhere. */
function isGeocentric(system: CoordinateSystem): boolean {
  try {
    return systemOf(system).kind === 'geocentric';
  } catch {
    return false;
  }
}

const ownSettings = (
  source: StudySettings['marks'] | StudySettings['bases'] | StudySettings['jobs'][number],
): SourceSettings => (typeof source === 'string' ? {} : source);

const sentence = (text: string): string => {
  const plain = text.replace(/\.$/, '');
  return `${plain[0]!.toUpperCase()}${plain.slice(1)}.`;
};

/** Grid files of separations that the settings name, each with where it is named first. */
export function gridFiles(settings: StudySettings): Map<string, Path> {
  const named: [string | undefined, Path][] = [
    [settings.heights?.file, ['heights', 'file']],
    [ownSettings(settings.marks).heights?.file, ['marks', 'heights', 'file']],
    [ownSettings(settings.bases).heights?.file, ['bases', 'heights', 'file']],
    ...settings.jobs.map((entry, k): [string | undefined, Path] => [
      ownSettings(entry).heights?.file,
      ['jobs', k, 'heights', 'file'],
    ]),
    ...settings.logs.map(({ heights }, k): [string | undefined, Path] => [
      heights?.file,
      ['logs', k, 'heights', 'file'],
    ]),
  ];
  const files = new Map<string, Path>();
  for (const [file, path] of named) if (file !== undefined && !files.has(file)) files.set(file, path);
  return files;
}
