import type { GeoidGrid } from '../geodesy/index.js';
import type { CoordinateChanges } from '../logs/index.js';
import {
  coordinateChanges,
  type HeightKind,
  MissingSeparation,
  type SourceSettings,
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
  /** @param isNmea the log holds NMEA sentences: ellipsoidal heights with a separation in each row */
  readonly ofLog: (entry: number, isNmea: boolean) => CoordinateChanges;
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
  const heightKind = (marksOwn.heights ?? common ?? ELLIPSOIDAL).kind;
  const context = { studyKind: heightKind, fallbacks: [common, marksOwn.heights], grids };
  const changesOf = (
    own: HeightSettings,
    source: SourceSettings,
    path: Path,
    what: string,
  ): CoordinateChanges => {
    try {
      return coordinateChanges(own, source, context);
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
  const control = (key: 'marks' | 'bases'): CoordinateChanges => {
    const own = ownSettings(settings[key]);
    return changesOf(own.heights ?? common ?? ELLIPSOIDAL, own, [key], `the ${key}`);
  };
  const told = new Map<string, CoordinateChanges>();
  return {
    heightKind,
    marks: control('marks'),
    bases: control('bases'),
    ofLog(entry, isNmea) {
      // One report for an entry, however many files it has.
      const key = `${entry} ${isNmea}`;
      const known = told.get(key);
      if (known !== undefined) return known;
      const log = logs[entry]!;
      const stated = log.heights ?? (isNmea ? NMEA_HEIGHTS : (common ?? ELLIPSOIDAL));
      // What the log states of separations holds for its sentences too: their heights arrive as ellipsoidal ones.
      const own = isNmea ? { ...NMEA_HEIGHTS, ...stated, kind: NMEA_HEIGHTS.kind } : stated;
      const changes = changesOf(own, log, ['logs', entry], 'the logs');
      told.set(key, changes);
      return changes;
    },
  };
}

const ownSettings = (source: StudySettings['marks'] | StudySettings['bases']): SourceSettings =>
  typeof source === 'string' ? {} : source;

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
    ...settings.logs.map(({ heights }, k): [string | undefined, Path] => [
      heights?.file,
      ['logs', k, 'heights', 'file'],
    ]),
  ];
  const files = new Map<string, Path>();
  for (const [file, path] of named) if (file !== undefined && !files.has(file)) files.set(file, path);
  return files;
}
