import { mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { writeOutputs } from '../../src/cli/outputs.js';
import { drawPictures } from '../../src/cli/pictures.js';
import { annexHtml, cardHtml, reportHtml, weightsHtml } from '../../src/report/index.js';
import { readStudy, runStudy, type StudyRun } from '../../src/study/index.js';
import { medianSeconds } from './timing.js';

/**
 * Pages and charts of the demo study (the aim is 3 s), and all that is written of 100 000 occupations (10 s, each page
 * under 3 MB): those of the demo repeated, under its fits.
 */
export async function benchPages(): Promise<void> {
  const demo = await runStudy(await readStudy('datasets-demo/study.yaml'));
  const drawn = await medianSeconds(3, () => pages(demo));
  console.log(`pages and charts of the demo study: ${drawn.toFixed(2)} s (median of 3)`);
  const times = Math.ceil(100_000 / demo.errors.length);
  const errors = Array.from({ length: times }, () => demo.errors).flat();
  const weights = new Float64Array(errors.length).fill(1);
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-bench-'));
  try {
    const rows = join(folder, 'rows.csv');
    writeFileSync(rows, '');
    const out = join(folder, 'out');
    const seconds = await medianSeconds(1, () => writeOutputs({ ...demo, errors, weights }, out, rows));
    const largest = Math.max(
      ...readdirSync(out)
        .filter((name) => name.endsWith('.html'))
        .map((name) => statSync(join(out, name)).size),
    );
    console.log(
      `everything written of ${errors.length} occupations: ${seconds.toFixed(2)} s; largest page ${(largest / 1e6).toFixed(2)} MB`,
    );
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function pages(run: StudyRun): Promise<void> {
  const { pictures } = await drawPictures(run);
  reportHtml(run.results, pictures);
  annexHtml(run, pictures);
  cardHtml(run.results);
  weightsHtml(run.results);
}
