import { existsSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { inputError } from '../logs/index.js';
import { csvText, reportHtml, reportTables } from '../report/index.js';
import type { Results, StudyRun } from '../study/index.js';
import { drawPictures } from './pictures.js';

/** Names that a run writes in its folder; nothing else there is ever touched. */
const OWN_FILES = ['results.json', 'report.html'];
const OWN_FOLDERS = ['tables', 'charts'];

/**
 * Makes the folder ready: an old result of ppmwise is removed, anything else needs --force.
 * @throws InputError when something else is in the way
 */
export async function prepareFolder(folder: string, force: boolean): Promise<void> {
  if (existsSync(folder)) {
    if (!statSync(folder).isDirectory()) {
      throw inputError(
        'in-the-way',
        `Expected a folder for the results, came a file. Name another folder with --out.`,
        {
          file: folder,
        },
      );
    }
    if (readdirSync(folder).length > 0 && !force && !isOwnResult(folder)) {
      throw inputError(
        'in-the-way',
        'The folder holds something that is no result of ppmwise. Name another folder with --out, or write into it with --force.',
        { file: folder },
      );
    }
  }
  for (const name of [...OWN_FILES, ...OWN_FOLDERS])
    rmSync(join(folder, name), { recursive: true, force: true });
  for (const name of OWN_FOLDERS) await mkdir(join(folder, name), { recursive: true });
}

function isOwnResult(folder: string): boolean {
  try {
    const { version, rows } = JSON.parse(
      readFileSync(join(folder, 'results.json'), 'utf8'),
    ) as Partial<Results>;
    return version === 1 && typeof rows?.read === 'number';
  } catch {
    return false;
  }
}

/** Writes everything of a run: results, report, tables, charts. */
export async function writeOutputs(run: StudyRun, folder: string): Promise<void> {
  for (const { name, header, rows } of reportTables(run)) {
    await writeFile(join(folder, 'tables', `${name}.csv`), csvText(header, rows));
  }
  const { pictures, files } = await drawPictures(run);
  for (const [name, svg] of files) await writeFile(join(folder, 'charts', `${name}.svg`), svg);
  await writeFile(join(folder, 'report.html'), reportHtml(run.results, pictures));
  await writeFile(join(folder, 'results.json'), resultsText(run.results));
}

export const resultsText = (results: Results): string => `${JSON.stringify(results, null, 2)}\n`;
