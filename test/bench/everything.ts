import { performance } from 'node:perf_hooks';
import { simulateErrors } from '../../src/campaign/index.js';
import type { OccupationError } from '../../src/errors/index.js';
import { jackknifeByDay } from '../../src/fit/index.js';
import { fitComponents } from '../../src/study/fitComponents.js';
import { judgeDays } from '../../src/study/judgeDays.js';
import { screenStudy } from '../../src/study/screenStudy.js';
import type { Study } from '../../src/study/study.js';

const DAYS = 60;
const PER_DAY = 167;
const RUNS = 3;

/**
 * All that a run makes of errors, on 10 000 occupations over 60 days: screening and its growth, every reference and form
 * with and without screening, the comparison of forms, days and hours, the jackknife. The aim is under 2 s.
 */
export function benchEverything(): void {
  const { rows } = simulateErrors({
    seed: 1,
    days: DAYS,
    occupationsPerDay: { from: PER_DAY, to: PER_DAY },
    wrongFixes: {},
    markSigmaMm: { east: 4, north: 4, up: 5 },
    badDays: {},
  });
  // A run knows more of an occupation, but nothing more goes into these numbers.
  const errors = rows as unknown as readonly OccupationError[];
  const study = { screen: true, reference: 'auto', form: 'root-sum-square', confidence: 0.95, seed: 1 };
  const totals: number[] = [];
  let [parts, processor] = ['', 0];
  for (let run = 0; run <= RUNS; run++) {
    const marks: [string, number][] = [];
    let last = performance.now();
    const before = process.cpuUsage();
    const done = (part: string): void => {
      marks.push([part, (performance.now() - last) / 1000]);
      last = performance.now();
    };
    const weights = screenStudy(errors, study as Study)!.weights;
    done('screening');
    const { components } = fitComponents(errors, weights, study as Study);
    done('fits');
    judgeDays(errors, weights, [], components, study as Study);
    done('days and hours');
    for (const { component, basis } of components)
      jackknifeByDay(errors, { component, reference: basis.reference, weights: weights ?? undefined });
    done('jackknife');
    if (run === 0) continue;
    processor = process.cpuUsage(before).user / 1e6;
    totals.push(marks.reduce((sum, [, seconds]) => sum + seconds, 0));
    parts = marks.map(([part, seconds]) => `${part} ${seconds.toFixed(2)}`).join(', ');
  }
  const middle = totals.sort((a, b) => a - b)[RUNS >> 1]!;
  console.log(
    `everything on ${rows.length} occupations over ${DAYS} days: ${middle.toFixed(2)} s (median of ${RUNS}; aim 2 s); last run: ${processor.toFixed(2)} s of processor, ${parts}`,
  );
}
