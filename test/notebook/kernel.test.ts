import { spawnSync } from 'node:child_process';
import { cpSync, mkdirSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { InputError, inputError } from '../../src/logs/index.js';
import { emptyFolder, REPOSITORY } from '../cli/ppmwise.js';

interface Executor {
  execute(source: string): Promise<boolean>;
}
interface Console {
  error(...what: unknown[]): void;
}
const KERNEL = join(REPOSITORY, '.jupyter/kernels/tslab/kernel.cjs');
const kernel = createRequire(import.meta.url)(KERNEL) as {
  cannotImport(folder: string): string | null;
  withPlainAnswers(
    create: (folder: string, converters: null, console: Console) => Executor,
  ): (folder: string, converters: null, console: Console) => Executor;
};

/** Runs a cell in a folder, with an executor that fails as told. */
async function answer(folder: string, source: string, failure: unknown = null): Promise<string[]> {
  const told: string[] = [];
  const create = kernel.withPlainAnswers((_folder, _converters, console) => ({
    execute: async () => {
      if (failure !== null) console.error(failure);
      return failure === null;
    },
  }));
  const executor = create(folder, null, { error: (what) => told.push(String(what)) });
  expect(await executor.execute(source)).toBe(told.length === 0);
  return told;
}

describe('a cell answers in one line', () => {
  const source = "import * as ppmwise from 'ppmwise';";
  it('where the package is not found, as for a notebook in another folder', async () => {
    const folder = emptyFolder();
    const told = await answer(folder, source);
    expect(told).toEqual([
      `The package ppmwise is not found from the folder ${folder}. Move the notebook into notebooks/ of the folder that "ppmwise new" laid out, or run "npm install" there, and restart the kernel.`,
    ]);
  });
  it('where the package is not built', async () => {
    const folder = emptyFolder();
    mkdirSync(join(folder, 'node_modules/ppmwise'), { recursive: true });
    cpSync(join(REPOSITORY, 'package.json'), join(folder, 'node_modules/ppmwise/package.json'));
    expect(await answer(folder, source)).toEqual([
      'The package ppmwise is not built. Run "npm run build" in the copy of the repository and restart the kernel.',
    ]);
  });
  it('to a mistake in a study or a file, with the folder from which files are looked for', async () => {
    const mistake = inputError('no-study-file', 'Expected a study file, there is none. Name it.');
    expect(mistake).toBeInstanceOf(InputError);
    const [told] = await answer(join(REPOSITORY, 'notebooks'), source, mistake);
    expect(told).toContain('Name it. A notebook looks for files from its own folder, ');
    expect(told).not.toContain('\n');
  });
  it('and leaves every other cell and error alone', async () => {
    expect(await answer(emptyFolder(), 'const a = 1;')).toEqual([]);
    const fault = new TypeError('x is not a function');
    expect(await answer(join(REPOSITORY, 'notebooks'), source, fault)).toEqual([String(fault)]);
  });
});

it('the kernel says in one line that tslab is not installed', () => {
  const folder = join(emptyFolder(), 'study');
  cpSync(join(REPOSITORY, '.jupyter'), join(folder, '.jupyter'), { recursive: true });
  writeFileSync(join(folder, 'connection.json'), '{}');
  const { status, stderr } = spawnSync(
    process.execPath,
    [join(folder, '.jupyter/kernels/tslab/kernel.cjs'), join(folder, 'connection.json')],
    { encoding: 'utf8' },
  );
  expect(status).toBe(1);
  expect(stderr.trim().split('\n')).toEqual([
    `Expected the notebook kernel tslab in ${folder}, it is not installed. Run "npm install" there and start Jupyter again.`,
  ]);
});
