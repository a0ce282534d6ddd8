import type { ErrorModel } from './errorModel.js';
import { contrastEstimate, varianceLimits, varianceUpperLimit } from './intervals.js';

/** σ of a model at one baseline length, mm, with its two-sided limits; null limits where the model has none. */
export interface CurvePoint {
  readonly baselineKm: number;
  readonly sigmaMm: number;
  readonly lowMm: number | null;
  readonly highMm: number | null;
}

/** σ(L) of the displayed model at the given lengths, with limits at the model's confidence. */
export function errorCurve(model: ErrorModel, lengthsKm: readonly number[]): CurvePoint[] {
  const { displayA, displayB, A, B } = model.variance;
  return lengthsKm.map((baselineKm) => {
    const variance = displayA + displayB * baselineKm ** 2;
    const sigmaMm = Math.sqrt(variance);
    if (model.uncertainty === null) return { baselineKm, sigmaMm, lowMm: null, highMm: null };
    const { terms, covariance } = model.uncertainty;
    const estimate = contrastEstimate(A, B, terms, covariance, [1, baselineKm ** 2]);
    const [low, high] = varianceLimits(estimate, model.confidence);
    return {
      baselineKm,
      sigmaMm,
      lowMm: Math.sqrt(Math.min(low, variance)),
      highMm: Math.sqrt(Math.max(high, variance)),
    };
  });
}

/** σ at a length, mm. */
export function sigmaAtMm(model: ErrorModel, baselineKm: number): number {
  return Math.sqrt(model.variance.displayA + model.variance.displayB * baselineKm ** 2);
}

/** One-sided upper limit of σ at a length, mm; null where the model has no uncertainty. */
export function sigmaUpperLimitMm(model: ErrorModel, baselineKm: number, confidence: number): number | null {
  if (model.uncertainty === null) return null;
  const { terms, covariance } = model.uncertainty;
  const { A, B } = model.variance;
  const estimate = contrastEstimate(A, B, terms, covariance, [1, baselineKm ** 2]);
  const limit = varianceUpperLimit(estimate, confidence);
  return Math.sqrt(Math.max(limit, model.variance.displayA + model.variance.displayB * baselineKm ** 2));
}
