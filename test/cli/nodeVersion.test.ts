import { spawnSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { tooOld } from '../../src/cli/nodeVersion.js';
import { emptyFolder, REPOSITORY } from './ppmwise.js';

const { engines } = JSON.parse(readFileSync(join(REPOSITORY, 'package.json'), 'utf8'));
const oldest = engines.node.replace('>=', '');
const kernel = createRequire(import.meta.url)(join(REPOSITORY, '.jupyter/kernels/tslab/kernel.cjs')) as {
  nodeTooOld(version: string): string | null;
};

it('accepts the oldest Node.js of package.json and everything newer', () => {
  for (const version of [`${oldest}.0`, '20.20.2', '22.0.0', '100.1.0']) {
    expect(tooOld(version)).toBeNull();
    expect(kernel.nodeTooOld(version)).toBeNull();
  }
});

it('names both versions for an older one', () => {
  for (const version of ['20.18.1', '18.20.4', '6.0.0']) {
    expect(tooOld(version)).toContain(`Expected Node.js ${oldest} or newer, came ${version}.`);
    expect(kernel.nodeTooOld(version)).toContain(`Expected Node.js ${oldest} or newer, came ${version}.`);
  }
});

it('stops the command line and the kernel in one line before anything is loaded', () => {
  const pretend = join(emptyFolder(), 'pretend.cjs');
  writeFileSync(pretend, "Object.defineProperty(process.versions, 'node', { value: '18.19.0' });");
  for (const script of ['dist/cli/main.js', '.jupyter/kernels/tslab/kernel.cjs']) {
    const { status, stderr } = spawnSync(
      process.execPath,
      ['-r', pretend, join(REPOSITORY, script), 'check', 'x'],
      { encoding: 'utf8' },
    );
    expect(status, script).not.toBe(0);
    expect(stderr.trim().split('\n'), script).toHaveLength(1);
    expect(stderr).toContain('came 18.19.0. Install a newer one');
  }
});
