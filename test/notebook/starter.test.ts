import { spawnSync } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { installPacked } from '../cli/packed.js';
import { emptyFolder, type Finished, ppmwise, REPOSITORY } from '../cli/ppmwise.js';
import { noNbconvert } from './jupyter.js';

/**
 * The first hour as a user has it: ppmwise packed and installed in an empty folder outside the repository, `new`, then
 * `npm install` in the study, which takes everything else from the registry or from npm's cache.
 */
const parent = installPacked();
const study = join(parent, 'mine');
const packedMain = join(parent, 'node_modules/ppmwise/dist/cli/main.js');
let installed: { readonly status: number | null; readonly stderr: string };

beforeAll(() => {
  expect(ppmwise(['new', 'mine'], parent, packedMain)).toMatchObject({ code: 0, err: '' });
  installed = spawnSync('npm', ['install', '--prefer-offline', '--no-audit', '--no-fund'], {
    cwd: study,
    encoding: 'utf8',
  });
});

const NO_REGISTRY = 'npm reaches no registry, and its cache does not hold the packages';
const offline = (): boolean => /ENOTCACHED|ENOTFOUND|ECONNREFUSED|ETIMEDOUT|EAI_AGAIN/.test(installed.stderr);
const main = (): string => join(study, 'node_modules/ppmwise/dist/cli/main.js');

/** Runs the packed command line where no other program can be found. */
function alone(args: readonly string[], cwd: string): Finished {
  const { status, stdout, stderr } = spawnSync(process.execPath, [packedMain, ...args], {
    cwd,
    encoding: 'utf8',
    env: { ...process.env, PATH: emptyFolder() },
  });
  return { code: status, out: stdout, err: stderr };
}

describe('a starter study', () => {
  it('depends on a ppmwise that lies beside it', () => {
    const { dependencies, scripts } = JSON.parse(readFileSync(join(study, 'package.json'), 'utf8'));
    expect(existsSync(join(study, dependencies.ppmwise.replace('file:', '')))).toBe(true);
    expect(scripts.notebook).toBe('ppmwise notebook');
  });
  it('has a README of ten lines and example rows that say so', () => {
    const lines = readFileSync(join(study, 'README.md'), 'utf8').trimEnd().split('\n');
    expect(lines).toHaveLength(10);
    for (const name of ['marks.csv', 'bases.csv']) {
      const rows = readFileSync(join(study, name), 'utf8')
        .trimEnd()
        .split('\n')
        .filter((line) => !line.startsWith('#'));
      expect(rows, name).toHaveLength(2);
      expect(rows[1], name).toMatch(/^EXAMPLE/);
    }
    expect(readdirSync(join(study, 'logs'))).toEqual([]);
  });
  it('has every notebook, which looks for the demo study in a place that is there', () => {
    const names = readdirSync(join(REPOSITORY, 'notebooks')).filter((name) => /^\d\d-.*ipynb$/.test(name));
    expect(readdirSync(join(study, 'notebooks')).sort()).toEqual(names.sort());
    for (const name of names) {
      const text = readFileSync(join(study, 'notebooks', name), 'utf8');
      expect(text, name).not.toContain('datasets-demo');
      for (const [, path] of text.matchAll(/'(\.\.\/[\w./-]+)'/g))
        expect(existsSync(join(study, 'notebooks', path!)), `${name}: ${path}`).toBe(true);
    }
  });
  it('installs, and reads the demo study at once', ({ skip }) => {
    skip(offline(), NO_REGISTRY);
    expect(installed.stderr).toBe('');
    expect(installed.status).toBe(0);
    const checked = ppmwise(['check', 'demo/study.yaml'], study, main());
    expect(checked).toMatchObject({ code: 0, err: '' });
    expect(checked.out).toContain('10\u202f450');
  });
  it('runs a notebook with Jupyter', ({ skip }) => {
    skip(offline(), NO_REGISTRY);
    skip(noNbconvert !== null, noNbconvert ?? '');
    const { status, stderr } = spawnSync(
      'jupyter',
      ['nbconvert', '--to', 'html', '--execute', '--output-dir', emptyFolder(), 'notebooks/01-own-ppm.ipynb'],
      { cwd: study, encoding: 'utf8', env: { ...process.env, JUPYTER_PATH: join(study, '.jupyter') } },
    );
    expect(status, stderr).toBe(0);
  });
});

describe('npm run notebook answers in one line', () => {
  /** A copy of the study without its packages, which are put where the test wants them. */
  function copyOf(): string {
    const copy = emptyFolder();
    for (const name of ['.jupyter', 'notebooks'])
      cpSync(join(study, name), join(copy, name), { recursive: true });
    return copy;
  }
  const oneLine = ({ code, err }: Finished, text: string): void => {
    expect(code).toBe(2);
    expect(err.trim().split('\n')).toHaveLength(1);
    expect(err).toContain(text);
  };
  it('where Jupyter is not installed', ({ skip }) => {
    skip(offline(), NO_REGISTRY);
    oneLine(alone(['notebook'], study), 'Install it with "sudo apt-get install');
  });
  it('in the wrong folder', () => {
    oneLine(alone(['notebook'], join(study, 'logs')), 'Go to the folder that "ppmwise new" laid out');
  });
  it('without the kernel file', () => {
    const copy = copyOf();
    rmSync(join(copy, '.jupyter'), { recursive: true });
    oneLine(alone(['notebook'], copy), 'Copy the folder .jupyter');
  });
  it('without the kernel', () => {
    oneLine(alone(['notebook'], copyOf()), 'Expected the notebook kernel tslab, it is not installed here.');
  });
  it('where ppmwise is not built', () => {
    const copy = copyOf();
    mkdirSync(join(copy, 'node_modules/tslab'), { recursive: true });
    cpSync(
      join(REPOSITORY, 'node_modules/tslab/package.json'),
      join(copy, 'node_modules/tslab/package.json'),
    );
    cpSync(
      join(parent, 'node_modules/ppmwise/package.json'),
      join(copy, 'node_modules/ppmwise/package.json'),
    );
    oneLine(alone(['notebook'], copy), 'Run "npm install" in this folder, or "npm run build"');
  });
});

describe('new', () => {
  it('says so where npm cannot be run, and what to do', () => {
    const { code, err } = alone(['new', 'other'], emptyFolder());
    expect(code).toBe(2);
    expect(err).toContain('Install npm, which comes with Node.js');
  });
  it('works from a package that a starter study has installed', ({ skip }) => {
    skip(offline(), NO_REGISTRY);
    const folder = emptyFolder();
    expect(ppmwise(['new', 'again'], folder, main()).code).toBe(0);
    const tarball = readdirSync(join(folder, 'again')).find((name) => name.endsWith('.tgz'))!;
    renameSync(join(folder, 'again', tarball), join(folder, tarball));
    const list = spawnSync('tar', ['-tzf', tarball], { cwd: folder, encoding: 'utf8' }).stdout.split('\n');
    for (const name of [
      'dist/cli/program.js',
      'notebooks/01-own-ppm.ipynb',
      '.jupyter/kernels/tslab/kernel.cjs',
    ])
      expect(list).toContain(`package/${name}`);
  });
});
