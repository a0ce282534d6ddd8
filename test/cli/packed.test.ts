import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { installPacked } from './packed.js';
import { ppmwise } from './ppmwise.js';

describe('the packed package', () => {
  const folder = installPacked();
  const installed = join(folder, 'node_modules/ppmwise');
  const main = join(installed, 'dist/cli/main.js');
  it('runs every command in an empty folder', () => {
    expect(ppmwise(['demo', 'try'], folder, main).code).toBe(0);
    expect(ppmwise(['check', 'try/study.yaml'], folder, main).code).toBe(0);
    const run = ppmwise(['run', 'try/study.yaml'], folder, main);
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(existsSync(join(folder, 'try/results/report.html'))).toBe(true);
    expect(ppmwise(['new', 'mine'], folder, main).code).toBe(0);
    expect(existsSync(join(folder, 'mine/study.yaml'))).toBe(true);
  });
  it('can be imported and required as a library', () => {
    const script =
      "const p = require('ppmwise'); console.log(typeof p.runStudy, typeof p.show, typeof p.errorByBaselineChart)";
    expect(execFileSync(process.execPath, ['-e', script], { cwd: folder, encoding: 'utf8' })).toBe(
      'function function function\n',
    );
  });
  it('holds what it needs and no tests or sources', () => {
    const names = readdirSync(installed).sort();
    expect(names).toEqual([
      '.jupyter',
      'CHANGELOG.md',
      'DEVELOPERS.md',
      'LICENSE',
      'README.md',
      'datasets-demo',
      'dist',
      'docs',
      'notebooks',
      'package.json',
    ]);
    expect(readdirSync(join(installed, 'datasets-demo')).some((name) => name.endsWith('.ts'))).toBe(false);
  });
});
