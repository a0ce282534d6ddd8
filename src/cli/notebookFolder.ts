import { existsSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { inputError } from '../logs/index.js';

/**
 * Whether notebooks can run in a folder, asked before Jupyter comes up: it would only say that a kernel died.
 * @throws InputError when notebooks, kernel file, kernel or the built package are missing, with what to do
 */
export function requireNotebooks(folder: string): void {
  const from = createRequire(join(folder, 'notebooks', 'any.ipynb'));
  const missing = NEEDS.find(({ there }) => !there(folder, from));
  if (missing !== undefined) throw inputError(missing.code, missing.text, { file: folder });
}

interface Need {
  readonly code: string;
  readonly text: string;
  readonly there: (folder: string, from: NodeJS.Require) => boolean;
}

const NEEDS: readonly Need[] = [
  {
    code: 'no-notebooks',
    text: 'Expected a folder that holds notebooks/, came one without. Go to the folder that "ppmwise new" laid out and run "npm run notebook" there.',
    there: (folder) => existsSync(join(folder, 'notebooks')),
  },
  {
    code: 'no-kernel-file',
    text: 'Expected the file .jupyter/kernels/tslab/kernel.json, it is missing. Copy the folder .jupyter from one that "ppmwise new" lays out.',
    there: (folder) =>
      ['kernel.json', 'kernel.cjs'].every((name) => existsSync(join(folder, '.jupyter/kernels/tslab', name))),
  },
  {
    code: 'no-kernel',
    text: 'Expected the notebook kernel tslab, it is not installed here. Run "npm install" in this folder.',
    there: (_, from) => found(from, 'tslab/package.json'),
  },
  {
    code: 'not-installed',
    text: 'Expected the package ppmwise beside the notebooks, it is not installed or not built. Run "npm install" in this folder, or "npm run build" in a copy of the repository.',
    there: (_, from) => found(from, 'ppmwise'),
  },
];

function found(from: NodeJS.Require, name: string): boolean {
  try {
    return existsSync(from.resolve(name));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'MODULE_NOT_FOUND') return false;
    throw error;
  }
}
