import { axesOf } from '../../fit/index.js';
import { chiSquareCdf, normalQuantile } from '../../stats/index.js';
import type { WatchBasis } from './watchBasis.js';

/** Squares, squared lengths and weights of one day. */
export interface DayShots {
  readonly y: ArrayLike<number>;
  readonly l: ArrayLike<number>;
  readonly w: ArrayLike<number>;
}

/** How one day compares with days to come by the model. */
export interface DayStatistic {
  /** Mean square against the model, where the ppm or the constant matters. */
  readonly ratio: number;
  /** Probability of a ratio so large or larger on a day to come. */
  readonly pValue: number;
  /** Its normal score, at most 4. */
  readonly score: number;
}

const LARGEST_SCORE = 4;
/** Keeps the score of a day that is uncommonly good finite. */
const SMALLEST_P = 1e-12;

/**
 * A day's weighted mean of y/μ against a mixture of gamma laws, one for each kind of day to come, with the mean and the
 * variance that the day's own lengths give. Weights: ω = B l/μ for the ppm, 1 - ω for the constant.
 * @returns null for a day whose shots say nothing of the part
 */
export function dayStatistic(
  { A, B, effectiveShare, logFactors, probabilities, component }: WatchBasis,
  { y, l, w }: DayShots,
  part: 'ppm' | 'constant',
): DayStatistic | null {
  const n = y.length;
  const weights = new Float64Array(n);
  let [total, top] = [0, 0];
  for (let i = 0; i < n; i++) {
    const mu = A + B * l[i]!;
    const share = (B * l[i]!) / mu;
    weights[i] = w[i]! * (part === 'ppm' ? share : 1 - share);
    total += weights[i]!;
    top += (weights[i]! * y[i]!) / mu;
  }
  if (!(total > 1e-9)) return null;
  const ratio = top / total;
  const axes = axesOf(component);
  let pValue = 0;
  logFactors.forEach((theta, k) => {
    const probability = probabilities[k]!;
    if (probability < 1e-12) return;
    const slope = B * Math.exp(2 * theta);
    let [mean, squares] = [0, 0];
    for (let i = 0; i < n; i++) {
      const part = (weights[i]! * (A + slope * l[i]!)) / (A + B * l[i]!);
      mean += part;
      squares += part * part;
    }
    mean /= total;
    const variance = ((2 / (axes * effectiveShare)) * squares) / total ** 2;
    // Gamma with this mean and variance: 2x/scale is chi-square with twice its shape as degrees of freedom.
    pValue += probability * (1 - chiSquareCdf((2 * ratio * mean) / variance, (2 * mean * mean) / variance));
  });
  const kept = Math.min(1 - SMALLEST_P, Math.max(SMALLEST_P, pValue));
  return { ratio, pValue, score: Math.min(-normalQuantile(kept), LARGEST_SCORE) };
}
