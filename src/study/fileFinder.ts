import { statSync } from 'node:fs';
import { relative, resolve } from 'node:path';
import { globSync } from 'tinyglobby';
import type { ControlFile } from '../control/index.js';
import { type CoordinateSystem, coordinateColumns, type Message, message, quoted } from '../logs/index.js';
import type { FoundLog } from './logLayouts.js';
import type { Path, PlaceOf } from './places.js';
import type { StudySettings } from './settings.js';

/** A file and its name in messages. */
export interface NamedFile {
  readonly path: string;
  readonly file: string;
}

/** Finds the files that a study names, and gathers what is wrong with them. */
export class FileFinder {
  readonly mistakes: Message[] = [];

  constructor(
    readonly settings: StudySettings,
    readonly folder: string,
    readonly placeOf: PlaceOf,
  ) {}

  /** The marks or bases file; null when it is not there. */
  control(key: 'marks' | 'bases'): ControlFile | null {
    const entry = this.settings[key];
    const inline = typeof entry === 'string';
    const { file, coordinates, columns } = inline
      ? { file: entry, coordinates: undefined, columns: undefined }
      : entry;
    const system = this.#system(coordinates, [key, 'coordinates']);
    const path = resolve(this.folder, file);
    if (!isFile(path)) {
      this.#mistake(
        'missing-file',
        `Expected the ${key} file ${quoted(file)} in the folder of the study file, there is none. Create it or correct the name.`,
        inline ? [key] : [key, 'file'],
      );
      return null;
    }
    return { path, file: relative(this.folder, path), coordinates: system, columns };
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
      this.#mistake(
        'bad-pattern',
        `Expected a pattern with a group for the mark, such as "CHK (\\d+)", came ${quoted(pattern)}. Put the name of the mark in brackets.`,
        path,
      );
    } catch (error) {
      const fault = (error as Error).message.replace(/\.$/, '');
      this.#mistake(
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

  #file(name: string, path: Path): NamedFile | null {
    const found = resolve(this.folder, name);
    if (isFile(found)) return { path: found, file: relative(this.folder, found) };
    this.#mistake(
      'missing-file',
      `Expected the file ${quoted(name)} in the folder of the study file, there is none. Create it or correct the name.`,
      path,
    );
    return null;
  }

  logs(): FoundLog[] {
    const found = new Map<string, FoundLog>();
    this.settings.logs.forEach(({ files, layout, coordinates, nearestMarkM, markTimes }, k) => {
      const system = this.#system(coordinates, ['logs', k, 'coordinates']);
      for (const pattern of [files].flat()) {
        const paths = globSync(pattern, {
          cwd: this.folder,
          absolute: true,
          expandDirectories: false,
        }).sort();
        if (paths.length === 0) {
          this.#mistake(
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
          });
        }
      }
    });
    return [...found.values()];
  }

  #system(own: CoordinateSystem | undefined, path: Path): CoordinateSystem {
    const system = own ?? this.settings.coordinates;
    const key = own === undefined ? ['coordinates'] : path;
    try {
      coordinateColumns(system);
    } catch (error) {
      const reason = (error as Error).message.replace(/\.$/, '');
      this.#mistake(
        'unknown-coordinates',
        `Expected "geographic", "geocentric" or a proj string, came ${quoted(system)}: ${reason}. Correct it.`,
        key,
      );
    }
    return system;
  }

  #mistake(code: string, text: string, path: Path): void {
    const told = message('error', code, text, this.placeOf(path));
    const again = this.mistakes.some(({ text: before, row }) => before === text && row === told.row);
    if (!again) this.mistakes.push(told);
  }
}

const isFile = (path: string): boolean => statSync(path, { throwIfNoEntry: false })?.isFile() ?? false;
