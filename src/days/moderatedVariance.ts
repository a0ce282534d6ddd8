import type { ErrorsInput } from '../errors/index.js';
import type { ErrorModel, FitData } from '../fit/index.js';
import { chiSquareCdf, digamma, fCdf, inverseTrigamma, median, sum, trigamma } from '../stats/index.js';
import { DEGRADED_FACTOR } from './dayEstimates.js';
import { dayRatios } from './dayRatios.js';
import { FALSE_SHARE } from './degradedDays.js';
import { effectiveShare } from './effectiveShare.js';
import { falseDiscoveryAdjusted } from './falseDiscovery.js';
import { fittedData, fittedSpread } from './fittedSpread.js';
import { robustPrior } from './robustPrior.js';

/** What the days have in common: variance ratios of s0² F with d0 degrees of freedom. */
export interface VariancePrior {
  readonly variance: number;
  /** Infinity when the days do not differ more than chance allows. */
  readonly degreesOfFreedom: number;
}

/** A variance ratio of each day drawn toward the common one. */
export interface ModeratedVariances {
  readonly prior: VariancePrior;
  readonly moderated: Float64Array;
  /** Chance of a ratio as large on an ordinary day. */
  readonly pValues: Float64Array;
}

/** Moderated variance of one day, against the model fitted to all. */
export interface ModeratedDay {
  readonly day: string;
  /** Mean squared error over the expected one, counted where the ppm matters. */
  readonly ratio: number;
  readonly degreesOfFreedom: number;
  readonly moderatedRatio: number;
  readonly ppm: number;
  readonly pValue: number;
  /** At most 0.1 among the days found at a false discovery rate of 10 %. */
  readonly adjustedP: number;
  /** Found so, and with a ppm of 1.5 times that of the median day: the first alone says that a day differs, not by how much. */
  readonly degraded: boolean;
}

/**
 * The days by moderated variances, see `moderatedDaysOf`.
 * @returns no rows where the fit has no ppm above 0
 * @throws InputError when a column is missing (`startMs` gives the order of shots)
 */
export function moderatedDays(
  errors: ErrorsInput,
  model: ErrorModel,
  weights?: Float64Array,
): ModeratedDay[] {
  const spread = fittedSpread(model);
  if (spread === null || !(spread.B > 0)) return [];
  const data = fittedData(errors, model, weights);
  const { share } = effectiveShare(data, spread.A, spread.B);
  return moderatedDaysOf(data, spread.A, spread.B, share);
}

/**
 * The days by moderated variances with a robust prior: a cross-check of the day model that shares no step with it but
 * the effective share. It names fewer days.
 * @param A,B displayed estimates, mm² and ppm²
 * @param share effective share of the shots
 */
export function moderatedDaysOf(data: FitData, A: number, B: number, share: number): ModeratedDay[] {
  const { days, factors, omegaSums, omegaSquares } = dayRatios(data, A, B);
  const df = factors.map((_, d) =>
    Math.max(1, (data.components.length * share * omegaSums[d]! ** 2) / omegaSquares[d]!),
  );
  const { moderated, pValues } = moderateVariances(factors, df, 'robust');
  const adjusted = falseDiscoveryAdjusted([...pValues]);
  const ppm = moderatedPpm(moderated, omegaSums, omegaSquares, B);
  const least = DEGRADED_FACTOR * median(ppm);
  return days.map((day, d) => ({
    day,
    ratio: factors[d]!,
    degreesOfFreedom: df[d]!,
    moderatedRatio: moderated[d]!,
    ppm: ppm[d]!,
    pValue: pValues[d]!,
    adjustedP: adjusted[d]!,
    degraded: adjusted[d]! <= FALSE_SHARE && ppm[d]! >= least,
  }));
}

/** Ppm of each day from its variance ratio: what exceeds 1 is the doing of the distance part, Σ ω² of Σ ω. */
function moderatedPpm(
  ratios: Float64Array,
  omegaSums: Float64Array,
  omegaSquares: Float64Array,
  B: number,
): Float64Array {
  return ratios.map((ratio, d) =>
    Math.sqrt(B * Math.max(1e-3, 1 + ((ratio - 1) * omegaSums[d]!) / omegaSquares[d]!)),
  );
}

/**
 * Empirical Bayes moderation of variances (Smyth 2004; from memory): the prior from mean and variance of the log ratios,
 * or from their winsorised ones, which the days sought do not widen.
 * @param ratios sample variances, not all 0
 * @param df their degrees of freedom
 */
export function moderateVariances(
  ratios: Float64Array,
  df: Float64Array,
  kind: 'plain' | 'robust',
): ModeratedVariances {
  const n = ratios.length;
  // A day without any error would have a log of minus infinity and decide alone.
  const least = 1e-5 * median(ratios);
  const z = ratios.map(
    (ratio, d) => Math.log(Math.max(ratio, least)) - digamma(df[d]! / 2) + Math.log(df[d]! / 2),
  );
  const mean = sum(z) / n;
  const excess =
    sum(z.map((value) => (value - mean) ** 2)) / (n - 1) - sum(df.map((v) => trigamma(v / 2))) / n;
  const plain = priorOf(ratios, mean, excess);
  const { dayDegreesOfFreedom, ...prior } =
    kind === 'robust'
      ? robustPrior(ratios, df, plain)
      : { ...plain, dayDegreesOfFreedom: new Float64Array(n).fill(plain.degreesOfFreedom) };
  const moderated = ratios.map((ratio, d) => {
    const d0 = dayDegreesOfFreedom[d]!;
    const { variance } = prior;
    return d0 === Number.POSITIVE_INFINITY ? variance : (d0 * variance + df[d]! * ratio) / (d0 + df[d]!);
  });
  const pValues = ratios.map((ratio, d) => upperTail(ratio / prior.variance, df[d]!, prior.degreesOfFreedom));
  return { prior, moderated, pValues };
}

function priorOf(ratios: Float64Array, mean: number, excess: number): VariancePrior {
  if (excess <= 0) {
    return { variance: sum(ratios) / ratios.length, degreesOfFreedom: Number.POSITIVE_INFINITY };
  }
  const d0 = 2 * inverseTrigamma(excess);
  return { variance: Math.exp(mean + digamma(d0 / 2) - Math.log(d0 / 2)), degreesOfFreedom: d0 };
}

/** P(F > x) by the lower tail of 1/F, which keeps its digits where the chance is small. */
function upperTail(x: number, df1: number, df2: number): number {
  if (x === 0) return 1;
  if (df2 === Number.POSITIVE_INFINITY) return 1 - chiSquareCdf(df1 * x, df1);
  return fCdf(1 / x, df2, df1);
}
