import { requirePositive } from './check.js';

/** Bernoulli numbers B2, B4, … B14 of the asymptotic series (NIST DLMF 5.11.2, 5.15.8). */
const BERNOULLI = [1 / 6, -1 / 30, 1 / 42, -1 / 30, 5 / 66, -691 / 2730, 7 / 6];
/** From here on the series is exact to rounding; smaller arguments are moved up by the recurrence. */
const ASYMPTOTIC_FROM = 16;

/**
 * Digamma function ψ(x), the derivative of logGamma, x > 0.
 * @throws RangeError when x is not a finite number greater than 0.
 */
export function digamma(x: number): number {
  requirePositive('x', x);
  let [at, shifted] = [x, 0];
  for (; at < ASYMPTOTIC_FROM; at += 1) shifted -= 1 / at;
  const series = BERNOULLI.reduce((total, b, k) => total - b / ((2 * k + 2) * at ** (2 * k + 2)), 0);
  return shifted + Math.log(at) - 1 / (2 * at) + series;
}

/**
 * Trigamma function ψ′(x), x > 0.
 * @throws RangeError when x is not a finite number greater than 0.
 */
export function trigamma(x: number): number {
  requirePositive('x', x);
  let [at, shifted] = [x, 0];
  for (; at < ASYMPTOTIC_FROM; at += 1) shifted += 1 / (at * at);
  const series = BERNOULLI.reduce((total, b, k) => total + b / at ** (2 * k + 3), 0);
  return shifted + 1 / at + 1 / (2 * at * at) + series;
}

/**
 * Tetragamma function ψ″(x), x > 0; negative everywhere.
 * @throws RangeError when x is not a finite number greater than 0.
 */
export function tetragamma(x: number): number {
  requirePositive('x', x);
  let [at, shifted] = [x, 0];
  for (; at < ASYMPTOTIC_FROM; at += 1) shifted -= 2 / at ** 3;
  const series = BERNOULLI.reduce((total, b, k) => total - ((2 * k + 3) * b) / at ** (2 * k + 4), 0);
  return shifted - 1 / (at * at) - 1 / at ** 3 + series;
}

/**
 * The x > 0 with ψ′(x) = value, by Newton steps on the convex 1/ψ′ (Smyth 2004, appendix; from memory).
 * @throws RangeError when the value is not a finite number greater than 0.
 */
export function inverseTrigamma(value: number): number {
  requirePositive('value', value);
  if (value > 1e7) return 1 / Math.sqrt(value);
  if (value < 1e-6) return 1 / value;
  let x = 0.5 + 1 / value;
  for (let k = 0; k < 50; k += 1) {
    const reached = trigamma(x);
    const step = (reached * (1 - reached / value)) / tetragamma(x);
    x += step;
    if (Math.abs(step) <= 1e-13 * x) break;
  }
  return x;
}
