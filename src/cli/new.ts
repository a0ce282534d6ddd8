import { mkdir, writeFile } from 'node:fs/promises';
import { join, relative, resolve } from 'node:path';
import { Command } from 'commander';
import { studyJsonSchema } from '../study/index.js';
import { copyDemo } from './demo.js';
import { requireEmptyFolder } from './emptyFolder.js';
import { STARTER_FILES } from './starter.js';
import { writeStarterNotebooks } from './starterNotebooks.js';
import { writeStarterPackage } from './starterPackage.js';

export function newCommand(done: (code: number) => void): Command {
  return new Command('new')
    .description(
      'Lay out a folder for a study of your own: study file, marks, bases, a place for logs, notebooks.',
    )
    .argument('<dir>', 'new or empty folder')
    .action(async (dir: string) => {
      const folder = resolve(dir);
      requireEmptyFolder(folder);
      await mkdir(join(folder, 'logs'), { recursive: true });
      await writeStarterPackage(folder);
      for (const [name, text] of Object.entries(STARTER_FILES)) await writeFile(join(folder, name), text);
      await writeFile(join(folder, 'study.schema.json'), `${JSON.stringify(studyJsonSchema(), null, 2)}\n`);
      await copyDemo(join(folder, 'demo'));
      await writeStarterNotebooks(folder);
      const way = relative(process.cwd(), folder);
      process.stdout.write(`The study is in ${folder}. Next:

  1. cd ${way.includes(' ') ? `"${way}"` : way} && npm install
  2. npm run notebook                      (opens the notebooks, on the invented study in demo/)
  3. put your marks and bases into marks.csv and bases.csv, your exported logs into logs/
  4. npx ppmwise layout logs/*             (what it makes of the logs, and what it must be told)
  5. npx ppmwise check study.yaml
  6. npx ppmwise run study.yaml
`);
      done(0);
    });
}
