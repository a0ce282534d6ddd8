import { type DayPosterior, predictiveWeights, THETAS } from '../../days/index.js';
import type { Component } from '../../fit/index.js';
import { normalCdf } from '../../stats/index.js';

/** Variances with their probabilities: what the error of a day to come is drawn from. */
export interface Mixture {
  readonly variances: Float64Array;
  readonly weights: Float64Array;
}

/** Days to come: the slope of each, ppm², with its probability. */
export interface PredictedDays {
  readonly component: Component;
  readonly A: number;
  readonly slopes: Float64Array;
  readonly weights: Float64Array;
}

export function predictedDays(component: Component, { A, B, comboWeights }: DayPosterior): PredictedDays {
  const weights = predictiveWeights(comboWeights);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return {
    component,
    A,
    slopes: THETAS.map((theta) => B * Math.exp(2 * theta)),
    weights: weights.map((weight) => weight / total),
  };
}

/** σ² of each kind of day at a length, both axes together, mm². */
export const varianceAt = ({ A, slopes }: PredictedDays, km: number): Float64Array =>
  slopes.map((slope) => A + slope * km * km);

/** Probability that an error lies beyond a limit: radial with σ² of both axes, or two-sided. */
function beyond(component: Component, limitMm: number, variance: number): number {
  return component === 'horizontal'
    ? Math.exp(-(limitMm ** 2) / variance)
    : 2 * normalCdf(-limitMm / Math.sqrt(variance));
}

/** The limit beyond which a share of the errors lies. */
export function limitOf(component: Component, { variances, weights }: Mixture, share: number): number {
  const tail = (limitMm: number): number => {
    let total = 0;
    for (let k = 0; k < variances.length; k++) {
      if (weights[k]! > 0) total += weights[k]! * beyond(component, limitMm, variances[k]!);
    }
    return total;
  };
  let high = Math.sqrt(variances.reduce((a, b) => Math.max(a, b)));
  while (tail(high) > share) high *= 2;
  let low = 0;
  while (high - low > 1e-7 * high) {
    const middle = (low + high) / 2;
    if (tail(middle) > share) low = middle;
    else high = middle;
  }
  return high;
}

/** Sums of a variance of one day and one of another, independent day. */
export function otherDays(days: PredictedDays, first: Float64Array, second: Float64Array): Mixture {
  // Days too rare to matter at any limit that is asked for.
  const used = Array.from(days.weights.keys()).filter((k) => days.weights[k]! > 1e-9);
  const variances = new Float64Array(used.length ** 2);
  const weights = new Float64Array(used.length ** 2);
  used.forEach((k, i) => {
    used.forEach((m, j) => {
      variances[i * used.length + j] = first[k]! + second[m]!;
      weights[i * used.length + j] = days.weights[k]! * days.weights[m]!;
    });
  });
  return { variances, weights };
}
