import { existsSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { copyFile, mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { inputError } from '../logs/index.js';
import {
  annexHtml,
  arrowBytes,
  cardHtml,
  csvText,
  jobsGeoJson,
  markdownOf,
  marksGeoJson,
  reportHtml,
  reportTables,
  weightsHtml,
} from '../report/index.js';
import type { Results, StudyRun } from '../study/index.js';
import { drawPictures } from './pictures.js';

/** Folders that belong to a result: those of an old one are replaced whole, so that no stale table stays behind. */
const OWN_FOLDERS = ['tables', 'charts', 'exports'];

/** Long tables that analysts load: beside CSV with types. */
const ARROW_TABLES = ['errors', 'set-aside-occupations', 'visits-without-fix'];

/**
 * Checks that results may be written into a folder: it is new, empty, holds an old result, or --force is given. Nothing is
 * changed yet.
 * @throws InputError when something else is in the way
 */
export function checkFolder(folder: string, force: boolean): void {
  if (!existsSync(folder)) return;
  if (!statSync(folder).isDirectory()) {
    const text = 'Expected a folder for the results, came a file. Name another folder with --out.';
    throw inputError('in-the-way', text, { file: folder });
  }
  if (readdirSync(folder).length > 0 && !force && !isOwnResult(folder)) {
    throw inputError(
      'in-the-way',
      'The folder holds something that is no result of ppmwise. Name another folder with --out, or write into it with --force.',
      { file: folder },
    );
  }
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

/**
 * Writes everything of a run: results, report, tables, charts. Other files in the folder are never touched.
 * @param setAsideRows file with the set-aside rows, which becomes one of the tables
 */
export async function writeOutputs(run: StudyRun, folder: string, setAsideRows: string): Promise<void> {
  const old = existsSync(folder) && isOwnResult(folder);
  for (const name of OWN_FOLDERS) {
    if (old) rmSync(join(folder, name), { recursive: true, force: true });
    await mkdir(join(folder, name), { recursive: true });
  }
  await copyFile(setAsideRows, join(folder, 'tables', 'set-aside.csv'));
  const tables = reportTables(run);
  for (const table of tables) {
    const { name, header, rows } = table;
    await writeFile(join(folder, 'tables', `${name}.csv`), csvText(header, rows));
    if (ARROW_TABLES.includes(name)) {
      await writeFile(join(folder, 'exports', `${name}.arrow`), arrowBytes(table));
    }
  }
  await writeFile(join(folder, 'exports', 'marks.geojson'), marksGeoJson(run));
  if (run.results.jobs.length > 0) {
    await writeFile(join(folder, 'exports', 'jobs.geojson'), jobsGeoJson(run.results));
  }
  const { pictures, files } = await drawPictures(run);
  for (const [name, svg] of files) await writeFile(join(folder, 'charts', `${name}.svg`), svg);
  const pages = {
    report: reportHtml(run.results, pictures),
    annex: annexHtml(run, pictures, tables),
    card: cardHtml(run.results),
    weights: weightsHtml(run.results),
  };
  for (const [name, page] of Object.entries(pages)) {
    await writeFile(join(folder, `${name}.html`), page);
    await writeFile(join(folder, `${name}.md`), markdownOf(page));
  }
  await writeFile(join(folder, 'results.json'), resultsText(run.results));
}

export const resultsText = (results: Results): string => `${JSON.stringify(results, null, 2)}\n`;
