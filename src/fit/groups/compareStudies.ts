import type { ErrorsInput } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import { chanceText, type Random, studentTQuantile } from '../../stats/index.js';
import type { ErrorModel, EstimateWithLimits, Reference } from '../errorModel.js';
import { fitErrorModel } from '../fitErrorModel.js';
import type { Component } from '../forms.js';
import { contrastEstimate, usesLogScale } from '../intervals.js';
import type { FitData } from '../prepareErrors.js';
import { referenceData } from '../reference/referenceData.js';
import { varianceModel } from '../reference/varianceModel.js';
import { FEWEST_DAYS_TESTED, type GroupVerdict } from './fitByGroup.js';
import { groupScoreTest } from './groupScoreTest.js';

export interface CompareStudiesOptions {
  readonly component: Component;
  /** Numbers in [0, 1). */
  readonly random: Random;
  readonly reference?: Reference | undefined;
  readonly confidence?: number | undefined;
  /** Sign patterns of the test; default 1999. */
  readonly flips?: number | undefined;
}

/** Two sets of errors, as before and after a change of equipment or procedure. */
export interface StudyComparison {
  readonly before: ErrorModel;
  readonly after: ErrorModel;
  /** After over before; null where one of the two is not clear of 0. */
  readonly constantRatio: EstimateWithLimits;
  readonly ppmRatio: EstimateWithLimits;
  /** Of the test that both share constant and ppm; null with fewer than 5 days in one of them. */
  readonly pValue: number | null;
  readonly verdict: GroupVerdict;
  readonly message: Message;
}

const DEFAULT_FLIPS = 1999;
const LEVEL = 0.05;

/**
 * Compares two studies: each has its own reference (its own means of marks, or setups), and days are those of the studies,
 * also where a date stands in both.
 * @throws InputError as fitErrorModel, for either of the two
 */
export function compareStudies(
  before: ErrorsInput,
  after: ErrorsInput,
  options: CompareStudiesOptions,
): StudyComparison {
  const { component, random, reference = 'absolute', confidence, flips = DEFAULT_FLIPS } = options;
  const models = [before, after].map((errors) =>
    fitErrorModel(errors, { component, reference, confidence }),
  ) as [ErrorModel, ErrorModel];
  const parts = [before, after].map((errors) => referenceData(errors, { component, reference }).data) as [
    FitData,
    FitData,
  ];
  const enough = models.every(({ days }) => days >= FEWEST_DAYS_TESTED);
  const joined = join(parts);
  const test = enough ? groupScoreTest(joined, varianceModel(joined), flips, random) : null;
  const pValue = test?.pValue ?? null;
  const verdict =
    pValue === null ? 'too few days to tell' : pValue < LEVEL ? 'differ' : 'not shown to differ';
  const [constantRatio, ppmRatio] = [ratio(models, [1, 0]), ratio(models, [0, 1])];
  return {
    before: models[0],
    after: models[1],
    constantRatio,
    ppmRatio,
    pValue,
    verdict,
    message: verdictMessage(models, pValue, constantRatio, ppmRatio),
  };
}

function join(parts: readonly [FitData, FitData]) {
  const numbers = (pick: (data: FitData) => Float64Array): Float64Array =>
    Float64Array.from([...pick(parts[0]), ...pick(parts[1])]);
  const labels = ['before', 'after'];
  return {
    y: numbers(({ y }) => y),
    l: numbers(({ l }) => l),
    w: numbers(({ w }) => w),
    day: parts.flatMap(({ day }, k) => day.map((name) => `${labels[k]} ${name}`)),
    group: parts.flatMap(({ day }, k) => day.map(() => labels[k]!)),
  };
}

/** Ratio of two independent terms on the log scale, with the degrees of freedom of Welch and Satterthwaite. */
function ratio(
  models: readonly [ErrorModel, ErrorModel],
  contrast: readonly [number, number],
): EstimateWithLimits {
  const none = { estimate: null, low: null, high: null };
  const parts = models.map(({ fitted, uncertainty }) => {
    if (uncertainty === null) return null;
    const { terms, covariance } = uncertainty;
    const estimate = contrastEstimate(fitted.p, fitted.q, terms, covariance, contrast);
    if (!usesLogScale(estimate)) return null;
    // The log of a root has half the relative error of what stands under it.
    const variance2 = (estimate.standardError / estimate.value / 2) ** 2;
    return { log: Math.log(estimate.value) / 2, variance: variance2, df: estimate.degreesOfFreedom };
  });
  const [first, second] = parts;
  if (first == null || second == null) return none;
  const total = first.variance + second.variance;
  const df = total ** 2 / (first.variance ** 2 / first.df + second.variance ** 2 / second.df);
  const half = studentTQuantile((1 + models[0].confidence) / 2, df) * Math.sqrt(total);
  const log = second.log - first.log;
  return { estimate: Math.exp(log), low: Math.exp(log - half), high: Math.exp(log + half) };
}

function verdictMessage(
  models: readonly [ErrorModel, ErrorModel],
  pValue: number | null,
  constantRatio: EstimateWithLimits,
  ppmRatio: EstimateWithLimits,
): Message {
  if (pValue === null) {
    return message(
      'info',
      'studies-not-compared',
      `Before there are ${models[0].days} days, after ${models[1].days}: too few to tell whether anything changed. Both need at least ${FEWEST_DAYS_TESTED} days.`,
    );
  }
  const p = chanceText(pValue);
  const details = [told('constant', constantRatio), told('ppm', ppmRatio)]
    .filter((text) => text !== '')
    .join(', ');
  const list = details === '' ? '' : `; after over before: ${details}`;
  return pValue < LEVEL
    ? message(
        'warning',
        'studies-differ',
        `Before and after differ in constant or ppm (${p})${list}. Days, places and season differ too: ask whether the change or they explain it.`,
      )
    : message(
        'info',
        'studies-not-shown-to-differ',
        `Before and after are not shown to differ (${p})${list}. That is no proof that nothing changed.`,
      );
}

const told = (name: string, { estimate, low, high }: EstimateWithLimits): string =>
  estimate === null ? '' : `${name} ${estimate.toFixed(2)} (${low!.toFixed(2)} to ${high!.toFixed(2)})`;
