import { studentTQuantile } from '../stats/index.js';
import type { SquaredErrors } from './estimate.js';

/**
 * Interval of B = b² by inverting the self-normalised day score, for data that hold little information on distance:
 * for a trial B the constant is fitted, the day scores of B are freed of the constant, and B is kept while their sum
 * over its day-clustered error stays within Student t with G - 1. Cut at 0.
 * @returns limits in ppm²; an upper limit of Infinity when no B is rejected
 */
export function scoreLimits(
  data: SquaredErrors,
  days: readonly string[],
  A: number,
  B: number,
  confidence: number,
): readonly [low: number, high: number] {
  const names = [...new Set(days)].sort();
  const index = new Map(names.map((name, d) => [name, d]));
  const dayOf = Int32Array.from(days, (day) => index.get(day)!);
  const t = studentTQuantile((1 + confidence) / 2, names.length - 1);
  const inside = (trial: number): boolean => Math.abs(dayScore(data, dayOf, names.length, A, trial)) <= t;
  const lMax = data.l.reduce((max, value) => Math.max(max, value), 0);
  const lowest = (-0.98 * A) / lMax;
  const start = Math.max(B, lowest);
  const reach = Math.max(Math.abs(B), A / lMax);
  return [
    Math.max(0, boundary(inside, start, -reach, lowest)),
    Math.max(0, boundary(inside, start, reach, null)),
  ];
}

/** Walks outward until the trial is rejected, then bisects; `limit` stops the walk. */
function boundary(
  inside: (B: number) => boolean,
  start: number,
  reach: number,
  limit: number | null,
): number {
  let [near, far] = [start, start + reach / 4];
  for (let k = 0; k < 60; k++) {
    if (limit !== null && far <= limit) {
      far = limit;
      if (inside(far)) return far;
      break;
    }
    if (!inside(far)) break;
    // With few days the score is bounded by their number: what is not rejected this far out never is.
    if (far > 1e4 * Math.abs(reach)) return Number.POSITIVE_INFINITY;
    [near, far] = [far, far + (far - start) + reach / 4];
  }
  for (let k = 0; k < 80; k++) {
    const middle = (near + far) / 2;
    if (inside(middle)) near = middle;
    else far = middle;
  }
  return (near + far) / 2;
}

function dayScore(
  { y, l, w }: SquaredErrors,
  dayOf: Int32Array,
  groups: number,
  start: number,
  B: number,
): number {
  const A = constantFor(y, l, w, start, B);
  const g1 = new Float64Array(groups);
  const g2 = new Float64Array(groups);
  let [h11, h12] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    const mu = A + B * l[i]!;
    const v = w[i]! / mu ** 2;
    const score = v * (y[i]! - mu);
    g1[dayOf[i]!]! += score;
    g2[dayOf[i]!]! += score * l[i]!;
    h11 += v;
    h12 += v * l[i]!;
  }
  const h = g2.map((value, d) => value - (h12 / h11) * g1[d]!);
  const total = h.reduce((sum, value) => sum + value, 0);
  const mean = total / groups;
  const spread = h.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return total / Math.sqrt((groups / (groups - 1)) * spread);
}

/** A that solves Σ w (y - μ)/μ² = 0 for a given B, by bisection: the sum falls as A grows near the solution. */
function constantFor(y: Float64Array, l: Float64Array, w: Float64Array, start: number, B: number): number {
  const lMax = l.reduce((max, value) => Math.max(max, value), 0);
  const lowest = B < 0 ? -B * lMax * (1 + 1e-9) : 0;
  const sum = (A: number): number => {
    let total = 0;
    for (let i = 0; i < y.length; i++) {
      const mu = A + B * l[i]!;
      total += (w[i]! * (y[i]! - mu)) / mu ** 2;
    }
    return total;
  };
  let low = lowest + 1e-9 * start;
  let high = Math.max(start, low) * 2;
  if (sum(low) < 0) return low;
  while (sum(high) > 0) high *= 2;
  for (let k = 0; k < 100 && high - low > 1e-12 * high; k++) {
    const middle = (low + high) / 2;
    if (sum(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
