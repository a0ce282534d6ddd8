import { execFile } from 'node:child_process';
import { copyFileSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { describe, expect, it } from 'vitest';
import { REPOSITORY } from '../cli/ppmwise.js';

const run = promisify(execFile);
const FOLDER = join(REPOSITORY, 'notebooks');
const RUNNER = join(FOLDER, 'run-notebook.cjs');
const notebooks = readdirSync(FOLDER).filter(
  (name) => name.endsWith('.ipynb') && !name.startsWith('executed-'),
);

interface Cell {
  cell_type: string;
  source: string[];
  execution_count: number | null;
  outputs?: { output_type: string; text?: string; data?: Record<string, string> }[];
}
const cells = (file: string): Cell[] => JSON.parse(readFileSync(file, 'utf8')).cells;
const texts = (file: string): unknown[] =>
  cells(file)
    .flatMap(({ outputs }) => outputs ?? [])
    .map(({ text, data }) => text ?? data?.['text/plain']);

describe.each(notebooks)('%s', (name) => {
  it('runs from top to bottom and gives the outputs it is committed with', async () => {
    // Beside the original, because a notebook finds its data from its own folder.
    const copy = join(FOLDER, `executed-${process.pid}-${name}`);
    copyFileSync(join(FOLDER, name), copy);
    try {
      await run(process.execPath, [RUNNER, '--in-place', copy]);
      expect(texts(copy)).toEqual(texts(join(FOLDER, name)));
    } finally {
      rmSync(copy);
    }
  });
  it('shows pictures, tables and no error, and names no path or time of a machine', () => {
    const outputs = cells(join(FOLDER, name)).flatMap(({ outputs: all }) => all ?? []);
    const types = outputs.flatMap(({ data }) => Object.keys(data ?? {}));
    expect(types).toContain('image/png');
    expect(types).toContain('text/html');
    const text = JSON.stringify(
      outputs.map(({ text: printed, data }) => [printed, data?.['text/plain'], data?.['text/html']]),
    );
    expect(text).not.toMatch(/\/home\/|\/tmp\/|Error/);
  });
  it.skipIf(name.startsWith('05'))('runs on one week of a study without jobs and indices', async () => {
    const copy = join(FOLDER, `executed-${process.pid}-week-${name}`);
    const text = readFileSync(join(FOLDER, name), 'utf8');
    const reading = "await ppmwise.readStudy('../datasets-demo/study.yaml')";
    expect(text).toContain(reading);
    const week = `{ ...(${reading}), period: { from: '2025-03-03', to: '2025-03-07' }, indices: [], jobs: [] }`;
    writeFileSync(copy, text.replace(reading, week));
    try {
      await run(process.execPath, [RUNNER, copy]);
    } finally {
      rmSync(copy);
    }
  });
  it('has fewer than 15 code cells', () => {
    expect(cells(join(FOLDER, name)).filter(({ cell_type: type }) => type === 'code').length).toBeLessThan(
      15,
    );
  });
});

describe('the runner', () => {
  it('stops at a failing cell, shows it with its error and leaves the file alone', async () => {
    const file = join(FOLDER, `executed-${process.pid}-broken.ipynb`);
    const text = JSON.stringify({
      cells: [{ cell_type: 'code', source: ['const x: number = "word";'], outputs: [] }],
    });
    writeFileSync(file, text);
    try {
      await expect(run(process.execPath, [RUNNER, '--in-place', file])).rejects.toMatchObject({
        code: 1,
        stderr: expect.stringContaining("Type 'string' is not assignable to type 'number'"),
      });
      expect(readFileSync(file, 'utf8')).toBe(text);
    } finally {
      rmSync(file);
    }
  });
  it('says what is missing when called wrongly', async () => {
    await expect(run(process.execPath, [RUNNER])).rejects.toMatchObject({
      stderr: expect.stringContaining('Expected at least one notebook'),
    });
    await expect(run(process.execPath, [RUNNER, 'none.ipynb'])).rejects.toMatchObject({
      stderr: expect.stringContaining('there is no file'),
    });
  });
});
