import { existsSync, readdirSync, statSync } from 'node:fs';
import { inputError } from '../logs/index.js';

/** @throws InputError unless the folder does not exist or is empty: nothing of the user's is overwritten */
export function requireEmptyFolder(folder: string): void {
  if (!existsSync(folder)) return;
  if (statSync(folder).isDirectory() && readdirSync(folder).length === 0) return;
  throw inputError(
    'in-the-way',
    'Expected a new or empty folder, came one that holds something. Name another folder.',
    {
      file: folder,
    },
  );
}
