import type { ErrorsInput } from '../errors/index.js';
import {
  contrastEstimate,
  type ErrorModel,
  type FitData,
  naiveCovariance,
  referenceData,
  type VarianceEstimate,
} from '../fit/index.js';
import { inputError } from '../logs/index.js';

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

/**
 * Null where the fit has no distance term with an uncertainty.
 * @throws InputError for a model of another form, or one composed of two
 */
export function fittedSpread(model: ErrorModel): FittedSpread | null {
  const variance = varianceOf(model);
  const { fitted, uncertainty, component } = model;
  if (uncertainty === null || !fitted.converged) return null;
  const { covariance, terms } = uncertainty;
  const standardError = (contrast: readonly [number, number]): number =>
    contrastEstimate(fitted.p, fitted.q, terms, covariance, contrast).standardError;
  return {
    A: variance.displayA,
    B: variance.displayB,
    standardErrorA: standardError([1, 0]),
    standardErrorB: standardError([0, 1]),
    independentErrorB: Math.sqrt(naiveCovariance(terms, component === 'horizontal' ? 2 : 1)[2]),
  };
}

/** @throws InputError for a model whose σ² is no A + B L² fitted to errors */
export function varianceOf({ variance, form, markComponent }: ErrorModel): VarianceEstimate {
  if (variance === null) {
    throw inputError(
      'bad-option',
      `Expected a model of the form "root-sum-square" for the study of days, came "${form}". Fit the errors in that form.`,
    );
  }
  if (markComponent !== null) {
    throw inputError(
      'bad-option',
      'Expected a model fitted to errors for the study of days, came one composed with the errors of marks. Hand in the model of repeatability that it was composed from.',
    );
  }
  return variance;
}

/**
 * The rows on which a model rests, counted from its reference.
 * @param weights in [0, 1], one for each row of the errors, where the model was fitted with weights
 * @throws InputError when the weights of a screened model are missing, or a column is
 */
export function fittedData(errors: ErrorsInput, model: ErrorModel, weights?: Float64Array): FitData {
  if (model.screened && weights === undefined) {
    throw inputError(
      'missing-weights',
      'Expected the weights of the screened model, came none. Hand in the weights that screenWrongFixes found and the model was fitted with.',
    );
  }
  const { component, reference } = model;
  return referenceData(errors, { component, reference, weights }).data;
}
