import { studentTQuantile, sum } from '../stats/index.js';

/** A mean whose uncertainty counts days, not shots. */
export interface ClusteredMean {
  readonly mean: number;
  /** NaN with fewer than two days. */
  readonly standardError: number;
  readonly days: number;
  readonly count: number;
}

/**
 * Mean of values with the day-clustered standard error G/(G-1) Σ_d (Σ_i w (y - ȳ))² / (Σ w)² (linearised cluster
 * variance, Liang & Zeger 1986, from memory).
 * @param weights one for each value; default 1
 */
export function clusteredMean(
  values: ArrayLike<number>,
  days: readonly string[],
  weights?: ArrayLike<number>,
): ClusteredMean {
  const list = Array.from(values);
  const weight = (i: number): number => weights?.[i] ?? 1;
  const total = weights === undefined ? list.length : sum(Array.from(weights));
  const mean = sum(list.map((value, i) => weight(i) * value)) / total;
  const perDay = new Map<string, number>();
  for (let i = 0; i < list.length; i++) {
    perDay.set(days[i]!, (perDay.get(days[i]!) ?? 0) + weight(i) * (list[i]! - mean));
  }
  const groups = perDay.size;
  const squares = sum([...perDay.values()].map((total) => total * total));
  const standardError = groups < 2 ? Number.NaN : Math.sqrt((groups / (groups - 1)) * squares) / total;
  return { mean, standardError, days: groups, count: list.length };
}

/** An estimate with the limits of its interval; null limits where the days are too few for any. */
export interface Interval {
  readonly estimate: number;
  readonly low: number | null;
  readonly high: number | null;
}

/** Root of a mean square with its interval on the log scale, Student t with G - 1. Null without values. */
export function rootMeanSquare(
  squares: ArrayLike<number>,
  days: readonly string[],
  confidence: number,
): Interval | null {
  if (squares.length === 0) return null;
  const { mean, standardError, days: groups } = clusteredMean(squares, days);
  const estimate = Math.sqrt(mean);
  if (groups < 2 || mean <= 0) return { estimate, low: null, high: null };
  const half = (studentTQuantile((1 + confidence) / 2, groups - 1) * standardError) / mean;
  return { estimate, low: estimate * Math.exp(-half / 2), high: estimate * Math.exp(half / 2) };
}
