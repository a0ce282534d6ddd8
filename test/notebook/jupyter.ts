import { spawnSync } from 'node:child_process';

/** Whether a program answers to `--version`. */
const answers = (program: string, args: readonly string[]): boolean =>
  spawnSync(program, args, { stdio: 'ignore' }).status === 0;

/** Why notebooks cannot be run by Jupyter here; null when they can. */
export const noNbconvert = answers('jupyter', ['nbconvert', '--version'])
  ? null
  : 'Jupyter is not installed: apt-get install --no-install-recommends jupyter-notebook jupyter-nbconvert';

/** Why no browser can drive Jupyter here; null when one can. */
export const noFrontEnd = !answers('jupyter', ['notebook', '--version'])
  ? 'Jupyter is not installed: apt-get install --no-install-recommends jupyter-notebook'
  : answers('chromium', ['--version'])
    ? null
    : 'Chromium is not installed: apt-get install --no-install-recommends chromium';

/** Where Chromium is. */
export const chromiumPath = (): string =>
  spawnSync('sh', ['-c', 'command -v chromium'], { encoding: 'utf8' }).stdout.trim();
