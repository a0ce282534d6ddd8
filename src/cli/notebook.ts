import { spawn, spawnSync } from 'node:child_process';
import { delimiter, join } from 'node:path';
import { Command } from 'commander';
import { inputError } from '../logs/index.js';
import { requireNotebooks } from './notebookFolder.js';

/** The front ends that will do, the one tried first in front. */
const FRONT_ENDS = ['notebook', 'lab'] as const;

export function notebookCommand(done: (code: number) => void): Command {
  return new Command('notebook')
    .description('Open the notebooks of the folder in Jupyter. Options that it does not know go to Jupyter.')
    .argument('[options...]', 'options of Jupyter, such as --no-browser')
    .allowUnknownOption()
    .action(async (options: readonly string[]) => {
      const folder = process.cwd();
      requireNotebooks(folder);
      done(await jupyter(folder, [frontEnd(), '--notebook-dir=notebooks', ...rootOption(), ...options]));
    });
}

/** @throws InputError when Jupyter is not installed */
function frontEnd(): string {
  const found = FRONT_ENDS.find((name) => spawnSync('jupyter', [name, '--version']).status === 0);
  if (found !== undefined) return found;
  throw inputError(
    'no-jupyter',
    'Expected Jupyter, it is not installed. Install it with "sudo apt-get install --no-install-recommends jupyter-notebook jupyter-nbconvert" (Debian, Ubuntu) or "pip install notebook" and run again.',
  );
}

/** Jupyter refuses to run for root, as in a container, unless told. */
const rootOption = (): readonly string[] => (process.getuid?.() === 0 ? ['--allow-root'] : []);

/** Runs Jupyter until it ends; its kernels are found in the folder first. */
function jupyter(folder: string, args: readonly string[]): Promise<number> {
  // The path must be absolute, or the kernel starts in a place where it is not found.
  const paths = [join(folder, '.jupyter'), process.env.JUPYTER_PATH].filter((path) => path !== undefined);
  const child = spawn('jupyter', args, {
    cwd: folder,
    stdio: 'inherit',
    env: { ...process.env, JUPYTER_PATH: paths.join(delimiter) },
  });
  // Ctrl-C reaches Jupyter too, which asks back; this process ends after it.
  process.on('SIGINT', () => {});
  process.on('SIGTERM', () => child.kill('SIGTERM'));
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('close', (code) => resolve(code ?? 0));
  });
}
