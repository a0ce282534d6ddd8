import { clusteredMean } from '../../split/index.js';
import { studentTCdf, studentTQuantile } from '../../stats/index.js';

/** Ratio of two RMS values with its limits. */
export interface RmsRatio {
  readonly ratio: number;
  readonly low: number;
  readonly high: number;
  readonly pValue: number;
}

/** Squares, weights and days of the shots on one side of a comparison. */
export interface Side {
  readonly squares: readonly number[];
  readonly weights: readonly number[];
  readonly days: readonly string[];
}

/**
 * RMS of `top` over RMS of `bottom`, both with errors by day, on the log scale with Welch's degrees of freedom. The two
 * sides must have no day in common.
 * @returns null with fewer than two days or no error on one side
 */
export function ratioOfMeanSquares(top: Side, bottom: Side, confidence: number): RmsRatio | null {
  const parts = [top, bottom].map(({ squares, weights, days }) => {
    const { mean, standardError, days: count } = clusteredMean(squares, days, weights);
    return { log: Math.log(mean) / 2, variance: (standardError / mean / 2) ** 2, df: count - 1, mean };
  }) as [Part, Part];
  if (parts.some(({ df, mean }) => df < 1 || !(mean > 0))) return null;
  const [a, b] = parts;
  const total = a.variance + b.variance;
  if (!(total > 0)) return null;
  const df = total ** 2 / (a.variance ** 2 / a.df + b.variance ** 2 / b.df);
  return fromLog(a.log - b.log, Math.sqrt(total), df, confidence);
}

interface Part {
  readonly log: number;
  readonly variance: number;
  readonly df: number;
  readonly mean: number;
}

/**
 * RMS of `top` over RMS of `bottom` where both come from the same days: the days' differences of squares count.
 * @returns null with fewer than two days or no error on one side
 */
export function pairedRatio(
  days: readonly string[],
  top: readonly number[],
  bottom: readonly number[],
  confidence: number,
): RmsRatio | null {
  const [meanTop, meanBottom] = [clusteredMean(top, days), clusteredMean(bottom, days)];
  if (meanTop.days < 2 || !(meanTop.mean > 0) || !(meanBottom.mean > 0)) return null;
  const relative = top.map((value, k) => value / meanTop.mean - bottom[k]! / meanBottom.mean);
  const { standardError, days: count } = clusteredMean(relative, days);
  if (!(standardError > 0)) return null;
  return fromLog(Math.log(meanTop.mean / meanBottom.mean) / 2, standardError / 2, count - 1, confidence);
}

function fromLog(log: number, standardError: number, df: number, confidence: number): RmsRatio {
  const half = studentTQuantile((1 + confidence) / 2, df) * standardError;
  return {
    ratio: Math.exp(log),
    low: Math.exp(log - half),
    high: Math.exp(log + half),
    pValue: 2 * studentTCdf(-Math.abs(log / standardError), df),
  };
}
