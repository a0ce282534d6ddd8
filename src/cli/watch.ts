import { existsSync, readdirSync, statSync } from 'node:fs';
import { mkdir, writeFile } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { Command } from 'commander';
import { inputError } from '../logs/index.js';
import { csvText, markdownOf, monthHtml, monthTables, watchFound, watchText } from '../report/index.js';
import { readResults, readStudy, type WatchRun, watchStudy } from '../study/index.js';
import { rowCounter } from './progress.js';

interface WatchFlags {
  readonly json?: boolean;
  readonly out?: string;
}

export function watchCommand(done: (code: number) => void): Command {
  return new Command('watch')
    .description('Hold new days of a study against the model of an earlier run.')
    .argument('<results>', 'results.json of the earlier run')
    .argument('<study>', 'study file whose logs hold the new days')
    .option('--out <dir>', 'write the page of the month there: month.html, month.md, watch.json, tables')
    .option('--json', 'print what was found as JSON')
    .addHelpText(
      'after',
      '\nExit code: 0 the model may stay, 1 fit again or nothing to watch by, 2 a mistake in the command, the study file or its files.',
    )
    .action(async (resultsFile: string, studyFile: string, flags: WatchFlags) => {
      const folder = flags.out === undefined ? null : resolve(flags.out);
      if (folder !== null) checkMonthFolder(folder);
      const earlier = await readResults(resultsFile);
      const study = await readStudy(studyFile);
      const progress = rowCounter();
      const watched = await watchStudy(earlier, study, { onProgress: progress.tell }).finally(progress.clear);
      if (folder !== null) await writeMonth(watched, earlier.crews, folder);
      const page = folder === null ? '' : `\nPage: ${join(folder, 'month.html')}\n`;
      process.stdout.write(flags.json ? jsonText(watched) : `${watchText(watched)}\n${page}`);
      const stays = watched.watches.length > 0 && watched.watches.every(({ fitAgain }) => !fitAgain);
      done(stays ? 0 : 1);
    });
}

const jsonText = (watched: WatchRun): string => `${JSON.stringify(watchFound(watched), null, 2)}\n`;

/**
 * A new or empty folder, or one with an earlier page.
 * @throws InputError when something else is in the way
 */
function checkMonthFolder(folder: string): void {
  if (!existsSync(folder)) return;
  const free =
    statSync(folder).isDirectory() &&
    (readdirSync(folder).length === 0 || existsSync(join(folder, 'watch.json')));
  if (free) return;
  throw inputError(
    'in-the-way',
    'Expected a new or empty folder, or one with an earlier page of a month, came something else. Name another folder with --out.',
    { file: folder },
  );
}

async function writeMonth(watched: WatchRun, crews: readonly string[], folder: string): Promise<void> {
  await mkdir(join(folder, 'tables'), { recursive: true });
  const page = monthHtml(watched, crews);
  await writeFile(join(folder, 'month.html'), page);
  await writeFile(join(folder, 'month.md'), markdownOf(page));
  await writeFile(join(folder, 'watch.json'), jsonText(watched));
  for (const { name, header, rows } of monthTables(watched)) {
    await writeFile(join(folder, 'tables', `${name}.csv`), csvText(header, rows));
  }
}
