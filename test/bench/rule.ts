import { type CampaignOptions, shareAtKm, simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import {
  chooseReference,
  type ErrorModel,
  fitErrorModel,
  screenWrongFixes,
  wrongFixGrowth,
} from '../../src/fit/index.js';
import {
  checkShotLimits,
  crowdedDaysKept,
  findFormDoubt,
  maximumBaseline,
  type Tolerance,
  testSpecSheet,
  toleranceFactor,
  watchBasis,
  watchDays,
} from '../../src/rule/index.js';
import { median, normalCdf, randomStream } from '../../src/stats/index.js';

/*
 * Achieved confidence of the maximum baseline, false alarms of check-shot limit and watch, level and power of the
 * comparison with a spec sheet, on simulated campaigns. Prints Markdown, of which docs/evidence-rule.md holds a copy.
 */

const REPLICATES = 60;
const DISTURBED_SHARE = 0.08;
const TOLERANCE: Tolerance = {
  component: 'horizontal',
  limitMm: 30,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
};
/** Radial constant and ppm of the median day, and spread of the log day factor: the defaults of the simulation. */
const [CONSTANT, PPM, LOG_SD] = [5.5 * Math.SQRT2, 0.55 * Math.SQRT2, 0.3];

interface World {
  readonly name: string;
  readonly days: number;
  readonly disturbed: boolean;
  readonly wrongFixes: { readonly shareAt1Km: number; readonly shareAt12Km: number } | null;
  readonly linear?: boolean;
  readonly more?: CampaignOptions;
}

const ONE_PERCENT = { shareAt1Km: 0.01, shareAt12Km: 0.01 };
const GROWING = { shareAt1Km: 0.003, shareAt12Km: 0.03 };
const SHOTS = { occupationsPerDay: { from: 20, to: 30 } };

const WORLDS: readonly World[] = [
  ...[15, 30, 60].flatMap((days) =>
    [false, true].flatMap((disturbed) =>
      [null, ONE_PERCENT].map((wrongFixes) => ({
        name: `${days} days, ${disturbed ? 'disturbed' : 'mild'}, ${wrongFixes === null ? 'no' : '1 %'} wrong fixes`,
        days,
        disturbed,
        wrongFixes,
      })),
    ),
  ),
  { name: '30 days, mild, linear-sum truth', days: 30, disturbed: false, wrongFixes: null, linear: true },
  { name: '30 days, mild, growing wrong fixes', days: 30, disturbed: false, wrongFixes: GROWING },
  {
    name: '30 days, mild, 8 mm mark errors',
    days: 30,
    disturbed: false,
    wrongFixes: null,
    more: { markSigmaMm: { east: 8, north: 8, up: 8 } },
  },
  {
    name: '120 days of 3 to 8 habitual shots, 5 mm mark errors',
    days: 120,
    disturbed: false,
    wrongFixes: null,
    more: {
      habitual: {},
      marks: { count: 12, nearestKm: 0.4, farthestKm: 20 },
      markSigmaMm: { east: 5, north: 5, up: 5 },
      crews: ['A'],
      rovers: ['R1'],
    },
  },
];

export function benchRule(): void {
  console.log(`${REPLICATES} campaigns each, seeds 1000 c + r for world c = 1 … ${WORLDS.length}:\n`);
  console.log(
    '| world | true km | with a rule | achieved | median limit km | 5 to 95 % | best estimate km |',
  );
  console.log('|---|---|---|---|---|---|---|');
  WORLDS.forEach((world, c) => {
    achieved(world, 1000 * (c + 1));
  });
  alarms();
  sheets();
}

/** A campaign of a world; the number of disturbed days is drawn, not given. */
function campaign(world: World, seed: number) {
  const random = randomStream(seed, 'disturbed days');
  const runs = world.disturbed
    ? Array.from({ length: world.days }, () => random() < DISTURBED_SHARE).filter(Boolean).length
    : 0;
  const { rows, marks } = simulateErrors({
    ...SHOTS,
    ...world.more,
    seed,
    days: world.days,
    badDays: runs === 0 ? null : { runs, runLength: 1, factor: { from: 2, to: 5 } },
    wrongFixes: world.wrongFixes,
  });
  if (!world.linear) return { rows, marks };
  const linear = rows.map((row) => {
    const grown = PPM * row.dayFactor * row.baselineKm;
    const factor = (CONSTANT + grown) / Math.hypot(CONSTANT, grown);
    return { ...row, east: factor * row.east, north: factor * row.north, up: factor * row.up };
  });
  return { rows: linear, marks };
}

/** Share of days on which at least the share of positions holds the limit at a length, wrong fixes failing. */
function trueDayShare({ disturbed, wrongFixes, linear }: World, km: number): number {
  const { share, limitMm } = TOLERANCE;
  const demanded = share / (1 - (wrongFixes === null ? 0 : shareAtKm(wrongFixes, km)));
  if (demanded >= 1) return 0;
  const allowed = limitMm / toleranceFactor('horizontal', demanded);
  const room = linear ? allowed - CONSTANT : Math.sqrt(Math.max(0, allowed ** 2 - CONSTANT ** 2));
  if (!(room > 0)) return 0;
  const worst = room / (PPM * km);
  const ordinary = (factor: number): number => normalCdf(Math.log(factor) / LOG_SD);
  if (!disturbed) return ordinary(worst);
  const steps = 300;
  let bad = 0;
  for (let k = 0; k < steps; k++) bad += ordinary(worst / (2 + (3 * (k + 0.5)) / steps)) / steps;
  return (1 - DISTURBED_SHARE) * ordinary(worst) + DISTURBED_SHARE * bad;
}

function trueLength(world: World): number {
  let [low, high] = [0.01, 200];
  while (high - low > 1e-6) {
    const middle = (low + high) / 2;
    if (trueDayShare(world, middle) >= TOLERANCE.dayShare) low = middle;
    else high = middle;
  }
  return low;
}

/** The way a study goes: screening, reference, fit, day model, rule. */
function study(rows: ReturnType<typeof campaign>['rows']) {
  const screening = screenWrongFixes(rows);
  const usable = !screening.refused && screening.share !== null;
  const weights = usable ? screening.weights : undefined;
  const { reference } = chooseReference(rows, { component: 'horizontal', weights });
  const model: ErrorModel = fitErrorModel(rows, { component: 'horizontal', reference, weights });
  const used = weights === undefined ? rows : rows.filter((_, i) => weights[i]! >= 0.5);
  return {
    used,
    model,
    dayModel: dayModel(rows, model, weights),
    wrongFixes: usable ? wrongFixGrowth(rows, screening) : null,
    crowdedDaysKept: usable ? crowdedDaysKept(rows, model, screening) : null,
    formDoubt: findFormDoubt(rows, model, weights),
  };
}

function achieved(world: World, seeds: number): void {
  const start = performance.now();
  const truth = trueLength(world);
  const limits: number[] = [];
  const bests: number[] = [];
  for (let r = 0; r < REPLICATES; r++) {
    const { used, model, ...ground } = study(campaign(world, seeds + r).rows);
    const rule = maximumBaseline(used, model, TOLERANCE, ground);
    if (rule.maximumBaselineKm === null) continue;
    limits.push(rule.maximumBaselineKm);
    bests.push(rule.bestEstimateKm!);
  }
  const sorted = [...limits].sort((a, b) => a - b);
  const at = (p: number): string => (sorted[Math.floor(p * (sorted.length - 1))] ?? Number.NaN).toFixed(1);
  const good = limits.filter((km) => km <= truth).length;
  const middle = (values: number[]): string => (values.length === 0 ? '-' : median(values).toFixed(1));
  console.log(
    `| ${world.name} | ${truth.toFixed(1)} | ${limits.length} | ${(good / limits.length).toFixed(3)} | ${middle(limits)} | ${at(0.05)} to ${at(0.95)} | ${middle(bests)} |`,
  );
  console.error(`${world.name}: ${((performance.now() - start) / 1000).toFixed(0)} s`);
}

const ALARM_STUDIES = 30;
const NEW_DAYS = 220;

/** A model of some days against 220 new ones of the same marks. */
function alarms(): void {
  console.log(
    `\n${ALARM_STUDIES} studies each, ${NEW_DAYS} new days; seeds 300 000 + 1000 c + r for c = 0 … 2, new days 50 000 higher:\n`,
  );
  console.log(
    '| fitted | check shots beyond the limit / stated (1 in 1000) | ppm alarms a year | constant alarms a year | ppm × 1.5 found, median days |',
  );
  console.log('|---|---|---|---|---|');
  const cases = [
    { name: '30 days, mild', days: 30, disturbed: false },
    { name: '60 days, mild', days: 60, disturbed: false },
    { name: '60 days, disturbed', days: 60, disturbed: true },
  ];
  cases.forEach(({ name, days, disturbed }, c) => {
    let [beyond, shots, ppm, constant, watched] = [0, 0, 0, 0, 0];
    const delays: number[] = [];
    for (let r = 0; r < ALARM_STUDIES; r++) {
      const seed = 300_000 + 1000 * c + r;
      const world: World = { name, days, disturbed, wrongFixes: null };
      const first = campaign(world, seed);
      const marks = first.marks.map(({ name, baselineKm, azimuthDeg, heightM }) => ({
        name,
        baselineKm,
        azimuthDeg,
        heightM,
      }));
      const later = campaign(
        { ...world, days: NEW_DAYS, more: { marks, startDate: '2026-06-01' } },
        seed + 50_000,
      ).rows;
      const model = fitErrorModel(first.rows, { component: 'horizontal' });
      const how = dayModel(first.rows, model);
      const lengthsKm = marks.map(({ baselineKm }) => baselineKm);
      const { limits } = checkShotLimits(model, how, { lengthsKm, bothComponents: false });
      const limitAt = new Map(
        limits.map(({ baselineKm, knownMarkMm }) => [baselineKm.toFixed(6), knownMarkMm]),
      );
      for (const row of later) {
        const limit = limitAt.get(row.baselineKm.toFixed(6));
        if (limit === undefined) continue;
        shots += 1;
        if (Math.hypot(row.east, row.north) > limit) beyond += 1;
      }
      const { basis } = watchBasis(model, how);
      if (basis === null) continue;
      watched += 1;
      const found = watchDays(basis, later).alarms;
      ppm += found.filter(({ part }) => part === 'ppm').length;
      constant += found.filter(({ part }) => part === 'constant').length;
      const worse = later.map((row) => {
        const grown = PPM * row.dayFactor * row.baselineKm;
        const factor = Math.hypot(CONSTANT, 1.5 * grown) / Math.hypot(CONSTANT, grown);
        return { ...row, east: factor * row.east, north: factor * row.north };
      });
      const names = [...new Set(later.map(({ day }) => day))].sort();
      const alarm = watchDays(basis, worse).alarms.find(({ part }) => part === 'ppm');
      delays.push(alarm === undefined ? NEW_DAYS : names.indexOf(alarm.day) + 1);
    }
    console.log(
      `| ${name} | ${(beyond / shots / 0.001).toFixed(2)} | ${(ppm / watched).toFixed(2)} | ${(constant / watched).toFixed(2)} | ${median(delays).toFixed(0)} |`,
    );
  });
}

const SHEET_STUDIES = 150;

/** Level and power of the wording on a spec sheet, whose ratio to the long-run truth is known. */
function sheets(): void {
  console.log(
    `\n${SHEET_STUDIES} studies each, seeds 400 000 + 1000 c + r for c = 0 … 3; share of studies with each verdict at 1, 5 and 10 km together:\n`,
  );
  console.log('| days | true ratio | worse | better | not worse by more than 10 % | not shown to differ |');
  console.log('|---|---|---|---|---|---|');
  const cases = [
    { name: '30, mild', days: 30, disturbed: false },
    { name: '60, mild', days: 60, disturbed: false },
    { name: '30, disturbed', days: 30, disturbed: true },
    { name: '60, disturbed', days: 60, disturbed: true },
  ];
  cases.forEach(({ name, days, disturbed }, c) => {
    const longRun =
      PPM *
      Math.sqrt(
        Math.exp(2 * LOG_SD ** 2) *
          (disturbed ? 1 - DISTURBED_SHARE + (DISTURBED_SHARE * (4 + 10 + 25)) / 3 : 1),
      );
    const ratios = [1, 1.2, 0.8];
    const counts = ratios.map(() => new Map<string, number>());
    for (let r = 0; r < SHEET_STUDIES; r++) {
      const { rows } = campaign({ name, days, disturbed, wrongFixes: null }, 400_000 + 1000 * c + r);
      const model = fitErrorModel(rows, { component: 'horizontal' });
      const how = dayModel(rows, model);
      ratios.forEach((ratio, k) => {
        const figures = { constantMm: CONSTANT / ratio, ppm: longRun / ratio };
        const { verdict } = testSpecSheet(
          rows,
          model,
          { horizontal: figures, vertical: figures, form: 'root-sum-square', axis: 'radial', level: 'rms' },
          { dayModel: how },
        );
        counts[k]!.set(verdict, (counts[k]!.get(verdict) ?? 0) + 1);
      });
    }
    ratios.forEach((ratio, k) => {
      const share = (verdict: string): string => ((counts[k]!.get(verdict) ?? 0) / SHEET_STUDIES).toFixed(3);
      console.log(
        `| ${name} | ${ratio} | ${share('worse')} | ${share('better')} | ${share('not worse by more than 10 %')} | ${share('not shown to differ')} |`,
      );
    });
  });
}
