import { dot, leastSquares } from '../stats/index.js';

/** Squared errors and squared lengths of the occupations, with weights in [0, 1]. */
export interface SquaredErrors {
  /** Squared error, mm². */
  readonly y: Float64Array;
  /** Squared baseline length, km². */
  readonly l: Float64Array;
  readonly w: Float64Array;
}

/** Variance model μ = A + B l: A in mm², B in ppm² (mm²/km²). */
export interface VarianceEstimate {
  /** Unconstrained solution, for inference; B may be slightly negative. */
  readonly A: number;
  readonly B: number;
  /** For display: B cut at 0, A at its floor shown as 0, each with the other term fitted again. */
  readonly displayA: number;
  readonly displayB: number;
  /** A stands at its floor: no short shots identify the constant. */
  readonly constantAtFloor: boolean;
  readonly converged: boolean;
  readonly iterations: number;
}

const MAX_ITERATIONS = 200;
const MAX_HALVINGS = 40;
const TOLERANCE = 1e-12;

/**
 * Solves Σ w x (y - μ)/μ² = 0 for μ = A + B l, x = (1, l): Gaussian maximum likelihood and the gamma model with
 * identity link at once, unbiased without normality (Davidian & Carroll 1987; McCullagh & Nelder 1989; from memory).
 * Iteratively reweighted least squares with three safeguards: μ stays positive by halving the step; the step is halved
 * for good when Q = Σ w (log μ + y/μ) rises, since the plain iteration can fall into a cycle; A is held at a floor of a
 * thousandth of the mean square while the data push it below.
 * @param start a solution nearby, from which fewer steps are needed; default half of the mean square each
 */
export function estimateVariance(
  { y, l, w }: SquaredErrors,
  start?: { readonly A: number; readonly B: number },
): VarianceEstimate {
  const n = y.length;
  const total = w.reduce((sum, value) => sum + value, 0);
  const yMean = dot(w, y) / total;
  if (!(yMean > 0)) {
    return { A: 0, B: 0, displayA: 0, displayB: 0, constantAtFloor: true, converged: n > 0, iterations: 0 };
  }
  const scale = dot(w, l) / total;
  const x = l.map((value) => value / scale);
  const xMax = x.reduce((max, value, i) => (w[i]! > 0 ? Math.max(max, value) : max), 0);
  const floor = 1e-3 * yMean;
  const ones = new Float64Array(n).fill(1);
  const v = new Float64Array(n);

  let [A, B] = startingPoint(start, yMean, scale, xMax);
  let [step, held, converged] = [1, false, false];
  let q = objective(y, x, w, A, B);
  let iterations = 0;
  while (iterations < MAX_ITERATIONS) {
    iterations += 1;
    for (let i = 0; i < n; i++) v[i] = w[i]! / (A + B * x[i]!) ** 2;
    let target: Point = held ? { A: floor, B: 0 } : solve(ones, x, y, v);
    held ||= A <= 1.05 * floor && target.A < floor;
    if (held) {
      A = floor;
      target = { A: floor, B: slopeAlone(y, x, v, floor) };
      q = objective(y, x, w, A, B);
    }
    // Shorten the step until the next point is allowed, then until it is no worse; the latter for good.
    const old = { A, B };
    const toward = target;
    const at = (factor: number): Point => ({
      A: old.A + factor * (toward.A - old.A),
      B: old.B + factor * (toward.B - old.B),
    });
    const allowed = (p: Point): boolean => (held || p.A > floor) && p.A + p.B * xMax > floor;
    const quality = (p: Point): number => objective(y, x, w, p.A, p.B);
    let factor = step;
    for (let h = 0; h < MAX_HALVINGS && !allowed(at(factor)); h++) factor /= 2;
    for (let h = 0; h < MAX_HALVINGS && quality(at(factor)) > q + 1e-13 * Math.abs(q); h++) {
      step /= 2;
      factor /= 2;
    }
    const next = at(factor);
    const change =
      Math.abs(next.A - A) / Math.abs(next.A) +
      Math.abs(next.B - B) / Math.max(Math.abs(next.B), 1e-9 * Math.abs(next.A));
    [A, B] = [next.A, next.B];
    q = quality(next);
    if (change >= TOLERANCE) continue;
    if (held && constantScore(y, x, w, A, B) > 0) {
      [held, step] = [false, 1];
      continue;
    }
    converged = true;
    break;
  }
  const constantAtFloor = A <= 1.05 * floor;
  let [displayA, displayB] = [A, B / scale];
  if (B < 0) [displayA, displayB] = [yMean, 0];
  if (constantAtFloor) [displayA, displayB] = [0, meanRatio(y, l, w)];
  return { A, B: B / scale, displayA, displayB, constantAtFloor, converged, iterations };
}

/** On the scaled length; a start that would make μ small or negative somewhere is not taken. */
function startingPoint(
  start: { readonly A: number; readonly B: number } | undefined,
  yMean: number,
  scale: number,
  xMax: number,
): [A: number, B: number] {
  const half = yMean / 2;
  if (start === undefined) return [half, half];
  const [A, B] = [start.A, start.B * scale];
  return A > 0.01 * yMean && A + B * xMax > 0.01 * yMean ? [A, B] : [half, half];
}

interface Point {
  readonly A: number;
  readonly B: number;
}

function solve(ones: Float64Array, x: Float64Array, y: Float64Array, v: Float64Array): Point {
  const { coefficients } = leastSquares([ones, x], y, v);
  return { A: coefficients[0]!, B: coefficients[1]! };
}

/** Σ w (log μ + y/μ): minus twice the Gaussian log likelihood but for a constant. */
function objective(y: Float64Array, x: Float64Array, w: Float64Array, A: number, B: number): number {
  let sum = 0;
  for (let i = 0; i < y.length; i++) {
    const mu = A + B * x[i]!;
    sum += w[i]! * (Math.log(mu) + y[i]! / mu);
  }
  return sum;
}

function slopeAlone(y: Float64Array, x: Float64Array, v: Float64Array, A: number): number {
  let [top, bottom] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    top += v[i]! * x[i]! * (y[i]! - A);
    bottom += v[i]! * x[i]! * x[i]!;
  }
  return top / bottom;
}

function constantScore(y: Float64Array, x: Float64Array, w: Float64Array, A: number, B: number): number {
  let sum = 0;
  for (let i = 0; i < y.length; i++) {
    const mu = A + B * x[i]!;
    sum += (w[i]! * (y[i]! - mu)) / mu ** 2;
  }
  return sum;
}

/** Σ w (y/l) / Σ w: the maximum-likelihood B when A is 0. */
function meanRatio(y: Float64Array, l: Float64Array, w: Float64Array): number {
  let [top, bottom] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    top += (w[i]! * y[i]!) / l[i]!;
    bottom += w[i]!;
  }
  return top / bottom;
}
