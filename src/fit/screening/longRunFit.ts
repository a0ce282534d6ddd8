import { sumsByLength } from '../sumsByLength.js';

/** A and B on x; both at least 0. */
type Pair = readonly [A: number, B: number];

const LEAST_A = 1e-3;
const BOUND = 6.25;

/** Below this share of Σv Σvx² the determinant is rounding: the lengths do not differ. */
const SINGULAR = 1e-12;

/** One weighted least-squares step of y on (1, x) with weights w/μ²; a negative term is cut and the other fitted alone. */
function step(
  y: Float64Array,
  x: Float64Array,
  w: Float64Array | null,
  [A, B]: Pair,
  boundedMean: number | null,
): Pair {
  let [s0, s1, s2, t0, t1] = [0, 0, 0, 0, 0];
  for (let i = 0; i < y.length; i++) {
    const square = y[i]!;
    if (Number.isNaN(square)) continue;
    const mu = Math.max(A + B * x[i]!, 1e-6);
    const value = boundedMean === null ? square : (mu * Math.min(square / mu, BOUND)) / boundedMean;
    const v = (w === null ? 1 : w[i]!) / (mu * mu);
    const vx = v * x[i]!;
    s0 += v;
    s1 += vx;
    s2 += vx * x[i]!;
    t0 += v * value;
    t1 += vx * value;
  }
  const determinant = s0 * s2 - s1 * s1;
  if (!(determinant > SINGULAR * s0 * s2)) return [Math.max(t0 / s0, LEAST_A), 0];
  const nextA = (s2 * t0 - s1 * t1) / determinant;
  const nextB = (s0 * t1 - s1 * t0) / determinant;
  if (nextB < 0) return [Math.max(t0 / s0, LEAST_A), 0];
  return nextA <= 0 ? [LEAST_A, t1 / s2] : [nextA, nextB];
}

/** @param scale what B on x is divided by to be in ppm² */
function iterate(
  next: (pair: Pair) => Pair,
  start: Pair,
  most: number,
  tolerance: number,
  scale: number,
): Pair {
  let [A, B] = start;
  for (let k = 0; k < most; k++) {
    const [nextA, nextB] = next([A, B]);
    const change = Math.abs(nextA - A) / (A + 1e-9) + Math.abs(nextB - B) / scale / (B / scale + 1e-3);
    [A, B] = [nextA, nextB];
    if (change < tolerance) break;
  }
  return [A, B];
}

/** A and B from squared errors bounded at 6.25 μ, so that wrong fixes hardly matter. @param size typical error, mm */
export function startWithoutTails(y: Float64Array, x: Float64Array, size: number, boundedMean: number): Pair {
  const half = Math.max(size ** 2 / 2, LEAST_A);
  return iterate((pair) => step(y, x, null, pair, boundedMean), [half, half], 300, 1e-9, 1);
}

/**
 * Up to ten steps of the weighted fit of the long run, which has no day factors.
 * @param y,w errors that are not known have weight 0, and any number as y
 */
export function weightedSteps(
  y: Float64Array,
  x: Float64Array,
  w: Float64Array,
  start: Pair,
  scale: number,
): Pair {
  const cells = sumsByLength({ y, l: x, w });
  return iterate((pair) => step(cells.y, cells.l, cells.w, pair, null), start, 10, 1e-12, scale);
}
