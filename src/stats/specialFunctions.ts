import { requirePositive, requireRange } from './check.js';

/** Both tails of a distribution function; each is computed for itself where it is the smaller one. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

const HALF_LOG_TWO_PI = 0.9189385332046727;
const TWO_PI = 2 * Math.PI;
/** Relative size at which a further term no longer changes a sum or product. */
const CONVERGED = 1e-17;
/** Two roundings: the factors of a continued fraction may never come nearer to 1 than that. */
const LENTZ_UNIT = 2 ** -51;
/** Keeps a continued fraction off an exact zero (modified Lentz method, Thompson & Barnett 1986). */
const TINY = 1e-300;

/**
 * Error of Stirling's formula, logGamma(x) − [(x − ½) log x − x + ½ log 2π], for x > 0.
 * Asymptotic series from 16 on (NIST Digital Library of Mathematical Functions 5.11.1); below, the recurrence
 * d(x) − d(x + 1) = (x + ½) log(1 + 1/x) − 1, which keeps the absolute error near one rounding.
 */
function stirlingError(x: number): number {
  let shifted = 0;
  let at = x;
  for (; at < 16; at += 1) shifted += (at + 0.5) * Math.log1p(1 / at) - 1;
  const s = 1 / (at * at);
  const series = (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s * (1 / 1188))))) / at;
  return shifted + series;
}

/**
 * Deviance part x log(x/m) + m − x without cancellation near x = m (Loader, "Fast and accurate computation of
 * binomial probabilities", 2000).
 */
function deviancePart(x: number, m: number): number {
  const v = (x - m) / (x + m);
  if (Math.abs(v) > 0.3) return x * Math.log(x / m) + m - x;
  let sum = (x - m) * v;
  let term = 2 * x * v;
  for (let j = 1; ; j += 1) {
    term *= v * v;
    const next = sum + term / (2 * j + 1);
    if (next === sum) return sum;
    sum = next;
  }
}

/**
 * Natural logarithm of the gamma function for x > 0; absolute error about 1e-15 (relative beyond x = 3).
 * @throws RangeError when x is not a finite number greater than 0.
 */
export function logGamma(x: number): number {
  requirePositive('x', x);
  return (x - 0.5) * Math.log(x) - x + HALF_LOG_TWO_PI + stirlingError(x);
}

/** Sum of x^n / ((a+1)…(a+n)), n = 0, 1, …: the lower incomplete gamma function over its prefactor. */
function gammaSeries(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let n = 1; term > sum * CONVERGED; n += 1) {
    term *= x / (a + n);
    sum += term;
  }
  return sum;
}

/** Legendre's continued fraction of the upper incomplete gamma function (NIST DLMF 8.9.2), modified Lentz. */
function gammaFraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / (Math.abs(b) < TINY ? TINY : b);
  let h = d;
  for (let n = 1; ; n += 1) {
    const an = n * (a - n);
    b += 2;
    d = an * d + b;
    d = 1 / (Math.abs(d) < TINY ? TINY : d);
    c = b + an / c;
    if (Math.abs(c) < TINY) c = TINY;
    const step = c * d;
    h *= step;
    if (Math.abs(step - 1) <= LENTZ_UNIT) return h;
  }
}

/**
 * Regularised incomplete gamma functions P(a, x) and Q(a, x), a > 0, x ≥ 0 (infinity allowed); the smaller tail
 * keeps a relative error below about 1e-12. Saddle-point prefactor (Loader 2000) times series or continued fraction.
 * @throws RangeError for a or x outside these ranges.
 */
export function regularizedGamma(a: number, x: number): Tails {
  requirePositive('a', a);
  requireRange(x >= 0, 'x', 'a number of at least 0', x);
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  // x^a e^-x / Γ(a + 1)
  const prefactor = Math.exp(-stirlingError(a) - deviancePart(a, x)) / Math.sqrt(TWO_PI * a);
  if (x < Math.max(1, a)) {
    const lower = prefactor * gammaSeries(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = prefactor === 0 ? 0 : prefactor * a * gammaFraction(a, x);
  return { lower: 1 - upper, upper };
}

/** Continued fraction of the incomplete beta function (NIST DLMF 8.17.22), modified Lentz. */
function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 - ((a + b) * x) / (a + 1);
  d = 1 / (Math.abs(d) < TINY ? TINY : d);
  let h = d;
  for (let m = 1; ; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    let step = 1;
    for (const coefficient of [even, odd]) {
      d = 1 + coefficient * d;
      d = 1 / (Math.abs(d) < TINY ? TINY : d);
      c = 1 + coefficient / c;
      if (Math.abs(c) < TINY) c = TINY;
      step = c * d;
      h *= step;
    }
    if (Math.abs(step - 1) <= LENTZ_UNIT) return h;
  }
}

/**
 * Regularised incomplete beta function I_x(a, b) and its complement, 0 ≤ x ≤ 1, a, b > 0. Pass `oneMinusX` where it is
 * known better than 1 − x (x close to 1). The smaller tail keeps a relative error below about 1e-12.
 * @throws RangeError for arguments outside these ranges.
 */
export function regularizedBeta(x: number, a: number, b: number, oneMinusX: number = 1 - x): Tails {
  requireRange(x >= 0 && x <= 1, 'x', 'a number from 0 to 1', x);
  requireRange(oneMinusX >= 0 && oneMinusX <= 1, 'oneMinusX', 'a number from 0 to 1', oneMinusX);
  requirePositive('a', a);
  requirePositive('b', b);
  if (x === 0) return { lower: 0, upper: 1 };
  if (oneMinusX === 0) return { lower: 1, upper: 0 };
  const n = a + b;
  const exponent = stirlingError(n) - stirlingError(a) - stirlingError(b);
  const deviance = deviancePart(a, n * x) + deviancePart(b, n * oneMinusX);
  // x^a (1-x)^b / B(a, b); square roots apart so that no product under- or overflows
  const prefactor = Math.sqrt(a / n) * Math.sqrt(b / TWO_PI) * Math.exp(exponent - deviance);
  if (x < (a + 1) / (n + 2)) {
    const lower = prefactor === 0 ? 0 : (prefactor / a) * betaFraction(x, a, b);
    return { lower, upper: 1 - lower };
  }
  const upper = prefactor === 0 ? 0 : (prefactor / b) * betaFraction(oneMinusX, b, a);
  return { lower: 1 - upper, upper };
}
