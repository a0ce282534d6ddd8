import { mkdir, writeFile } from 'node:fs/promises';
import { join, relative, resolve } from 'node:path';
import { Command } from 'commander';
import { studyJsonSchema } from '../study/index.js';
import { requireEmptyFolder } from './emptyFolder.js';
import { STARTER_FILES } from './starter.js';

export function newCommand(done: (code: number) => void): Command {
  return new Command('new')
    .description('Lay out a folder for a study of your own: study file, marks, bases, a place for logs.')
    .argument('<dir>', 'new or empty folder')
    .action(async (dir: string) => {
      const folder = resolve(dir);
      requireEmptyFolder(folder);
      await mkdir(join(folder, 'logs'), { recursive: true });
      for (const [name, text] of Object.entries(STARTER_FILES)) await writeFile(join(folder, name), text);
      await writeFile(join(folder, 'study.schema.json'), `${JSON.stringify(studyJsonSchema(), null, 2)}\n`);
      const study = relative(process.cwd(), join(folder, 'study.yaml'));
      process.stdout.write(
        `The study is in ${folder}. Next:\n\n  1. put your marks and bases into marks.csv and bases.csv\n  2. put your exported logs into logs/\n  3. npx ppmwise check ${study}\n  4. npx ppmwise run ${study}\n`,
      );
      done(0);
    });
}
