import { existsSync, statSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { dirname, isAbsolute, join, relative, resolve } from 'node:path';
import { globSync } from 'tinyglobby';
import type { ControlFile } from '../control/index.js';
import {
  type CoordinateSystem,
  coordinateColumns,
  InputError,
  inputError,
  type LogFile,
} from '../logs/index.js';
import type { SpecSheet, Tolerance } from '../rule/index.js';
import { parseStudyText } from './parseStudyText.js';
import type { StudySettings } from './settings.js';
import type { Study } from './study.js';

const MM_PER_FOOT = 304.8;

/**
 * Reads a study file, checks it against the schema and finds the files it names.
 * @throws InputError that names file, line, key, what was expected and what came
 */
export async function readStudy(path: string): Promise<Study> {
  const file = resolve(path);
  if (!existsSync(file) || statSync(file).isDirectory()) {
    throw inputError(
      'no-study-file',
      `Expected a study file, came ${existsSync(file) ? 'a folder' : 'a path that does not exist'}. Name the file, or make one with "ppmwise new DIR".`,
      { file: path },
    );
  }
  const settings = parseStudyText(await readFile(file, 'utf8'), path);
  const folder = dirname(file);
  return {
    file,
    folder,
    title: settings.title,
    timeZone: settings.timeZone ?? null,
    marks: controlFile(settings, 'marks', folder, path),
    bases: controlFile(settings, 'bases', folder, path),
    logs: logFiles(settings, folder, path),
    period: settings.period ?? null,
    gapSeconds: settings.occupations.gapSeconds,
    confidence: settings.model.confidence,
    tolerances: settings.tolerances.map(tolerance),
    specSheet: settings.specSheet === undefined ? null : specSheet(settings.specSheet),
    leaveOutDays: settings.leaveOutDays,
    seed: settings.seed,
  };
}

function tolerance(written: StudySettings['tolerances'][number]): Tolerance {
  const { component, limitMm, limitFeet, share, dayShare, confidence } = written;
  return { component, limitMm: limitMm ?? limitFeet! * MM_PER_FOOT, share, dayShare, confidence };
}

function specSheet(written: NonNullable<StudySettings['specSheet']>): SpecSheet {
  return { ...written, level: String(written.level) as SpecSheet['level'] };
}

function controlFile(
  settings: StudySettings,
  key: 'marks' | 'bases',
  folder: string,
  studyFile: string,
): ControlFile {
  const entry = settings[key];
  const { file, coordinates, columns } =
    typeof entry === 'string' ? { file: entry, coordinates: undefined, columns: undefined } : entry;
  const path = isAbsolute(file) ? file : join(folder, file);
  if (!existsSync(path) || statSync(path).isDirectory()) {
    throw inputError(
      'missing-file',
      `Expected the ${key} file ${JSON.stringify(file)} beside the study file, there is none. Create it or correct the name.`,
      { file: studyFile, column: key },
    );
  }
  return {
    path,
    file: relative(folder, path),
    coordinates: checkedSystem(coordinates ?? settings.coordinates, studyFile, `${key}.coordinates`),
    columns,
  };
}

function logFiles(settings: StudySettings, folder: string, studyFile: string): LogFile[] {
  const found = new Map<string, LogFile>();
  settings.logs.forEach(({ files, layout, coordinates }, k) => {
    const system = checkedSystem(coordinates ?? settings.coordinates, studyFile, `logs[${k}].coordinates`);
    for (const pattern of [files].flat()) {
      const paths = globSync(pattern, { cwd: folder, absolute: true, expandDirectories: false }).sort();
      if (paths.length === 0) {
        throw inputError(
          'no-log',
          `Expected log files that match ${JSON.stringify(pattern)} in ${JSON.stringify(folder)}, there are none. Put the exported logs there or correct the pattern.`,
          { file: studyFile, column: `logs[${k}].files` },
        );
      }
      for (const path of paths) {
        // A file that two patterns match is one file: its rows must not count twice.
        if (found.has(path)) continue;
        found.set(path, {
          path,
          file: relative(folder, path),
          layout: layout ?? { kind: 'delimited' },
          coordinates: system,
        });
      }
    }
  });
  return [...found.values()];
}

function checkedSystem(system: CoordinateSystem, studyFile: string, key: string): CoordinateSystem {
  try {
    coordinateColumns(system);
    return system;
  } catch (error) {
    if (error instanceof InputError) throw error;
    throw inputError(
      'unknown-coordinates',
      `Expected "geographic", "geocentric" or a proj string, came ${JSON.stringify(system)}: ${(error as Error).message.replace(/\.$/, '')}. Correct it.`,
      { file: studyFile, column: key },
    );
  }
}
