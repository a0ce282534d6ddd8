import { performance } from 'node:perf_hooks';
import { type BadDayOptions, type CampaignOptions, simulateErrors } from '../../src/campaign/index.js';
import {
  dayModel,
  dayModelOf,
  fittedData,
  fittedSpread,
  moderatedDays,
  timeOfDay,
} from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { median, normalDeviates, randomStream } from '../../src/stats/index.js';
import { benchDayPromises } from './dayPromises.js';
import { benchDayVerdicts } from './dayVerdicts.js';
import { medianSeconds } from './timing.js';

/*
 * How well degraded days are found and how often others are named, and level and power of the test of hours, on
 * simulated campaigns. Prints Markdown, of which docs/evidence-days.md holds a copy.
 */

const REPLICATES = 200;
/** A level near 0.05 is wanted to a third decimal, a power is not. */
const LEVEL_REPLICATES = 1500;
const POWER_REPLICATES = 200;
const COMPONENTS = ['horizontal', 'vertical'] as const;
/** Ordinary days of every campaign but those whose days are all alike. */
const ORDINARY = 0.25;

export async function benchDays(): Promise<void> {
  await speed();
  console.log(`${REPLICATES} campaigns each, seeds 1000 c + r for campaign c = 1 … ${DAY_CASES.length}:\n`);
  degraded();
  benchDayPromises();
  hours();
  benchDayVerdicts();
}

async function speed(): Promise<void> {
  const [days, occupations] = [60, 10_000];
  const normal = normalDeviates(randomStream(1, 'bench days'));
  const rows = Array.from({ length: days * occupations }, (_, k) => {
    const baselineKm = 0.4 + 0.9 * (k % 37);
    return {
      day: `day ${String(k % days).padStart(2, '0')}`,
      startMs: k,
      baselineKm,
      up: normal() * Math.hypot(8, baselineKm),
    };
  });
  const model = fitErrorModel(rows, { component: 'vertical' });
  const [data, spread] = [fittedData(rows, model), fittedSpread(model)];
  const seconds = await medianSeconds(3, () => dayModelOf(data, spread));
  console.log(
    `Day model of ${days} days × ${occupations} prepared occupations: ${seconds.toFixed(2)} s (median of 3)\n`,
  );
}

interface DayCase {
  readonly name: string;
  readonly days: number;
  readonly badDays: BadDayOptions | null;
  readonly logSd: number;
  readonly expected: string;
}

const bad = (runs: number, runLength: number): BadDayOptions => ({
  runs,
  runLength,
  singles: 0,
  factor: { from: 2, to: 5 },
});

const DAY_CASES: readonly DayCase[] = [
  { name: '15 days, 1 bad', days: 15, badDays: bad(1, 1), logSd: ORDINARY, expected: '0.61 / 0.04' },
  { name: '30 days, 2 bad', days: 30, badDays: bad(2, 1), logSd: ORDINARY, expected: '0.75 / 0.077' },
  { name: '30 days, 3 bad in a row', days: 30, badDays: bad(1, 3), logSd: ORDINARY, expected: '-' },
  { name: '60 days, 5 bad', days: 60, badDays: bad(5, 1), logSd: ORDINARY, expected: '0.78 / 0.096' },
  { name: '60 days, 2 × 3 bad in a row', days: 60, badDays: bad(2, 3), logSd: ORDINARY, expected: '-' },
  { name: '30 days, mild', days: 30, badDays: null, logSd: 0.3, expected: 'any: 0.02' },
  { name: '30 days, all alike', days: 30, badDays: null, logSd: 0, expected: 'any: 0.00' },
];

/** Days named by one method, counted over campaigns. */
class Tally {
  private found = 0;
  private bad = 0;
  private named = 0;
  private false = 0;
  private campaignsFalse = 0;
  private campaigns = 0;

  add(named: ReadonlySet<string>, days: readonly { day: string; factor: number; bad: boolean }[]): void {
    const usual = median(days.map(({ factor }) => factor));
    let wrong = 0;
    for (const { day, factor, bad } of days) {
      if (bad) this.bad += 1;
      if (!named.has(day)) continue;
      this.named += 1;
      if (bad) this.found += 1;
      // A day is named wrongly when its true factor is below 1.5 times that of the median day.
      if (factor < 1.5 * usual) wrong += 1;
    }
    this.false += wrong;
    this.campaigns += 1;
    if (wrong > 0) this.campaignsFalse += 1;
  }

