import { statSync } from 'node:fs';
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
import { isTimeZone } from '../time/index.js';

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
    .option('--time-zone <zone>', 'zone of times without an offset, such as Europe/Lisbon or Etc/GMT+1')
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
      const texts = recognitions.map((recognition, k) => recognitionText(recognition, files[k]!));
      process.stdout.write(flags.json ? `${JSON.stringify(recognitions, null, 2)}\n` : texts.join('\n'));
      done(recognitions.every((found) => found.kind === 'recognized' && found.complete) ? 0 : 1);
    });
}

function checkedOptions({ timeZone, coordinates }: LayoutFlags): RecognizeOptions {
  if (timeZone !== undefined && !isTimeZone(timeZone)) {
    throw inputError(
      'unknown-time-zone',
      `Expected an IANA time zone like Europe/Lisbon or Etc/GMT+1 as --time-zone, came ${quoted(timeZone)}. Correct it.`,
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
