import { comboFit } from './comboFit.js';
import { comboQuantiles, dayPrior, THETAS } from './dayGrid.js';
import { dayLogLikelihood, relativeLikelihood } from './dayLikelihood.js';
import type { DayPosterior } from './dayModel.js';
import { weightedQuantiles } from './weightedQuantile.js';

/**
 * The ppm that a share of days does not exceed, at levels of the posterior: level 0.5 is the best estimate, 0.95 the
 * one-sided upper limit.
 * @param dayShare between 0 and 1
 * @param levels between 0 and 1
 */
export function dayQuantilePpm(
  { B, comboWeights }: DayPosterior,
  dayShare: number,
  levels: readonly number[],
): number[] {
  const logs = weightedQuantiles(comboQuantiles(dayShare), comboWeights, levels);
  return logs.map((log) => Math.sqrt(B) * Math.exp(log));
}

/**
 * Probability of each of THETAS for a day to come, over all combos.
 * @param comboWeights of a posterior or of a node
 */
export function predictiveWeights(comboWeights: Float64Array): Float64Array {
  const prior = dayPrior();
  const weights = new Float64Array(THETAS.length);
  comboWeights.forEach((weight, j) => {
    for (let k = 0; k < weights.length; k++) weights[k]! += weight * prior[j * weights.length + k]!;
  });
  return weights;
}

/** The day model as it would be had the constant another value. */
export interface DayModelNode {
  readonly A: number;
  /** Weight of the value; the weights of all nodes sum to 1. */
  readonly weight: number;
  /** Probability of each of DAY_COMBOS given this constant. */
  readonly comboWeights: Float64Array;
}

/** Nodes and weights of Gauss-Hermite quadrature for a standard normal variable, 7 points (Abramowitz & Stegun 25.10). */
const NODES = [
  [-3.750439717725742, 0.000548268855972],
  [-2.366759410734541, 0.030757123967586],
  [-1.154405394739968, 0.240123178605013],
  [0, 0.457142857142857],
  [1.154405394739968, 0.240123178605013],
  [2.366759410734541, 0.030757123967586],
  [3.750439717725742, 0.000548268855972],
] as const;
/** The log of a constant that is hardly known is not moved farther than this. */
const FARTHEST = 3;

/**
 * The day model at seven values of the constant, for promises in which the constant matters: A exp(z se/A), the
 * likelihoods of the days computed anew at each. A constant of 0 is the only node there is.
 */
export function dayModelNodes(posterior: DayPosterior): DayModelNode[] {
  const { B, cells, effectiveShare, comboWeights } = posterior;
  return constantNodes(posterior).map(({ A, weight }) => {
    if (A === posterior.A) return { A, weight, comboWeights };
    const likelihood = relativeLikelihood(dayLogLikelihood(cells, A, B, effectiveShare));
    return { A, weight, comboWeights: comboFit(likelihood).weights };
  });
}

/** The seven values of the constant with their weights; a constant of 0 alone. */
export function constantNodes({
  A,
  standardErrorA,
}: DayPosterior): { readonly A: number; readonly weight: number }[] {
  if (A <= 0) return [{ A, weight: 1 }];
  return NODES.map(([z, weight]) => ({
    A: z === 0 ? A : A * Math.exp(Math.max(-FARTHEST, Math.min(FARTHEST, (z * standardErrorA) / A))),
    weight,
  }));
}
