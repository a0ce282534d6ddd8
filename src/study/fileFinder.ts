import { readFileSync, statSync } from 'node:fs';
import { relative, resolve } from 'node:path';
import { globSync } from 'tinyglobby';
import type { ControlFile } from '../control/index.js';
import { type GeoidGrid, geoidGrid } from '../geodesy/index.js';
import { type CoordinateSystem, type Message, message, quoted, systemOf } from '../logs/index.js';
import type { FoundLog } from './logLayouts.js';
import type { Path, PlaceOf } from './places.js';
import type { StudySettings } from './settings.js';
import { gridFiles } from './sources.js';

/** A file and its name in messages. */
export interface NamedFile {
  readonly path: string;
  readonly file: string;
}

/** How a file of points is named in the study file. */
type PointsEntry =
  | string
  | (Exclude<StudySettings['bases'] | StudySettings['jobs'][number], string> & {
      readonly heightOf?: ControlFile['heightOf'];
    });

/** Finds the files that a study names, and gathers what is wrong with them. */
export class FileFinder {
  readonly mistakes: Message[] = [];
  /** Files of geoid separations that were read. */
  readonly geoidGrids: NamedFile[] = [];
  /** What must be known of the coordinate systems, one message each. */
  readonly notes = new Map<CoordinateSystem, Message>();

  constructor(
    readonly settings: StudySettings,
    readonly folder: string,
    readonly placeOf: PlaceOf,
  ) {}

  /** The marks or bases file; null when it is not there. */
  control(key: 'marks' | 'bases'): ControlFile | null {
    return this.#points(this.settings[key], `the ${key} file`, [key]);
  }

  /** The files of job points that are there. */
  jobs(): ControlFile[] {
    return this.settings.jobs.flatMap(
      (entry, k) => this.#points(entry, 'the file of job points', ['jobs', k]) ?? [],
    );
  }

