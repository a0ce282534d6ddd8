import { toleranceFactor } from '../rule/index.js';
import type { FitResult } from './fitResultTypes.js';

/** Constant and distance part of one kind of spread; null where the data give none. */
export interface ConstantAndPpm {
  readonly constantMm: number | null;
  readonly ppm: number | null;
}

/** What an adjustment may be given for baselines of this base and these crews, one meaning beside the other. */
export interface AdjustmentWeight {
  readonly component: FitResult['component'];
  readonly form: FitResult['form'];
  /** Whether the errors of the marks' coordinates are in the constant. */
  readonly markError: boolean;
  /** Whether the setting of the rod over the mark is in the constant. */
  readonly centring: boolean;
  /** One standard deviation of one axis (east or north), or of the height. */
  readonly perAxis: ConstantAndPpm;
  /** Root of the mean of east² + north²; null for heights. */
  readonly radialRms: ConstantAndPpm | null;
  /** What holds 95 % of Gaussian errors, of both axes together or of the height. */
  readonly share95: ConstantAndPpm;
}

/**
 * Weights for an adjustment out of the fits: without the marks' own errors from repeatability, with them from the fit
 * against the published coordinates, and both again without the stated centring, which many adjustments add themselves.
 * @param centringSigmaMm standard deviation per axis of setting the rod over a mark, mm; 0 where it is not stated
 */
export function adjustmentWeights(fits: readonly FitResult[], centringSigmaMm: number): AdjustmentWeight[] {
  return fits.flatMap((fit): AdjustmentWeight[] => {
    const basis = fits.find(({ component, basisOfRule }) => basisOfRule && component === fit.component)!;
    if (fit.screened !== basis.screened || fit.reference === 'relative') return [];
    const withCentring = weight(fit, fit.constantMm.estimate, true);
    const canTakeOut =
      centringSigmaMm > 0 && fit.component === 'horizontal' && fit.form === 'root-sum-square';
    if (!canTakeOut) return [withCentring];
    return [withCentring, weight(fit, withoutCentring(fit.constantMm.estimate, centringSigmaMm), false)];
  });
}

/** Null when the stated centring is larger than all of the constant: then one of the two is wrong. */
function withoutCentring(constantMm: number | null, centringSigmaMm: number): number | null {
  if (constantMm === null) return null;
  const rest = constantMm ** 2 - 2 * centringSigmaMm ** 2;
  return rest < 0 ? null : Math.sqrt(rest);
}

function weight(
  { component, form, reference, ppm }: FitResult,
  constantMm: number | null,
  centring: boolean,
): AdjustmentWeight {
  const times = (factor: number): ConstantAndPpm => ({
    constantMm: constantMm === null ? null : factor * constantMm,
    ppm: ppm.estimate === null ? null : factor * ppm.estimate,
  });
  const horizontal = component === 'horizontal';
  return {
    component,
    form,
    markError: reference === 'absolute',
    centring,
    perAxis: times(horizontal ? Math.SQRT1_2 : 1),
    radialRms: horizontal ? times(1) : null,
    share95: times(toleranceFactor(component, 0.95)),
  };
}