  text(): string {
    const share = (top: number, bottom: number): string => (bottom === 0 ? '-' : (top / bottom).toFixed(3));
    return `${share(this.found, this.bad)} | ${share(this.false, this.named)} | ${share(this.campaignsFalse, this.campaigns)}`;
  }
}

function degraded(): void {
  console.log(
    '| campaign | component | power | false share | with a false day | moderated variances: power | false share | with a false day | R: power / false share |',
  );
  console.log('|---|---|---|---|---|---|---|---|---|');
  DAY_CASES.forEach(({ name, days, badDays, logSd, expected }, c) => {
    const start = performance.now();
    const tallies = COMPONENTS.map(() => ({ grid: new Tally(), moderated: new Tally() }));
    for (let r = 0; r < REPLICATES; r++) {
      const { rows, truth } = simulateErrors({
        seed: 1000 * (c + 1) + r,
        days,
        badDays,
        dayFactorLogSd: logSd,
      });
      COMPONENTS.forEach((component, k) => {
        const model = fitErrorModel(rows, { component });
        const named = new Set(dayModel(rows, model).degradedDays ?? []);
        tallies[k]!.grid.add(named, truth.days);
        const moderated = moderatedDays(rows, model).filter((each) => each.degraded);
        tallies[k]!.moderated.add(new Set(moderated.map(({ day }) => day)), truth.days);
      });
    }
    COMPONENTS.forEach((component, k) => {
      const { grid, moderated } = tallies[k]!;
      console.log(`| ${name} | ${component} | ${grid.text()} | ${moderated.text()} | ${expected} |`);
    });
    console.error(`${name}: ${((performance.now() - start) / 1000).toFixed(0)} s`);
  });
}

interface HourCase {
  readonly name: string;
  readonly options: CampaignOptions;
  readonly expected: string;
}

/** exp(2 · 1.05 · rise) = 1.8 between the worst and the best hour of a working day from 8 to 17 h. */
const RISE = 0.28;

const HOUR_CASES: readonly HourCase[] = [
  { name: '15 days, mild', options: { days: 15 }, expected: '0.043 / 0.28' },
  { name: '30 days, mild', options: { days: 30 }, expected: '0.043 / 0.53' },
  { name: '60 days, mild', options: { days: 60 }, expected: '0.054 / -' },
  {
    name: '30 days, 2 bad',
    options: { days: 30, badDays: bad(2, 1), dayFactorLogSd: ORDINARY },
    expected: '0.044 / 0.55',
  },
];

function hours(): void {
  console.log(
    `\n${LEVEL_REPLICATES} campaigns each for the level, the first ${POWER_REPLICATES} for the power, seeds 100 000 + 2000 c + r for c = 0 … ${HOUR_CASES.length - 1}:`,
  );
  console.log(
    '\n| campaign | level, horizontal | level, vertical | power at 1.8, horizontal | power, vertical | R: level / power |',
  );
  console.log('|---|---|---|---|---|---|');
  HOUR_CASES.forEach(({ name, options, expected }, c) => {
    const start = performance.now();
    const [rejected, tested] = [
      [0, 0, 0, 0],
      [0, 0, 0, 0],
    ];
    for (let r = 0; r < LEVEL_REPLICATES; r++) {
      [0, RISE].forEach((middayRise, m) => {
        if (middayRise > 0 && r >= POWER_REPLICATES) return;
        const seed = 100_000 + 2000 * c + r;
        const { rows } = simulateErrors({ ...options, seed, middayRise });
        COMPONENTS.forEach((component, k) => {
          const model = fitErrorModel(rows, { component });
          const { pValue } = timeOfDay(rows, model, { random: randomStream(seed, component) });
          if (pValue === null) return;
          tested[2 * m + k]! += 1;
          if (pValue <= 0.05) rejected[2 * m + k]! += 1;
        });
      });
    }
    const shares = rejected.map((count, k) => (count / tested[k]!).toFixed(3)).join(' | ');
    console.log(`| ${name} | ${shares} | ${expected} |`);
    console.error(`${name}: ${((performance.now() - start) / 1000).toFixed(0)} s`);
  });
}
