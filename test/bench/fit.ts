import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { fitErrorModel, screenWrongFixes } from '../../src/fit/index.js';
import { normalDeviates, randomStream } from '../../src/stats/index.js';
import { benchEverything } from './everything.js';
import { medianSeconds } from './timing.js';

const OCCUPATIONS = 100_000;
const DAYS = 60;

/** A fit with intervals on 100 000 occupations over 60 days, and the same by R where R is installed. */
export async function benchFit(): Promise<void> {
  const normal = normalDeviates(randomStream(1, 'bench'));
  const random = randomStream(2, 'bench');
  const factors = Array.from({ length: DAYS }, () => Math.exp(0.3 * normal()));
  const rows = Array.from({ length: OCCUPATIONS }, (_, k) => {
    const day = k % DAYS;
    const baselineKm = 0.4 + 34 * random() ** 2;
    return { day: `day ${day}`, baselineKm, up: normal() * Math.hypot(8, factors[day]! * baselineKm) };
  });
  const ours = await medianSeconds(5, () => fitErrorModel(rows, { component: 'vertical' }));
  const { constantMm, ppm } = fitErrorModel(rows, { component: 'vertical' });
  console.log(
    `fit of ${OCCUPATIONS} occupations over ${DAYS} days with intervals: ${ours.toFixed(3)} s (median of 5; aim 0.5 s)`,
  );
  console.log(`  constant ${show(constantMm)} mm, ppm ${show(ppm)}`);
  compareWithR(rows, ours);
  benchEverything();
  await benchScreening();
}

const MANY = 1_000_000;

/** Screening, fit and intervals of a million occupations on forty marks over 300 days, 3 in 1000 of them wrong. */
async function benchScreening(): Promise<void> {
  const normal = normalDeviates(randomStream(3, 'bench'));
  const random = randomStream(4, 'bench');
  const rows = Array.from({ length: MANY }, (_, k) => {
    const mark = Math.floor(40 * random());
    const baselineKm = 0.4 * 1.1 ** mark;
    const sigma = random() < 0.003 ? 300 : Math.hypot(8, baselineKm);
    const [east, north, up] = [normal() * sigma, normal() * sigma, normal() * sigma];
    return { day: `day ${k % 300}`, mark: `M${mark}`, startMs: 1000 * k, baselineKm, east, north, up };
  });
  let found = screenWrongFixes(rows);
  const screening = await medianSeconds(1, () => {
    found = screenWrongFixes(rows);
  });
  const fit = await medianSeconds(1, () =>
    fitErrorModel(rows, { component: 'horizontal', weights: found.weights }),
  );
  console.log(
    `screening of ${MANY} occupations: ${screening.toFixed(1)} s, ${found.iterations} iterations, ${found.suspected.length} suspected; fit with intervals: ${fit.toFixed(1)} s (aim 10 s together)`,
  );
}

const show = ({
  estimate,
  low,
  high,
}: {
  estimate: number | null;
  low: number | null;
  high: number | null;
}): string => `${estimate?.toFixed(4)} [${low?.toFixed(4)}, ${high?.toFixed(4)}]`;

function compareWithR(rows: readonly { day: string; baselineKm: number; up: number }[], ours: number): void {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-bench-'));
  try {
    const data = join(folder, 'errors.csv');
    writeFileSync(data, `day,L,e\n${rows.map((r) => `${r.day},${r.baselineKm},${r.up}`).join('\n')}\n`);
    const script = fileURLToPath(new URL('./fit.R', import.meta.url));
    const output = execFileSync('Rscript', [script, data], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    console.log(output.trimEnd());
    const seconds = Number(/total ([\d.]+) s/.exec(output)?.[1]);
    console.log(`  R takes ${(seconds / ours).toFixed(0)} times as long`);
  } catch (error) {
    const reason =
      (error as { stderr?: string }).stderr?.split('\n')[0] || (error as Error).message.split('\n')[0];
    console.log(`  no comparison: R with the package clubSandwich did not run (${reason})`);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
