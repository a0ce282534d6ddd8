import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { inputError } from '../logs/index.js';
import { packageFolder } from './package.js';

/**
 * The package.json of a starter study. It depends on the very ppmwise that is running, packed into the study's folder:
 * whether that came from a tarball, a registry, a repository or a passing cache of npx, the study keeps it, also on
 * another computer.
 * @throws InputError when npm cannot be run
 */
export async function writeStarterPackage(folder: string): Promise<void> {
  const { version, devDependencies } = JSON.parse(
    readFileSync(join(packageFolder(), 'package.json'), 'utf8'),
  ) as { version: string; devDependencies: { tslab: string } };
  const tarball = `ppmwise-${version}.tgz`;
  packInto(folder, tarball);
  const content = {
    name: 'check-shots',
    private: true,
    scripts: {
      check: 'ppmwise check study.yaml',
      study: 'ppmwise run study.yaml',
      notebook: 'ppmwise notebook',
    },
    dependencies: { ppmwise: `file:${tarball}`, tslab: devDependencies.tslab },
    // npm asks before it runs what a package brings for its own installation
    allowScripts: { zeromq: true },
  };
  await writeFile(join(folder, 'package.json'), `${JSON.stringify(content, null, 2)}\n`);
}

function packInto(folder: string, tarball: string): void {
  const { status, stderr, error } = spawnSync(
    'npm',
    ['pack', '--silent', '--ignore-scripts', '--workspaces=false', '--pack-destination', folder],
    // npm is a script of the shell on Windows
    { cwd: packageFolder(), encoding: 'utf8', shell: process.platform === 'win32' },
  );
  if (status === 0 && existsSync(join(folder, tarball))) return;
  const told = (error?.message ?? stderr.trim().split('\n')[0]) || `exit code ${status}`;
  throw inputError(
    'npm',
    `Expected npm to pack ppmwise into the study, came "${told}". Install npm, which comes with Node.js, and run again with a new folder.`,
    { file: folder },
  );
}
