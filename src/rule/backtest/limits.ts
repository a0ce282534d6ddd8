import { predictiveWeights, THETAS } from '../../days/index.js';
import { type Component, type FormEstimate, fittedSigmaMm } from '../../fit/index.js';
import { shareWithin } from '../reach/allDays.js';
import type { DayNodes } from '../reach/dayLimits.js';

/** Gaussian log density of an error whose variance, the sum over its axes, is known. */
export function logDensity(y: number, variance: number, axes: number): number {
  const perAxis = variance / axes;
  return -0.5 * (axes * Math.log(2 * Math.PI * perAxis) + y / perAxis);
}

/** σ of a trained fit at a length, mm; a fit of errors of 0 has none. */
export const trainedSigmaMm = (fitted: FormEstimate, km: number): number =>
  Math.max(fittedSigmaMm(fitted, km), 1e-6);

/**
 * The limit that holds a share of the shots of days to come at a length: quantile of the mixture over days, constant at
 * its estimate.
 */
export function mixtureLimit(component: Component, { B, nodes }: DayNodes, A: number) {
  const likeliest = nodes.reduce((best, node) => (node.weight > best.weight ? node : best));
  const weights = predictiveWeights(likeliest.comboWeights);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const remembered = new Map<number, number>();
  const quantile = (km: number, share: number): number => {
    const variances = THETAS.map((theta) => A + B * Math.exp(2 * theta) * km * km);
    const within = (limitMm: number): number =>
      variances.reduce(
        (sum, variance, k) => sum + weights[k]! * shareWithin(component, limitMm, variance),
        0,
      ) / total;
    let high = Math.sqrt(A + B * km * km);
    while (within(high) < share) high *= 2;
    let low = 0;
    while (high - low > 1e-6 * high) {
      const middle = (low + high) / 2;
      if (within(middle) < share) low = middle;
      else high = middle;
    }
    return high;
  };
  return (km: number, share: number): number => {
    let limit = remembered.get(km);
    if (limit === undefined) {
      limit = quantile(km, share);
      remembered.set(km, limit);
    }
    return limit;
  };
}
