import { chiSquareQuantile } from '../../stats/index.js';

/** Mean error of one mark with the variance that its days alone explain. */
export interface MarkMeanError {
  /** Mean error by axis, mm. */
  readonly meanMm: readonly number[];
  /** Standard error per axis by the model, mm. */
  readonly tauMm: number;
}

/** A variance per axis with its limits, mm². */
export interface VarianceWithLimits {
  readonly estimate: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Variance s² per axis of the marks' own errors: the s² ≥ 0 at which Q(s²) = Σ mean²/(s² + τ²) over marks and axes
 * equals their number (Paule & Mandel 1982), with the limits at which Q equals the quantiles of χ² (Q-profile; Viechtbauer
 * 2007; both from memory). The means are not centred: an offset common to all marks is part of the absolute error.
 */
export function markVariance(marks: readonly MarkMeanError[], confidence: number): VarianceWithLimits {
  const terms = marks.flatMap(({ meanMm, tauMm }) =>
    meanMm.map((mean) => ({ square: mean ** 2, variance: tauMm ** 2 })),
  );
  const q = (s2: number): number =>
    terms.reduce((sum, { square, variance }) => sum + square / (s2 + variance), 0);
  const solve = (target: number): number => solveFalling(q, target);
  const tail = (1 - confidence) / 2;
  return {
    estimate: solve(terms.length),
    low: solve(chiSquareQuantile(1 - tail, terms.length)),
    high: solve(chiSquareQuantile(tail, terms.length)),
  };
}

/**
 * Variance s² per axis by which marks differ from each other: as {@link markVariance}, with the weighted mean of all
 * marks taken out of each axis first.
 */
export function markSpread(marks: readonly MarkMeanError[]): number {
  const axes = marks[0]?.meanMm.length ?? 0;
  const q = (s2: number): number => {
    let total = 0;
    for (let c = 0; c < axes; c++) {
      let [weights, sums, squares] = [0, 0, 0];
      for (const { meanMm, tauMm } of marks) {
        const weight = 1 / (s2 + tauMm ** 2);
        weights += weight;
        sums += weight * meanMm[c]!;
        squares += weight * meanMm[c]! ** 2;
      }
      total += squares - sums ** 2 / weights;
    }
    return total;
  };
  return solveFalling(q, axes * (marks.length - 1));
}

/** Where a falling function of s² ≥ 0 reaches a target; 0 when it starts below. */
function solveFalling(f: (s2: number) => number, target: number): number {
  if (f(0) <= target) return 0;
  let [low, high] = [0, 1];
  while (f(high) > target) [low, high] = [high, high * 2];
  while (high - low > 1e-14 * high) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (f(middle) > target) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
