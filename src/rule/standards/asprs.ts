import type { ErrorsInput } from '../../errors/index.js';
import { checkPoints } from './checkPoints.js';
import { FROM_MEMORY, type StandardHead } from './condition.js';
import type { CheckPointOptions } from './nssda.js';

/** Root-mean-square errors after the ASPRS Positional Accuracy Standards, edition 2. */
export interface AsprsResult extends StandardHead {
  /** With the error of the check points in quadrature, mm; null without check points. */
  readonly horizontalRmseMm: number | null;
  readonly verticalRmseMm: number | null;
  readonly spatialRmseMm: number | null;
}

const FEWEST_POINTS = 30;

/** A tested root-mean-square error with that of the check points in quadrature. */
export const withControlError = (testedMm: number, controlMm: number): number =>
  Math.hypot(testedMm, controlMm);

/**
 * ASPRS Positional Accuracy Standards for Digital Geospatial Data, edition 2 of 2023 (formulas from memory): RMSE with the
 * error of the check points added in quadrature; no 95 % level.
 * @param errors against the published coordinates
 * @throws InputError when a column is missing
 */
export function asprs(
  errors: ErrorsInput,
  { planSigmaMm, heightSigmaMm }: CheckPointOptions = {},
): AsprsResult {
  const { planPoints, heightPoints, rmseRadialMm, rmseUpMm } = checkPoints(errors);
  const horizontal = planPoints > 0 ? withControlError(rmseRadialMm, Math.SQRT2 * (planSigmaMm ?? 0)) : null;
  const vertical = heightPoints > 0 ? withControlError(rmseUpMm, heightSigmaMm ?? 0) : null;
  return {
    standard: 'ASPRS Positional Accuracy Standards, edition 2 (2023)',
    definition:
      'root-mean-square error of check points with the error of their own survey added in quadrature; each mark is one check point with the mean square of its shots',
    conditions: [
      { text: `at least ${FEWEST_POINTS} check points in plan`, met: planPoints >= FEWEST_POINTS },
      { text: `at least ${FEWEST_POINTS} check points in height`, met: heightPoints >= FEWEST_POINTS },
      {
        text: 'the error of the check points is stated',
        met: planSigmaMm !== undefined && heightSigmaMm !== undefined,
      },
    ],
    caution: FROM_MEMORY,
    horizontalRmseMm: horizontal,
    verticalRmseMm: vertical,
    spatialRmseMm: horizontal === null || vertical === null ? null : Math.hypot(horizontal, vertical),
  };
}
