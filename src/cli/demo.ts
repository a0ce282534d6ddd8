import { cp, mkdir, readdir } from 'node:fs/promises';
import { join, relative, resolve } from 'node:path';
import { Command } from 'commander';
import { requireEmptyFolder } from './emptyFolder.js';
import { packageFolder } from './package.js';

export function demoCommand(done: (code: number) => void): Command {
  return new Command('demo')
    .description('Copy the invented demo study into a folder, to try ppmwise on.')
    .argument('<dir>', 'new or empty folder')
    .action(async (dir: string) => {
      const folder = resolve(dir);
      requireEmptyFolder(folder);
      await copyDemo(folder);
      const study = relative(process.cwd(), join(folder, 'study.yaml'));
      process.stdout.write(`The demo study is in ${folder}. Run it with:\n\n  npx ppmwise run ${study}\n`);
      done(0);
    });
}

/** Copies the demo study, without the program that makes its data: that belongs to the project, not to a study. */
export async function copyDemo(folder: string): Promise<void> {
  await mkdir(folder, { recursive: true });
  const source = join(packageFolder(), 'datasets-demo');
  for (const name of await readdir(source)) {
    if (!name.endsWith('.ts')) await cp(join(source, name), join(folder, name), { recursive: true });
  }
}
