import type { ErrorModel } from './errorModel.js';
import { fittedSigmaMm } from './estimate.js';
import { type FitComponent, FORM_CURVES } from './forms.js';
import { type ContrastEstimate, contrastEstimate, varianceLimits, varianceUpperLimit } from './intervals.js';

/** σ of a model at one baseline length, mm, with its two-sided limits; null limits where the model has none. */
export interface CurvePoint {
  readonly baselineKm: number;
  readonly sigmaMm: number;
  readonly lowMm: number | null;
  readonly highMm: number | null;
}

/** σ(L) of the displayed model at the given lengths, with limits at the model's confidence. */
export function errorCurve(model: ErrorModel<FitComponent>, lengthsKm: readonly number[]): CurvePoint[] {
  const { sigma } = FORM_CURVES[model.form];
  return lengthsKm.map((baselineKm) => {
    const sigmaMm = sigmaAtMm(model, baselineKm);
    const estimate = estimateAt(model, baselineKm);
    if (estimate === null) return { baselineKm, sigmaMm, lowMm: null, highMm: null };
    const [low, high] = varianceLimits(estimate, model.confidence);
    return {
      baselineKm,
      sigmaMm,
      lowMm: Math.min(sigma(low), sigmaMm),
      highMm: Math.max(sigma(high), sigmaMm),
    };
  });
}

/** σ at a length, mm. */
export function sigmaAtMm({ fitted }: ErrorModel<FitComponent>, baselineKm: number): number {
  return fittedSigmaMm(fitted, baselineKm);
}

/** One-sided upper limit of σ at a length, mm; null where the model has no uncertainty. */
export function sigmaUpperLimitMm(
  model: ErrorModel<FitComponent>,
  baselineKm: number,
  confidence: number,
): number | null {
  const estimate = estimateAt(model, baselineKm);
  if (estimate === null) return null;
  const limit = FORM_CURVES[model.form].sigma(varianceUpperLimit(estimate, confidence));
  return Math.max(limit, sigmaAtMm(model, baselineKm));
}

/** η at a length, which is σ² or σ by the form, with its uncertainty. */
function estimateAt(
  { form, fitted, uncertainty }: ErrorModel<FitComponent>,
  baselineKm: number,
): ContrastEstimate | null {
  if (uncertainty === null) return null;
  const x = FORM_CURVES[form].regressor(baselineKm ** 2);
  return contrastEstimate(fitted.p, fitted.q, uncertainty.terms, uncertainty.covariance, [1, x]);
}
