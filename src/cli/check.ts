import { Command } from 'commander';
import { accountLines, messageLines } from '../report/index.js';
import { readStudy, readStudyErrors } from '../study/index.js';
import { resultsText } from './outputs.js';
import { rowCounter } from './progress.js';

export function checkCommand(done: (code: number) => void): Command {
  return new Command('check')
    .description('Read and account for every row; fit nothing, write nothing.')
    .argument('<study>', 'study file, such as study.yaml')
    .option('--json', 'print the account as JSON')
    .addHelpText(
      'after',
      '\nExit code: 0 there are occupations to fit, 1 there are none, 2 a mistake in the command, the study file or its files.',
    )
    .action(async (studyFile: string, flags: { readonly json?: boolean }) => {
      const study = await readStudy(studyFile);
      const progress = rowCounter();
      const { results } = await readStudyErrors(study, { onProgress: progress.tell }).finally(progress.clear);
      const lines = [results.study.title, '', ...accountLines(results), ...messageLines(results.messages)];
      process.stdout.write(flags.json ? resultsText(results) : `${lines.join('\n')}\n`);
      done(results.occupations.used > 0 ? 0 : 1);
    });
}
