import { Command, CommanderError } from 'commander';
import { formatMessage, InputError } from '../logs/index.js';
import { softwareVersion } from '../study/index.js';
import { checkCommand } from './check.js';
import { demoCommand } from './demo.js';
import { layoutCommand } from './layout.js';
import { newCommand } from './new.js';
import { notebookCommand } from './notebook.js';
import { runCommand } from './run.js';
import { watchCommand } from './watch.js';

const EXIT_MISTAKE = 2;

/** Runs the command line and gives its exit code: 0 done, 1 no fit possible, 2 a mistake in command, study or files. */
async function main(argv: readonly string[]): Promise<number> {
  let code = 0;
  const done = (result: number): void => {
    code = result;
  };
  const program = new Command('ppmwise')
    .description(
      'From exported RTK check shots on known marks to your own "a mm + b ppm", with honest intervals, and the maximum baseline that holds a tolerance.',
    )
    .version(softwareVersion())
    .exitOverride()
    .showHelpAfterError('Run with --help to see how it is called.');
  for (const command of [
    runCommand(done),
    checkCommand(done),
    layoutCommand(done),
    demoCommand(done),
    newCommand(done),
    notebookCommand(done),
    watchCommand(done),
  ]) {
    program.addCommand(command.exitOverride().showHelpAfterError('Run with --help to see how it is called.'));
  }
  try {
    await program.parseAsync(argv);
    return code;
  } catch (error) {
    // Commander has printed its own message; asking for help or the version is no mistake.
    if (error instanceof CommanderError) return error.exitCode === 0 ? 0 : EXIT_MISTAKE;
    if (error instanceof InputError) {
      process.stderr.write(`${error.messages.map(formatMessage).join('\n')}\n`);
      return EXIT_MISTAKE;
    }
    const known = systemMistake(error);
    if (known !== null) {
      process.stderr.write(`error: ${known}\n`);
      return EXIT_MISTAKE;
    }
    throw error;
  }
}

/** What the operating system refused: the user can mend it, so it gets a sentence and no stack trace. */
function systemMistake(error: unknown): string | null {
  const { code, path } = error as NodeJS.ErrnoException;
  const words: Readonly<Record<string, string>> = {
    EACCES: 'Permission was denied',
    EPERM: 'Permission was denied',
    EROFS: 'The disk cannot be written',
    ENOSPC: 'The disk is full',
    ENOTDIR: 'A folder was expected and a file is there',
    EISDIR: 'A file was expected and a folder is there',
    ENOENT: 'A file vanished',
    EEXIST: 'A file is in the way',
  };
  const word = code === undefined ? undefined : words[code];
  return word === undefined
    ? null
    : `${word}${path === undefined ? '' : `: ${path}`}. Mend that and run again.`;
}

// A reader that closes the pipe early (head, less) is no error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});

process.exitCode = await main(process.argv);