  #points(entry: PointsEntry, what: string, key: Path): ControlFile | null {
    const inline = typeof entry === 'string';
    const { file, coordinates, columns, units, heightOf, frame, epoch, transformation } = inline
      ? ({ file: entry } as Partial<Exclude<typeof entry, string>> & { file: string })
      : entry;
    const system = this.#system(coordinates, [...key, 'coordinates'], transformation !== undefined);
    const path = resolve(this.folder, file);
    if (!isFile(path)) {
      this.mistake(
        'missing-file',
        `Expected ${what} ${quoted(file)} in the folder of the study file, there is none. Create it or correct the name.`,
        inline ? key : [...key, 'file'],
      );
      return null;
    }
    const shown = relative(this.folder, path);
    const lengths = typeof units === 'string' ? { length: units } : units;
    return { path, file: shown, coordinates: system, columns, units: lengths, heightOf, frame, epoch };
  }

  /** The grid files of geoid separations, by the name that the settings give. */
  grids(): Map<string, GeoidGrid> {
    const grids = new Map<string, GeoidGrid>();
    for (const [name, path] of gridFiles(this.settings)) {
      const found = this.#file(name, path);
      if (found === null) continue;
      try {
        grids.set(name, geoidGrid(readFileSync(found.path, 'utf8')));
        this.geoidGrids.push(found);
      } catch (error) {
        if (!(error instanceof RangeError)) throw error;
        const fault = error.message.replace(/\.$/, '');
        this.mistake(
          'bad-grid',
          `Expected an ASCII grid of geoid separations in ${quoted(name)}, came a file that is none: ${fault}. Convert the grid to ASCII with longitudes and latitudes.`,
          path,
        );
      }
    }
    return grids;
  }

  /** The pattern of names; null without one. */
  namePattern(): RegExp | null {
    const { marks } = this.settings;
    const pattern = typeof marks === 'string' ? undefined : marks.names?.pattern;
    if (pattern === undefined) return null;
    const path = ['marks', 'names', 'pattern'];
    try {
      const expression = new RegExp(pattern);
      // A match against nothing but an added empty alternative tells how many groups there are.
      if (new RegExp(`${pattern}|`).exec('')!.length > 1) return expression;
      this.mistake(
        'bad-pattern',
        `Expected a pattern with a group for the mark, such as 'CHK (\\d+)', came ${quoted(pattern)}. Put the name of the mark in brackets.`,
        path,
      );
    } catch (error) {
      const fault = (error as Error).message.replace(/\.$/, '');
      this.mistake(
        'bad-pattern',
        `Expected a regular expression, came ${quoted(pattern)}: ${fault}. Correct it.`,
        path,
      );
    }
    return null;
  }

  aliases(): NamedFile | null {
    const { marks } = this.settings;
    const name = typeof marks === 'string' ? undefined : marks.names?.aliases;
    return name === undefined ? null : this.#file(name, ['marks', 'names', 'aliases']);
  }

  /** Lists of stays, by log. */
  markTimes(logs: readonly FoundLog[]): Map<string, NamedFile> {
    const lists = new Map<string, NamedFile>();
    this.settings.logs.forEach(({ markTimes }, k) => {
      const list = markTimes === undefined ? null : this.#file(markTimes, ['logs', k, 'markTimes']);
      if (list === null) return;
      for (const { file } of logs.filter(({ entry }) => entry === k)) lists.set(file, list);
    });
    return lists;
  }

  /** Files of the sky, each once, in the order in which they are named. */
  sky(key: 'indices' | 'maps'): NamedFile[] {
    const found = new Set<string>();
    this.settings[key].forEach((pattern, k) => {
      const paths = this.#matching(pattern);
      for (const path of paths) found.add(path);
      if (paths.length > 0) return;
      this.mistake(
        'missing-file',
        `Expected files of ${key === 'maps' ? 'ionosphere maps' : 'indices'} that match ${quoted(pattern)} in the folder of the study file, there are none. Put them there or correct the name.`,
        [key, k],
      );
    });
    return [...found].map((path) => ({ path, file: relative(this.folder, path) }));
  }

  #matching(pattern: string): string[] {
    return globSync(pattern, { cwd: this.folder, absolute: true, expandDirectories: false }).sort();
  }

  #file(name: string, path: Path): NamedFile | null {
    const found = resolve(this.folder, name);
    if (isFile(found)) return { path: found, file: relative(this.folder, found) };
    this.mistake(
      'missing-file',
      `Expected the file ${quoted(name)} in the folder of the study file, there is none. Create it or correct the name.`,
      path,
    );
    return null;
  }

  logs(): FoundLog[] {
    const found = new Map<string, FoundLog>();
    this.settings.logs.forEach((entry, k) => {
      const { files, layout, coordinates, nearestMarkM, markTimes, transformation } = entry;
      const system = this.#system(coordinates, ['logs', k, 'coordinates'], transformation !== undefined);
      for (const pattern of [files].flat()) {
        const paths = this.#matching(pattern);
        if (paths.length === 0) {
          this.mistake(
            'no-log',
            `Expected log files that match ${quoted(pattern)} in the folder of the study file, there are none. Put the exported logs there or correct the pattern, such as "logs/*.csv".`,
            ['logs', k, 'files'],
          );
        }
        for (const path of paths) {
          // A file that two patterns match is one file: its rows must not count twice.
          if (found.has(path)) continue;
          found.set(path, {
            path,
            file: relative(this.folder, path),
            layout: layout ?? null,
            entry: k,
            coordinates: system,
            nearestMarkM: nearestMarkM ?? null,
            marksByTime: markTimes !== undefined,
            corrections: entry.corrections,
            moveToPublishedBase: entry.moveToPublishedBase,
          });
        }
      }
    });
    return [...found.values()];
  }

  /** @param transformed its frame is stated to be changed, so that nothing need be said of it */
  #system(own: CoordinateSystem | undefined, path: Path, transformed: boolean): CoordinateSystem {
    const system = own ?? this.settings.coordinates;
    const key = own === undefined ? ['coordinates'] : path;
    try {
      const { note } = systemOf(system);
      if (note !== null && !transformed && !this.notes.has(system)) {
        this.notes.set(
          system,
          message('warning', 'coordinate-system', `${system}: ${note}`, this.placeOf(key)),
        );
      }
    } catch (error) {
      const reason = (error as Error).message.replace(/\.$/, '');
      this.mistake(
        'unknown-coordinates',
        `Expected "geographic", "geocentric", an EPSG code or a proj string, came ${quoted(system)}: ${reason}. Correct it.`,
        key,
      );
    }
    return system;
  }

  readonly mistake = (code: string, text: string, path: Path): void => {
    const told = message('error', code, text, this.placeOf(path));
    const again = this.mistakes.some(({ text: before, row }) => before === text && row === told.row);
    if (!again) this.mistakes.push(told);
  };
}

const isFile = (path: string): boolean => statSync(path, { throwIfNoEntry: false })?.isFile() ?? false;
