import { requirePositive, requireProbability, requireRange } from './check.js';
import { erfc } from './errorFunction.js';
import { invertTails } from './invertTails.js';
import { regularizedBeta, regularizedGamma, type Tails } from './specialFunctions.js';

const SQRT_TWO_PI = Math.sqrt(2 * Math.PI);

/** Upper tail of the standard normal distribution at z ≥ 0. */
const normalTail = (z: number): number => erfc(z * Math.SQRT1_2) / 2;

/**
 * Standard normal distribution function; both tails keep their relative accuracy (about 1e-13).
 * @throws RangeError when z is NaN.
 */
export function normalCdf(z: number): number {
  requireRange(!Number.isNaN(z), 'z', 'a number', z);
  const tail = normalTail(Math.abs(z));
  return z <= 0 ? tail : 1 - tail;
}

/**
 * Standard normal quantile, 0 < p < 1. Start: Hastings' rational approximation (Abramowitz & Stegun 26.2.23); then
 * Newton steps on the logarithm of the smaller tail.
 * @throws RangeError when p is not between 0 and 1.
 */
export function normalQuantile(p: number): number {
  requireProbability(p);
  if (p === 0.5) return 0;
  const tail = Math.min(p, 1 - p);
  const t = Math.sqrt(-2 * Math.log(tail));
  let z =
    t - (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)));
  for (let i = 0; i < 20; i += 1) {
    const reached = normalTail(Math.max(z, 0));
    const density = Math.exp((-z * z) / 2) / SQRT_TWO_PI;
    const step = ((Math.log(reached) - Math.log(tail)) * reached) / density;
    z += step;
    if (Math.abs(step) <= 4 * Number.EPSILON * Math.max(Math.abs(z), 1e-3)) break;
  }
  return p < 0.5 ? -z : z;
}

/**
 * Chi-square distribution function at x ≥ 0 for df > 0 (not only integers).
 * @throws RangeError for x < 0, NaN, or df not finite and positive.
 */
export function chiSquareCdf(x: number, df: number): number {
  requirePositive('df', df);
  requireRange(x >= 0, 'x', 'a number of at least 0', x);
  return regularizedGamma(df / 2, x / 2).lower;
}

/**
 * Chi-square quantile, 0 < p < 1, df > 0.
 * @throws RangeError for p or df outside these ranges.
 */
export function chiSquareQuantile(p: number, df: number): number {
  requireProbability(p);
  requirePositive('df', df);
  const tailsAt = (u: number): Tails => regularizedGamma(df / 2, Math.exp(u) / 2);
  return Math.exp(invertTails(tailsAt, { lower: p, upper: 1 - p }, Math.log(df)));
}

/** Share of |T| below and above t ≥ 0: a beta distribution in t²/(df + t²). */
function absoluteTTails(t: number, df: number): Tails {
  const ratio = (t / df) * t;
  return regularizedBeta(
    ratio === Number.POSITIVE_INFINITY ? 1 : ratio / (1 + ratio),
    0.5,
    df / 2,
    1 / (1 + ratio),
  );
}

/**
 * Student t distribution function for df > 0, integer or not (df = Infinity: standard normal).
 * @throws RangeError when t is NaN or df is not positive.
 */
export function studentTCdf(t: number, df: number): number {
  requireRange(!Number.isNaN(t), 't', 'a number', t);
  if (df === Number.POSITIVE_INFINITY) return normalCdf(t);
  requirePositive('df', df);
  const { lower, upper } = absoluteTTails(Math.abs(t), df);
  return t < 0 ? upper / 2 : 0.5 + lower / 2;
}

/**
 * Student t quantile, 0 < p < 1, df > 0, integer or not (df = Infinity: standard normal).
 * @throws RangeError for p or df outside these ranges.
 */
export function studentTQuantile(p: number, df: number): number {
  requireProbability(p);
  if (df === Number.POSITIVE_INFINITY) return normalQuantile(p);
  requirePositive('df', df);
  if (p === 0.5) return 0;
  const tail = Math.min(p, 1 - p);
  // 1 − 2·tail, written so that it is exact for p close to one half
  const target = { lower: 2 * (0.5 - tail), upper: 2 * tail };
  const size = Math.exp(invertTails((u) => absoluteTTails(Math.exp(u), df), target, 0));
  return p < 0.5 ? -size : size;
}

/** Tails of the F distribution at x ≥ 0: a beta distribution in df1·x / (df1·x + df2). */
function fTails(x: number, df1: number, df2: number): Tails {
  const ratio = (x * df1) / df2;
  return regularizedBeta(
    ratio === Number.POSITIVE_INFINITY ? 1 : ratio / (1 + ratio),
    df1 / 2,
    df2 / 2,
    1 / (1 + ratio),
  );
}

/**
 * F distribution function at x ≥ 0 for df1, df2 > 0.
 * @throws RangeError for x < 0, NaN, or degrees of freedom not finite and positive.
 */
export function fCdf(x: number, df1: number, df2: number): number {
  requireRange(x >= 0, 'x', 'a number of at least 0', x);
  requirePositive('df1', df1);
  requirePositive('df2', df2);
  return fTails(x, df1, df2).lower;
}

/**
 * F quantile, 0 < p < 1, df1, df2 > 0.
 * @throws RangeError for arguments outside these ranges.
 */
export function fQuantile(p: number, df1: number, df2: number): number {
  requireProbability(p);
  requirePositive('df1', df1);
  requirePositive('df2', df2);
  return Math.exp(invertTails((u) => fTails(Math.exp(u), df1, df2), { lower: p, upper: 1 - p }, 0));
}

/**
 * Beta quantile, 0 < p < 1, shapes a, b > 0; a result too close to 1 for a double is 1.
 * @throws RangeError for arguments outside these ranges.
 */
export function betaQuantile(p: number, a: number, b: number): number {
  requireProbability(p);
  requirePositive('a', a);
  requirePositive('b', b);
  const tailsAt = (logit: number): Tails =>
    regularizedBeta(1 / (1 + Math.exp(-logit)), a, b, 1 / (1 + Math.exp(logit)));
  const logit = invertTails(tailsAt, { lower: p, upper: 1 - p }, Math.log(a / b));
  return 1 / (1 + Math.exp(-logit));
}
