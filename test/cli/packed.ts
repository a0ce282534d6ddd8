import { execFileSync } from 'node:child_process';
import { mkdirSync, readdirSync, readFileSync, renameSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { emptyFolder, REPOSITORY } from './ppmwise.js';

/**
 * The package as it would be installed: packed, unpacked into the node_modules of an empty folder. Its dependencies are
 * linked from this repository, exactly those that package.json names, so that a missing one is found without a network.
 */
export function installPacked(): string {
  const folder = emptyFolder();
  execFileSync('npm', ['pack', '--ignore-scripts', '--pack-destination', folder], {
    cwd: REPOSITORY,
    stdio: 'pipe',
  });
  const tarball = readdirSync(folder).find((name) => name.endsWith('.tgz'))!;
  execFileSync('tar', ['-xzf', tarball], { cwd: folder });
  const modules = join(folder, 'node_modules');
  mkdirSync(join(modules, '@resvg'), { recursive: true });
  mkdirSync(join(modules, '@uwdata'), { recursive: true });
  renameSync(join(folder, 'package'), join(modules, 'ppmwise'));
  const { dependencies } = JSON.parse(readFileSync(join(modules, 'ppmwise/package.json'), 'utf8'));
  for (const name of Object.keys(dependencies))
    symlinkSync(join(REPOSITORY, 'node_modules', name), join(modules, name));
  return folder;
}
