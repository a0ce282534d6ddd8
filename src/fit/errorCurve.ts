import type { ErrorModel } from './errorModel.js';
import { fittedSigmaMm } from './estimate.js';
import { type FitComponent, FORM_CURVES } from './forms.js';
import { type ContrastEstimate, contrastEstimate, varianceLimits, varianceUpperLimit } from './intervals.js';
import { type OwnVariance, ownVariance } from './reference/ownVariance.js';

/** σ of a model at one baseline length, mm, with its two-sided limits; null limits where the model has none. */
export interface CurvePoint {
  readonly baselineKm: number;
  readonly sigmaMm: number;
  readonly lowMm: number | null;
  readonly highMm: number | null;
}

/** σ(L) of the displayed model at the given lengths, with limits at the model's confidence. */
export function errorCurve(model: ErrorModel<FitComponent>, lengthsKm: readonly number[]): CurvePoint[] {
  return lengthsKm.map((baselineKm) => {
    const [lowMm, highMm] = sigmaLimitsMm(model, baselineKm, model.confidence) ?? [null, null];
    return { baselineKm, sigmaMm: sigmaAtMm(model, baselineKm), lowMm, highMm };
  });
}

/** Two-sided limits of σ at a length, mm; null where the model has no uncertainty. */
export function sigmaLimitsMm(
  model: ErrorModel<FitComponent>,
  baselineKm: number,
  confidence: number,
): readonly [low: number, high: number] | null {
  const own = ownVariance(model, (1 - confidence) / 2);
  const estimate = estimateAt(model, baselineKm, own);
  if (estimate === null) return null;
  const [low, high] = withOwn(estimate, varianceLimits(estimate, confidence), own);
  const { sigma } = FORM_CURVES[model.form];
  const sigmaMm = sigmaAtMm(model, baselineKm);
  return [Math.min(sigma(low), sigmaMm), Math.max(sigma(high), sigmaMm)];
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
  const own = ownVariance(model, 1 - confidence);
  const estimate = estimateAt(model, baselineKm, own);
  if (estimate === null) return null;
  const [, high] = withOwn(estimate, [0, varianceUpperLimit(estimate, confidence)], own);
  return Math.max(FORM_CURVES[model.form].sigma(high), sigmaAtMm(model, baselineKm));
}

/** Limits of a sum of two variances from the limits of each (MOVER; Zou & Donner 2008; from memory). */
function withOwn(
  { value }: ContrastEstimate,
  [low, high]: readonly [number, number],
  own: OwnVariance | null,
): readonly [number, number] {
  if (own === null) return [low, high];
  const center = value + own.estimate;
  return [
    Math.max(0, center - Math.hypot(value - low, own.estimate - own.low)),
    center + Math.hypot(high - value, own.high - own.estimate),
  ];
}

/** η at a length, which is σ² or σ by the form, with its uncertainty; of a composed model without the marks' part. */
function estimateAt(
  { form, fitted, uncertainty }: ErrorModel<FitComponent>,
  baselineKm: number,
  own: OwnVariance | null,
): ContrastEstimate | null {
  if (uncertainty === null) return null;
  const x = FORM_CURVES[form].regressor(baselineKm ** 2);
  const p = fitted.p - (own?.estimate ?? 0);
  return contrastEstimate(p, fitted.q, uncertainty.terms, uncertainty.covariance, [1, x]);
}
