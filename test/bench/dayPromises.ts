import { DEMO_OPTIONS } from '../../datasets-demo/make.js';
import { type CampaignOptions, simulateErrors } from '../../src/campaign/index.js';
import { degradedDays } from '../../src/days/degradedDays.js';
import { type DayEstimate, dayModel } from '../../src/days/index.js';
import { chooseReference, fitErrorModel, screenWrongFixes } from '../../src/fit/index.js';
import { median } from '../../src/stats/index.js';

/*
 * What comes of the share of wrong names that the posterior of the days promises: the same campaigns named at several
 * promises, and seasons of the demo's recipe, screened and fitted as a run does it.
 */

const PROMISES = [0.1, 0.09, 0.08, 0.07];
const COMPONENTS = ['horizontal', 'vertical'] as const;
type Component = (typeof COMPONENTS)[number];

interface PromiseCase {
  readonly name: string;
  readonly options: CampaignOptions;
  readonly replicates: number;
  readonly firstSeed: number;
  readonly asInARun: boolean;
}

const single = (days: number, runs: number): CampaignOptions => ({
  days,
  dayFactorLogSd: 0.25,
  badDays: { runs, runLength: 1, singles: 0, factor: { from: 2, to: 5 } },
});

const CASES: readonly PromiseCase[] = [
  { name: '60 days, 5 bad', options: single(60, 5), replicates: 400, firstSeed: 5_000_000, asInARun: false },
  { name: '30 days, 2 bad', options: single(30, 2), replicates: 500, firstSeed: 6_000_000, asInARun: false },
  { name: 'demo, 4 of 45', options: DEMO_OPTIONS, replicates: 150, firstSeed: 1000, asInARun: true },
];

/** Prints power and false share of every case at every promise. */
export function benchDayPromises(): void {
  const list = CASES.map(({ name, replicates, firstSeed }) => `${name}: ${replicates} from ${firstSeed} on`);
  console.log(`\nSeeds: ${list.join('; ')}. Power / false share:\n`);
  const heads = CASES.flatMap(({ name }) => COMPONENTS.map((component) => `${name}, ${component}`));
  console.log(`| promised at most | ${heads.join(' | ')} |`);
  console.log(`|---|${heads.map(() => '---|').join('')}`);
  const columns = CASES.flatMap((each) => COMPONENTS.map((component) => sharesOf(each, component)));
  PROMISES.forEach((promise, k) => {
    console.log(`| ${(100 * promise).toFixed(0)} % | ${columns.map((shares) => shares[k]).join(' | ')} |`);
  });
}

function sharesOf(
  { options, replicates, firstSeed, asInARun }: PromiseCase,
  component: Component,
): readonly string[] {
  const counts = PROMISES.map(() => ({ bad: 0, found: 0, named: 0, wrong: 0 }));
  for (let r = 0; r < replicates; r++) {
    const { rows, truth } = simulateErrors({ ...options, seed: firstSeed + r });
    const estimates = estimatesOf(rows, component, asInARun);
    const usual = median(truth.days.map(({ factor }) => factor));
    PROMISES.forEach((promise, k) => {
      const named = new Set(degradedDays(estimates, promise));
      const count = counts[k]!;
      for (const { day, factor, bad } of truth.days) {
        if (bad) count.bad += 1;
        if (bad && named.has(day)) count.found += 1;
        if (named.has(day)) count.named += 1;
        if (named.has(day) && factor < 1.5 * usual) count.wrong += 1;
      }
    });
  }
  return counts.map(
    ({ bad, found, named, wrong }) => `${(found / bad).toFixed(3)} / ${(wrong / named).toFixed(3)}`,
  );
}

function estimatesOf(
  rows: readonly object[],
  component: Component,
  asInARun: boolean,
): readonly DayEstimate[] {
  if (!asInARun) return dayModel(rows, fitErrorModel(rows, { component })).dayEstimates;
  const { weights } = screenWrongFixes(rows, { confidence: 0.95 });
  const { reference } = chooseReference(rows, { component, weights });
  return dayModel(rows, fitErrorModel(rows, { component, reference, weights }), weights).dayEstimates;
}
