import { spawnSync } from 'node:child_process';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const REPOSITORY = fileURLToPath(new URL('../../', import.meta.url));
const MAIN = join(REPOSITORY, 'dist/cli/main.js');

export interface Finished {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

/** Runs the built command line in a folder. */
export function ppmwise(args: readonly string[], cwd: string = REPOSITORY, main: string = MAIN): Finished {
  const { status, stdout, stderr } = spawnSync(process.execPath, [main, ...args], { cwd, encoding: 'utf8' });
  return { code: status, out: stdout, err: stderr };
}

/** A new empty folder of its own. */
export const emptyFolder = (): string => mkdtempSync(join(tmpdir(), 'ppmwise-test-'));
