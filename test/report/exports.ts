import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { REPOSITORY } from '../cli/ppmwise.js';

/** The block of a kind on the page that shows how to load the results. */
export function shownBlock(kind: string): string {
  const text = readFileSync(join(REPOSITORY, 'docs/load-in-r-and-python.md'), 'utf8');
  return new RegExp(`\`\`\`${kind}\\n([\\s\\S]*?)\`\`\``).exec(text)![1]!;
}

/** What a program prints when it is handed a script, in a folder; null when it cannot be run. */
export function printed(program: string, args: readonly string[], folder: string): string | null {
  const { status, stdout, error } = spawnSync(program, args, { cwd: folder, encoding: 'utf8' });
  return error !== undefined || status !== 0 ? null : stdout.trim();
}
