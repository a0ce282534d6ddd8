import type { DayPosterior } from '../days/index.js';
import { betaQuantile } from '../stats/index.js';

/** A limit for days that rests on their order alone (Wilks 1941; Hahn & Meeker 1991; from memory). */
export interface DayBound {
  /** Days with a shot where the distance part exceeds the constant: the others say nothing of it. */
  readonly days: number;
  /** Fewest such days with which the worst of them bounds the share of days. */
  readonly daysNeeded: number;
  /** Length at which the tolerance still holds on the day that bounds them; null with too few days. */
  readonly baselineKm: number | null;
  readonly sentence: string;
}

/**
 * Fewest days of which the worst one is, with the confidence, as bad as the limit of a share of days: q^n ≤ 1 - c.
 * 29 days for 90 %, 59 for 95 % at 95 % confidence.
 */
export const daysNeeded = (dayShare: number, confidence: number): number =>
  Math.ceil(Math.log(1 - confidence) / Math.log(dayShare) - 1e-9);

/**
 * Lower limit of the share of good days when so many of a number of days were good, one-sided (Clopper & Pearson 1934).
 * With every one of G days good it is (1 - c)^(1/G).
 */
export function goodDayShareLimit(good: number, days: number, confidence: number): number {
  return good === 0 ? 0 : betaQuantile(1 - confidence, good, days - good + 1);
}

/**
 * The tolerance's length on the day that bounds the share of days by order alone.
 * @param allowedVariance σ² that the tolerance leaves at a length, mm²; constant and what is added to it not yet taken off
 */
export function dayBound(
  { A, B, cells }: DayPosterior,
  dayShare: number,
  confidence: number,
  reachOf: (slope: number) => number,
): DayBound {
  const slopes: number[] = [];
  cells.days.forEach((_, d) => {
    const [from, to] = [cells.starts[d]!, cells.starts[d + 1]!];
    const l = cells.l.subarray(from, to);
    const weights = cells.weights.subarray(from, to);
    if (l.some((value, c) => B * value > A && weights[c]! > 0)) {
      slopes.push(daySlope(l, weights, cells.squares.subarray(from, to), A, B));
    }
  });
  slopes.sort((a, b) => b - a);
  const needed = daysNeeded(dayShare, confidence);
  const rank = boundingRank(slopes.length, dayShare, confidence);
  const share = percent(dayShare);
  if (rank === 0) {
    return {
      days: slopes.length,
      daysNeeded: needed,
      baselineKm: null,
      sentence: `Without a model of the days nothing can be said of ${share} of them: that takes ${needed} days with far shots, there are ${slopes.length}.`,
    };
  }
  const baselineKm = reachOf(slopes[rank - 1]!);
  const which = rank === 1 ? 'worst' : `${rank}${ordinal(rank)} worst`;
  return {
    days: slopes.length,
    daysNeeded: needed,
    baselineKm,
    sentence: `Without a model of the days the ${which} of ${slopes.length} days bounds ${share} of them (${percent(confidence)} confidence): ${(Math.floor(baselineKm * 10) / 10).toFixed(1)} km.`,
  };
}

/** Largest k for which the k-th worst of n days is as bad as the limit of the share of days; 0 when none is. */
function boundingRank(n: number, dayShare: number, confidence: number): number {
  // P(fewer than k days beyond the limit) = Σ_{i<k} C(n, i) (1 - q)^i q^(n - i).
  let [term, below, rank] = [dayShare ** n, 0, 0];
  for (let i = 0; i < n; i++) {
    below += term;
    if (below > 1 - confidence + 1e-12) break;
    rank = i + 1;
    term *= ((n - i) / (i + 1)) * ((1 - dayShare) / dayShare);
  }
  return rank;
}

/** B of one day with the constant held, by likelihood: fixed point of weighted least squares from below and above. */
function daySlope(
  l: Float64Array,
  weights: Float64Array,
  squares: Float64Array,
  A: number,
  start: number,
): number {
  const score = (slope: number): number => {
    let total = 0;
    for (let c = 0; c < l.length; c++) {
      const mu = A + slope * l[c]!;
      total += (l[c]! * (squares[c]! - weights[c]! * mu)) / mu ** 2;
    }
    return total;
  };
  // The score falls from positive to negative at the largest maximum: bracket it from above.
  let high = start;
  while (score(high) > 0 && high < 1e9 * start) high *= 2;
  let low = high;
  while (score(low) <= 0 && low > 1e-9 * start) low /= 2;
  for (let k = 0; k < 60; k++) {
    const middle = Math.sqrt(low * high);
    if (score(middle) > 0) low = middle;
    else high = middle;
  }
  return high;
}

const percent = (share: number): string => `${Number((100 * share).toFixed(1))} %`;

const ordinal = (rank: number): string => (rank === 2 ? 'nd' : rank === 3 ? 'rd' : 'th');
