import { Command } from 'commander';
import { watchText } from '../report/index.js';
import { readResults, readStudy, watchStudy } from '../study/index.js';
import { rowCounter } from './progress.js';

export function watchCommand(done: (code: number) => void): Command {
  return new Command('watch')
    .description('Hold new days of a study against the model of an earlier run.')
    .argument('<results>', 'results.json of the earlier run')
    .argument('<study>', 'study file whose logs hold the new days')
    .option('--json', 'print what was found as JSON')
    .addHelpText(
      'after',
      '\nExit code: 0 the model may stay, 1 fit again or nothing to watch by, 2 a mistake in the command, the study file or its files.',
    )
    .action(async (resultsFile: string, studyFile: string, flags: { readonly json?: boolean }) => {
      const earlier = await readResults(resultsFile);
      const study = await readStudy(studyFile);
      const progress = rowCounter();
      const watched = await watchStudy(earlier.watch, study, { onProgress: progress.tell }).finally(
        progress.clear,
      );
      const { watches, unwatched, messages } = watched;
      const found = { watches, unwatched, messages };
      process.stdout.write(flags.json ? `${JSON.stringify(found, null, 2)}\n` : `${watchText(watched)}\n`);
      const stays = watches.length > 0 && watches.every(({ fitAgain }) => !fitAgain);
      done(stays ? 0 : 1);
    });
}
