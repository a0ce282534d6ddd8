import { chiSquareQuantile, fCdf, fQuantile, median, quantile, sum } from '../stats/index.js';
import type { VariancePrior } from './moderatedVariance.js';

/** Shares of the log ratios that are drawn in at either end. Degraded days stand at the upper one. */
const LOWER_TAIL = 0.05;
const UPPER_TAIL = 0.1;
/** Even number of steps of Simpson's rule. */
const STEPS = 256;
/** Beyond this many degrees of freedom the days are taken as alike. */
const LARGEST_DF = 1e6;
/** A chance of 0 has no quantile and no logarithm. */
const SMALLEST_CHANCE = 1e-300;

/** A common prior, and for every day how firmly it is held to it. */
export interface RobustPrior extends VariancePrior {
  /** d0 of each day: less for a day that is too large to belong to the others. */
  readonly dayDegreesOfFreedom: Float64Array;
}

/**
 * Prior of variances of which some are too large: winsorised mean and variance of the log ratios are set equal to those
 * of log F winsorised at the same shares; days that do not belong keep more of their own (Phipson et al. 2016; from
 * memory).
 * @param plain the prior from all days, which robust degrees of freedom never fall below
 */
export function robustPrior(ratios: Float64Array, df: Float64Array, plain: VariancePrior): RobustPrior {
  const common = df.reduce((a, b) => Math.max(a, b));
  const same = onCommonDf(ratios, df, common, plain);
  const z = same.map((ratio) => Math.log(ratio));
  const [low, high] = [quantile(z, LOWER_TAIL), quantile(z, 1 - UPPER_TAIL)];
  const drawn = z.map((value) => Math.min(high, Math.max(low, value)));
  const mean = sum(drawn) / drawn.length;
  const variance = sum(drawn.map((value) => (value - mean) ** 2)) / (drawn.length - 1);
  const degreesOfFreedom = matchingDf(common, variance, plain.degreesOfFreedom);
  if (degreesOfFreedom === null) {
    return { ...plain, dayDegreesOfFreedom: new Float64Array(ratios.length).fill(plain.degreesOfFreedom) };
  }
  const prior = {
    variance: Math.exp(mean - winsorizedLogF(common, degreesOfFreedom).mean),
    degreesOfFreedom,
  };
  return { ...prior, dayDegreesOfFreedom: dayDf(same, common, prior) };
}

/**
 * d0 whose winsorised log F has a variance, at least `least`; null when all days together are alike and the inner ones
 * are not. The variance falls as d0 grows: bisection of log d0.
 */
function matchingDf(df: number, variance: number, least: number): number | null {
  if (variance <= winsorizedLogF(df, LARGEST_DF).variance) return Number.POSITIVE_INFINITY;
  if (least >= LARGEST_DF) return null;
  if (variance >= winsorizedLogF(df, least).variance) return least;
  let [few, many] = [Math.log(least), Math.log(LARGEST_DF)];
  for (let k = 0; k < 60; k++) {
    const middle = (few + many) / 2;
    if (winsorizedLogF(df, Math.exp(middle)).variance > variance) few = middle;
    else many = middle;
  }
  return Math.exp((few + many) / 2);
}

/**
 * A day whose chance under the prior is smaller than its rank among the days would have it is to that extent no member:
 * its d0 moves toward the one at which the largest ratio would be as likely as not.
 */
function dayDf(
  same: Float64Array,
  df: number,
  { variance, degreesOfFreedom: d0 }: VariancePrior,
): Float64Array {
  const all = new Float64Array(same.length).fill(d0);
  if (d0 === Number.POSITIVE_INFINITY) return all;
  const upper = (ratio: number, df2: number): number =>
    Math.max(SMALLEST_CHANCE, fCdf(variance / ratio, df2, df));
  const largestFirst = Array.from(same.keys()).sort((i, j) => same[j]! - same[i]!);
  const largest = same[largestFirst[0]!]!;
  // Two steps toward P(F > largest) = 1/2.
  let outlier = d0;
  for (let k = 0; k < 2; k++) outlier *= Math.log(0.5) / Math.log(upper(largest, outlier));
  const own = largestFirst.map((i, k) => {
    const member = Math.min(1, upper(same[i]!, d0) / ((k + 0.5) / same.length));
    return member * d0 + (1 - member) * outlier;
  });
  // A larger ratio never has the larger d0.
  const means = own.map((_, k) => own.slice(0, k + 1).reduce((a, b) => a + b) / (k + 1));
  const least = means.reduce((a, b) => Math.min(a, b));
  const until = means.indexOf(least);
  let reached = 0;
  own.forEach((value, k) => {
    reached = Math.max(reached, k <= until ? least : value);
    all[largestFirst[k]!] = reached;
  });
  return all;
}

/** Ratios of the same tail chance under a prior, as if all had the largest of the degrees of freedom. */
function onCommonDf(
  ratios: Float64Array,
  df: Float64Array,
  common: number,
  prior: VariancePrior,
): Float64Array {
  const d0 = Math.min(prior.degreesOfFreedom, LARGEST_DF);
  const least = 1e-5 * median(ratios);
  return ratios.map((ratio, d) => {
    const x = Math.max(ratio, least) / prior.variance;
    if (df[d] === common) return x * prior.variance;
    // The smaller tail keeps its digits: the upper one is the lower one of 1/F.
    const lower = fCdf(x, df[d]!, d0);
    const same =
      lower < 0.5
        ? fQuantile(Math.max(SMALLEST_CHANCE, lower), common, d0)
        : 1 / fQuantile(Math.max(SMALLEST_CHANCE, fCdf(1 / x, d0, df[d]!)), d0, common);
    return same * prior.variance;
  });
}

/** Mean and variance of log F(df, d0), drawn in at its quantiles. */
function winsorizedLogF(df: number, d0: number): { readonly mean: number; readonly variance: number } {
  const quantileOf = (p: number): number =>
    Math.log(d0 >= LARGEST_DF ? chiSquareQuantile(p, df) / df : fQuantile(p, df, d0));
  const [low, high] = [quantileOf(LOWER_TAIL), quantileOf(1 - UPPER_TAIL)];
  // Density but for a factor, which follows from the probability between the quantiles; from the middle, lest it overflow.
  const logDensity = (z: number): number =>
    d0 >= LARGEST_DF
      ? (df / 2) * (z - Math.exp(z))
      : (df / 2) * z - ((df + d0) / 2) * Math.log1p((df / d0) * Math.exp(z));
  const center = logDensity((low + high) / 2);
  let [mass, first, second] = [0, 0, 0];
  for (let k = 0; k <= STEPS; k++) {
    const z = low + (k * (high - low)) / STEPS;
    const weight = (k === 0 || k === STEPS ? 1 : k % 2 === 1 ? 4 : 2) * Math.exp(logDensity(z) - center);
    mass += weight;
    first += weight * z;
    second += weight * z * z;
  }
  const inner = 1 - LOWER_TAIL - UPPER_TAIL;
  const mean = (inner * first) / mass + LOWER_TAIL * low + UPPER_TAIL * high;
  const square = (inner * second) / mass + LOWER_TAIL * low * low + UPPER_TAIL * high * high;
  return { mean, variance: square - mean * mean };
}
