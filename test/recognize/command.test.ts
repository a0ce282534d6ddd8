import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { Command } from 'commander';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { layoutCommand } from '../../src/cli/layout.js';
import { InputError } from '../../src/logs/index.js';
import { testFolder } from '../files.js';
import { file } from './heads.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix';
const plain = folder.write('plain.csv', file(HEADER, '2025-03-04T09:00:00Z,CP1,47.01,8.0,500.1,fixed'));
const wall = folder.write('wall.csv', file(HEADER, '2025-03-04T09:00:00,CP1,47.01,8.0,500.1,fixed'));
const points = folder.write(
  'points.csv',
  file('1,4982950.4,500000.0,135.1,M03', '2,4982951.4,500001.0,135.2,M04'),
);

afterEach(() => vi.restoreAllMocks());

/** Runs `ppmwise layout` and gives its exit code and what it printed. */
async function layout(...args: readonly string[]): Promise<{ readonly code: number; readonly out: string }> {
  let [code, out] = [-1, ''];
  vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
    out += String(text);
    return true;
  });
  const command = layoutCommand((result) => {
    code = result;
  });
  await new Command('ppmwise').addCommand(command).parseAsync(['node', 'ppmwise', 'layout', ...args]);
  return { code, out };
}

describe('ppmwise layout', () => {
  it('prints each file and gives 0 when nothing is left to state', async () => {
    const { code, out } = await layout(plain, wall, '--time-zone', 'Europe/Lisbon');
    expect(code).toBe(0);
    // Both are of one layout: one answer, about a pattern that fits them.
    expect(out).toContain(`${plain} and 1 more of this layout: the layout is recognised and complete.`);
    expect(out).toContain(`files: ${join(dirname(plain), '*.csv')}`);
  });

  it('writes paths as the study file nearby would', async () => {
    folder.write('study/study.yaml', '');
    const log = folder.write('study/logs/a.csv', readFileSync(plain));
    expect((await layout(log)).out).toContain('files: logs/a.csv');
  });

  it('gives 1 when something must be stated or a file is no log', async () => {
    expect((await layout(plain, wall)).code).toBe(1);
    const empty = await layout(plain, folder.write('empty.csv', ''));
    expect(empty.code).toBe(1);
    expect(empty.out).toContain('error: Expected a header and positions, came an empty file.');
  });

  it('takes the projection of plane coordinates', async () => {
    const { out } = await layout(points, '--coordinates', '+proj=utm +zone=33 +ellps=WGS84');
    expect(out).toContain('coordinates: +proj=utm +zone=33 +ellps=WGS84');
    expect(out).toContain('northing: 2');
    expect((await layout(points)).out).not.toContain('northing: 2\n');
  });

  it('prints JSON', async () => {
    const { code, out } = await layout(plain, points, '--json');
    expect(code).toBe(1);
    const found = JSON.parse(out) as readonly Record<string, unknown>[];
    expect(found.map(({ kind, complete }) => [kind, complete])).toEqual([
      ['recognized', true],
      ['recognized', false],
    ]);
  });

  it.each([
    [['nowhere.csv'], /came a path that does not exist\. Name the file\./],
    [[folder.path], /came a folder\. Name the file\./],
    [[plain, '--time-zone', 'Mars'], /as --time-zone an IANA time zone .*, came "Mars"\. Correct it\./],
    [[plain, '--coordinates', 'mars'], /as --coordinates, came "mars"/],
  ])('refuses %j', async (args, text) => {
    const refused = layout(...args);
    await expect(refused).rejects.toBeInstanceOf(InputError);
    await expect(refused).rejects.toThrow(text);
  });
});
