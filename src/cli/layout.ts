import { existsSync, statSync } from 'node:fs';
import { dirname, extname, join, relative } from 'node:path';
import { Command } from 'commander';
import {
  type CoordinateSystem,
  coordinateColumns,
  inputError,
  quoted,
  type Recognition,
  type RecognizeOptions,
  readHead,
  recognitionText,
  recognizeLayout,
} from '../logs/index.js';
import { expectedZone, isTimeZone } from '../time/index.js';

interface LayoutFlags {
  readonly timeZone?: string;
  readonly coordinates?: string;
  readonly json?: boolean;
}

export function layoutCommand(done: (code: number) => void): Command {
  return new Command('layout')
    .description(
      'Recognise the layout of exported logs: print it for the study file, with the first rows as understood.',
    )
    .argument('<file...>', 'exported logs')
    .option('--time-zone <zone>', 'zone of times without an offset, such as Europe/Lisbon or +02:00')
    .option('--coordinates <system>', 'geographic, geocentric or the projection of plane coordinates')
    .option('--json', 'print the recognitions as JSON')
    .addHelpText(
      'after',
      '\nExit code: 0 every file is recognised and nothing is left to state, 1 something must be stated or a file is no log, 2 a mistake in the command or a missing file.',
    )
    .action(async (files: readonly string[], flags: LayoutFlags) => {
      const options = checkedOptions(flags);
      for (const file of files) requireFile(file);
      const recognitions: Recognition[] = [];
      for (const file of files) recognitions.push(recognizeLayout(await readHead(file), file, options));
      const texts = alike(recognitions, files).map(({ recognition, name }) =>
        recognitionText(recognition, name),
      );
      process.stdout.write(flags.json ? `${JSON.stringify(recognitions, null, 2)}\n` : texts.join('\n'));
      done(recognitions.every((found) => found.kind === 'recognized' && found.complete) ? 0 : 1);
    });
}

interface Answer {
  readonly recognition: Recognition;
  /** What the answer is about: a file, or how many files. */
  readonly name: string;
}

/** Files of one layout with the same questions get one answer, about a pattern that fits them. */
function alike(recognitions: readonly Recognition[], files: readonly string[]): Answer[] {
  const groups = new Map<string, number[]>();
  recognitions.forEach((recognition, k) => {
    const same =
      recognition.kind === 'recognized'
        ? JSON.stringify([
            recognition.layout,
            recognition.columns,
            recognition.coordinates,
            recognition.unsure.map(({ code, key }) => [code, key]),
          ])
        : `${k}`;
    groups.set(same, [...(groups.get(same) ?? []), k]);
  });
  return [...groups.values()].map((members) => {
    const [first] = members as [number];
    const recognition = recognitions[first]!;
    const name = files[first]!;
    if (recognition.kind === 'unrecognized') return { recognition, name };
    const own = members.map((k) => files[k]!);
    const pattern = own.length === 1 ? name : commonPattern(own);
    const file = besideStudyFile(pattern);
    const others = own.length === 1 ? '' : ` and ${own.length - 1} more of this layout`;
    return { recognition: { ...recognition, file }, name: `${name}${others}` };
  });
}

/** `logs/*.csv` for files of one folder and ending, else the first of them. */
function commonPattern(files: readonly string[]): string {
  const [first] = files as [string];
  const pattern = join(dirname(first), `*${extname(first)}`);
  const fits = files.every((file) => dirname(file) === dirname(first) && extname(file) === extname(first));
  return fits ? pattern : first;
}

/** A path as a study file in the folder of the log, or in one above it, would write it. */
function besideStudyFile(path: string): string {
  for (let folder = dirname(path); ; folder = dirname(folder)) {
    if (existsSync(join(folder, 'study.yaml'))) return relative(folder, path);
    if (folder === dirname(folder)) return path;
  }
}

function checkedOptions({ timeZone, coordinates }: LayoutFlags): RecognizeOptions {
  if (timeZone !== undefined && !isTimeZone(timeZone)) {
    throw inputError(
      'unknown-time-zone',
      `Expected as --time-zone ${expectedZone(timeZone)}, came ${quoted(timeZone)}. Correct it.`,
    );
  }
  if (coordinates !== undefined) checkCoordinates(coordinates);
  return { timeZone, coordinates };
}

function checkCoordinates(system: CoordinateSystem): void {
  try {
    coordinateColumns(system);
  } catch (error) {
    const reason = (error as Error).message.replace(/\.$/, '');
    throw inputError(
      'unknown-coordinates',
      `Expected "geographic", "geocentric" or a proj string as --coordinates, came ${quoted(system)}: ${reason}. Correct it.`,
    );
  }
}

function requireFile(file: string): void {
  const found = statSync(file, { throwIfNoEntry: false });
  if (found?.isFile()) return;
  throw inputError(
    'no-file',
    `Expected an exported log, came ${found === undefined ? 'a path that does not exist' : 'a folder'}. Name the file.`,
    { file },
  );
}
