import { DAY_COMBOS, dayPrior, MEDIAN_COUNT, priorSupport, THETAS } from '../../days/index.js';
import type { Component } from '../../fit/index.js';
import { normalCdf } from '../../stats/index.js';
import type { DayNodes } from './dayLimits.js';

/** Shots of all days to come: a mixture over days, which has longer tails than its RMS tells. */
export interface AllDays {
  /** Probability that at least a share of all shots at a length lies within a limit. */
  readonly confidence: (km: number, limitMm: number, share: number) => number;
  /** Expected share of all shots at a length within a limit, by the posterior. */
  readonly shareWithin: (km: number, limitMm: number) => number;
}

const NEGLIGIBLE = 1e-9;

/** Share of Gaussian errors within a limit: radial for the horizontal component, whose σ² is that of both axes. */
export function shareWithin(component: Component, limitMm: number, variance: number): number {
  if (!(variance > 0)) return 1;
  return component === 'horizontal'
    ? -Math.expm1(-(limitMm ** 2) / variance)
    : 1 - 2 * normalCdf(-limitMm / Math.sqrt(variance));
}

/** Sums of the weights up to each median, of every spread and family by itself. */
function runningSums(weights: Float64Array): Float64Array {
  const sums = weights.slice();
  for (let j = 0; j < sums.length; j++) if (j % MEDIAN_COUNT > 0) sums[j]! += sums[j - 1]!;
  return sums;
}

/** Expectation of a value of each θ under a combo. */
function ofCombo(values: Float64Array, j: number): number {
  const prior = dayPrior();
  const { first, end } = priorSupport();
  const from = j * values.length;
  const stop = end[j]!;
  let total = 0;
  for (let k = first[j]!; k < stop; k++) total += prior[from + k]! * values[k]!;
  return total;
}

/** @param addedVariance what comes to σ² at every length, mm² */
export function allDays(component: Component, { B, nodes }: DayNodes, addedVariance: number): AllDays {
  const slopes = THETAS.map((theta) => B * Math.exp(2 * theta));
  const parts = nodes.map(({ A, weight, comboWeights }) => ({
    A: A + addedVariance,
    weight,
    comboWeights,
    used: Uint32Array.from(comboWeights.keys()).filter((j) => comboWeights[j]! > NEGLIGIBLE),
    upToMedian: runningSums(comboWeights),
  }));
  const inside = (A: number, km: number, limitMm: number): Float64Array =>
    slopes.map((slope) => shareWithin(component, limitMm, A + slope * km * km));
  return {
    confidence: (km, limitMm, share) =>
      parts.reduce((sum, { A, weight, upToMedian }) => {
        const values = inside(A, km, limitMm);
        let held = 0;
        for (let first = 0; first < DAY_COMBOS.length; first += MEDIAN_COUNT) {
          // A larger median day means fewer shots within: the medians that hold are the first ones.
          let [low, high] = [0, MEDIAN_COUNT];
          while (low < high) {
            const middle = (low + high) >> 1;
            if (ofCombo(values, first + middle) >= share) low = middle + 1;
            else high = middle;
          }
          if (low > 0) held += upToMedian[first + low - 1]!;
        }
        return sum + weight * held;
      }, 0),
    shareWithin: (km, limitMm) =>
      parts.reduce((sum, { A, weight, comboWeights, used }) => {
        const values = inside(A, km, limitMm);
        let expected = 0;
        for (const j of used) expected += comboWeights[j]! * ofCombo(values, j);
        return sum + weight * expected;
      }, 0),
  };
}
