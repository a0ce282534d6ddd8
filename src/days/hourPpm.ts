import { type EstimateWithLimits, type FitData, varianceLimits } from '../fit/index.js';
import { dayIndex } from './dayIndex.js';

const MAX_ITERATIONS = 200;
const TOLERANCE = 1e-12;

/**
 * The ppm of some of the rows, constant and day factors held: μ = A + B f_d l with B alone estimated. Interval by day
 * clusters (CR3 of one coefficient, Satterthwaite degrees of freedom); null limits with fewer than 2 days.
 * @param x f_d l of every row of data
 * @param rows indices of the rows
 */
export function ppmOfRows(
  data: FitData,
  x: Float64Array,
  rows: readonly number[],
  A: number,
  start: number,
  confidence: number,
): EstimateWithLimits {
  const { y, w } = data;
  const B = slope(y, x, w, rows, A, start);
  const { days, dayOf } = dayIndex(rows.map((i) => data.day[i]!));
  const estimate = Math.sqrt(B);
  if (days.length < 2) return { estimate, low: null, high: null };
  const [scores, information] = [new Float64Array(days.length), new Float64Array(days.length)];
  rows.forEach((i, k) => {
    const mu = A + B * x[i]!;
    const v = (w[i]! * x[i]!) / mu ** 2;
    scores[dayOf[k]!]! += v * (y[i]! - mu);
    information[dayOf[k]!]! += v * x[i]!;
  });
  const total = information.reduce((a, b) => a + b);
  const shares = information.map((value) => value / total);
  const kept = (d: number): number => Math.max(1e-8, 1 - shares[d]!);
  const variance = scores.reduce((sum, score, d) => sum + (score / kept(d)) ** 2, 0) / total ** 2;
  const limits = varianceLimits(
    {
      value: B,
      standardError: Math.sqrt(variance),
      degreesOfFreedom: Math.min(days.length - 1, satterthwaite(shares, kept)),
    },
    confidence,
  );
  return { estimate, low: Math.sqrt(Math.min(limits[0], B)), high: Math.sqrt(Math.max(limits[1], B)) };
}

/** Maximum likelihood B ≥ 0; weighted least squares again and again, the step halved while the likelihood falls. */
function slope(
  y: Float64Array,
  x: Float64Array,
  w: Float64Array,
  rows: readonly number[],
  A: number,
  start: number,
): number {
  const quality = (B: number): number =>
    rows.reduce((sum, i) => {
      const mu = A + B * x[i]!;
      return sum + w[i]! * (Math.log(mu) + y[i]! / mu);
    }, 0);
  let B = start;
  let q = quality(B);
  for (let k = 0; k < MAX_ITERATIONS; k++) {
    let [top, bottom] = [0, 0];
    for (const i of rows) {
      const v = (w[i]! * x[i]!) / (A + B * x[i]!) ** 2;
      top += v * (y[i]! - A);
      bottom += v * x[i]!;
    }
    const target = Math.max(0, top / bottom);
    let next = target;
    let reached = quality(next);
    // A rise of the last digits is rounding.
    for (let h = 0; h < 40 && !(reached <= q + 1e-13 * Math.abs(q)); h++) {
      next = (B + next) / 2;
      reached = quality(next);
    }
    const change = Math.abs(next - B);
    [B, q] = [next, reached];
    if (change <= TOLERANCE * start) break;
  }
  return B;
}

/** Degrees of freedom of one coefficient under the working model (Bell & McCaffrey 2002; from memory). */
function satterthwaite(shares: Float64Array, kept: (d: number) => number): number {
  const k = shares.map((share, d) => share / Math.sqrt(kept(d)));
  const own = k.reduce((sum, value) => sum + value * value, 0);
  const fourth = k.reduce((sum, value) => sum + value ** 4, 0);
  let [trace, diagonal] = [0, 0];
  k.forEach((value, d) => {
    const p = value / Math.sqrt(kept(d)) - value * value;
    trace += p;
    diagonal += p * p;
  });
  return Math.max(1, trace ** 2 / (own ** 2 - fourth + diagonal));
}
