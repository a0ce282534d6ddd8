import { join, resolve } from 'node:path';
import { Command } from 'commander';
import { summaryText } from '../report/index.js';
import { readStudy, runStudy } from '../study/index.js';
import { checkFolder, resultsText, writeOutputs } from './outputs.js';
import { rowCounter } from './progress.js';
import { setAsideFile } from './setAsideFile.js';

interface RunFlags {
  readonly out?: string;
  readonly force?: boolean;
  readonly json?: boolean;
}

export function runCommand(done: (code: number) => void): Command {
  return new Command('run')
    .description('The whole job: read the logs, fit the own error model, derive the rules, write the report.')
    .argument('<study>', 'study file, such as study.yaml')
    .option('--out <dir>', 'folder for the results (default: "results" beside the study file)')
    .option('--force', 'write into a folder that holds something else')
    .option('--json', 'print results.json instead of the summary')
    .addHelpText(
      'after',
      '\nExit code: 0 at least one fit, 1 no fit possible, 2 a mistake in the command, the study file or its files.',
    )
    .action(async (studyFile: string, flags: RunFlags) => {
      const study = await readStudy(studyFile);
      const folder = flags.out === undefined ? join(study.folder, 'results') : resolve(flags.out);
      checkFolder(folder, flags.force ?? false);
      const rows = setAsideFile();
      const progress = rowCounter();
      try {
        const run = await runStudy(study, { onSetAside: rows.add, onProgress: progress.tell }).finally(
          progress.clear,
        );
        await rows.close();
        await writeOutputs(run, folder, rows.path);
        const summary = `${summaryText(run.results)}\n\nReport: ${join(folder, 'report.html')}\n`;
        process.stdout.write(flags.json ? resultsText(run.results) : summary);
        done(run.results.fits.length > 0 ? 0 : 1);
      } finally {
        rows.remove();
      }
    });
}
