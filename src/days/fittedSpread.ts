import type { ErrorsInput } from '../errors/index.js';
import { type ErrorModel, type FitData, naiveCovariance, prepareErrors } from '../fit/index.js';

/** What the study of days needs of a fit μ = A + B l: displayed estimates and standard errors, mm² and ppm². */
export interface FittedSpread {
  readonly A: number;
  readonly B: number;
  /** Cluster-robust by day. */
  readonly standardErrorA: number;
  readonly standardErrorB: number;
  /** As if every shot were independent. */
  readonly independentErrorB: number;
}

/** Null where the fit has no distance term with an uncertainty. */
export function fittedSpread({ variance, uncertainty, component }: ErrorModel): FittedSpread | null {
  if (uncertainty === null || !variance.converged) return null;
  const { covariance, terms } = uncertainty;
  return {
    A: variance.displayA,
    B: variance.displayB,
    standardErrorA: Math.sqrt(covariance[0]),
    standardErrorB: Math.sqrt(covariance[2]),
    independentErrorB: Math.sqrt(naiveCovariance(terms, component === 'horizontal' ? 2 : 1)[2]),
  };
}

/**
 * The rows on which a model rests.
 * @param weights in [0, 1], one for each row of the errors, where the model was fitted with weights
 */
export function fittedData(errors: ErrorsInput, model: ErrorModel, weights?: Float64Array): FitData {
  return prepareErrors(errors, model.component, weights);
}
