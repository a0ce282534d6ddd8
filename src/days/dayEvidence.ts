import { DEGRADED_FACTOR } from './dayEstimates.js';
import { THETAS } from './dayGrid.js';
import type { DayPosterior } from './dayModel.js';
import { dayQuantilePpm, predictiveWeights } from './dayQuantiles.js';

/** Squares and squared lengths of some shots, weights in [0, 1]. */
export interface Shots {
  readonly y: ArrayLike<number>;
  readonly l: ArrayLike<number>;
  readonly w: ArrayLike<number>;
}

/** From here on evidence is called strong, from the second on substantial (Jeffreys 1961; from memory). */
export const STRONG = 10;
export const SUBSTANTIAL = 3.2;

/** What shots of one day say of it. */
export interface DayEvidence {
  /** How many times as probable the shots are on an ordinary day as on a degraded one. */
  readonly ordinaryOverDegraded: (shots: Shots) => number;
  /** How many times as probable as if the whole error were larger, constant and ppm alike. */
  readonly growthOverLevel: (shots: Shots) => number;
}

/**
 * Weighs shots under the day model: an ordinary day has a ppm below 1.5 times that of the median day, a degraded one
 * from there on, each as probable inside as among days to come. Shots are tempered by their effective share.
 */
export function dayEvidence(posterior: DayPosterior): DayEvidence {
  const { A, B, effectiveShare, cells, comboWeights } = posterior;
  const tempering = 0.5 * effectiveShare * cells.axes;
  const weights = predictiveWeights(comboWeights);
  const medianLog = Math.log(dayQuantilePpm(posterior, 0.5, [0.5])[0]! / Math.sqrt(B));
  const threshold = medianLog + Math.log(DEGRADED_FACTOR);
  const logLikelihood = ({ y, l, w }: Shots, muOf: (l: number) => number): number => {
    let total = 0;
    for (let i = 0; i < y.length; i++) {
      const mu = muOf(l[i]!);
      total += w[i]! * (Math.log(mu) + y[i]! / mu);
    }
    return -tempering * total;
  };
  const bySlope = (shots: Shots): Float64Array =>
    THETAS.map((theta) => logLikelihood(shots, (l) => A + B * Math.exp(2 * theta) * l));
  return {
    ordinaryOverDegraded: (shots) => {
      const logs = bySlope(shots);
      const best = logs.reduce((a, b) => Math.max(a, b));
      const mean = (inside: (theta: number) => boolean): number => {
        let [top, bottom] = [0, 0];
        THETAS.forEach((theta, k) => {
          if (!inside(theta)) return;
          top += weights[k]! * Math.exp(logs[k]! - best);
          bottom += weights[k]!;
        });
        return top / bottom;
      };
      return mean((theta) => theta < threshold) / mean((theta) => theta >= threshold);
    },
    growthOverLevel: (shots) => {
      const usual = B * Math.exp(2 * medianLog);
      const slope = bySlope(shots).reduce((a, b) => Math.max(a, b));
      const level = THETAS.map((theta) =>
        logLikelihood(shots, (l) => Math.exp(2 * theta) * (A + usual * l)),
      ).reduce((a, b) => Math.max(a, b));
      return Math.exp(slope - level);
    },
  };
}
