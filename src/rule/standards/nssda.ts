import type { ErrorsInput } from '../../errors/index.js';
import { normalQuantile, radialQuantile } from '../../stats/index.js';
import { checkPoints, controlCondition } from './checkPoints.js';
import { FROM_MEMORY, type StandardHead } from './condition.js';

/** Accuracy at 95 % after the National Standard for Spatial Data Accuracy. */
export interface NssdaResult extends StandardHead {
  readonly rmseEastMm: number;
  readonly rmseNorthMm: number;
  readonly rmseRadialMm: number;
  readonly rmseUpMm: number;
  /** By the standard's formulas; null without check points, or where the axes differ too much for them. */
  readonly horizontal95Mm: number | null;
  readonly vertical95Mm: number | null;
  /** The exact radius of 95 % for these axes: the standard's mean of both axes is up to 6 % too small. */
  readonly exactHorizontal95Mm: number | null;
}

export interface CheckPointOptions {
  /** Standard deviation of the check points' coordinates, mm: plan per axis, and height. */
  readonly planSigmaMm?: number | undefined;
  readonly heightSigmaMm?: number | undefined;
}

const FEWEST_POINTS = 20;
const LEAST_RATIO = 0.6;
/** Axes closer than this count as equal. */
const EQUAL = 0.999;

/**
 * NSSDA (FGDC-STD-007.3-1998; formulas from memory): 2.4477 · (RMSE_x + RMSE_y)/2 for a ratio of the axes from 0.6 to 1
 * (1.7308 RMSE_r for equal ones), 1.9600 RMSE_z.
 * @param errors against the published coordinates
 * @throws InputError when a column is missing
 */
export function nssda(errors: ErrorsInput, options: CheckPointOptions = {}): NssdaResult {
  const { planSigmaMm, heightSigmaMm } = options;
  const points = checkPoints(errors);
  const { rmseEastMm, rmseNorthMm, rmseUpMm, rmseRadialMm, planPoints, heightPoints } = points;
  const ratio = Math.min(rmseEastMm, rmseNorthMm) / Math.max(rmseEastMm, rmseNorthMm);
  const circle = radialQuantile(1, 1, 0.95);
  const byFormula =
    ratio >= EQUAL ? (circle / Math.SQRT2) * rmseRadialMm : (circle * (rmseEastMm + rmseNorthMm)) / 2;
  return {
    standard: 'NSSDA (FGDC-STD-007.3-1998)',
    definition:
      'accuracy at 95 % from the root-mean-square error of independent check points, bias included; each mark is one check point with the mean square of its shots',
    conditions: [
      {
        text: `at least ${FEWEST_POINTS} check points in plan`,
        met: planPoints >= FEWEST_POINTS,
      },
      { text: `at least ${FEWEST_POINTS} check points in height`, met: heightPoints >= FEWEST_POINTS },
      {
        text: 'a fifth of the check points in each quarter of the area, here of the horizon about the base',
        met: points.leastQuarterShare === null ? null : points.leastQuarterShare >= 0.2,
      },
      {
        text: 'a ratio of the axes of 0.6 or more, for the formula of the plan',
        met: Number.isNaN(ratio) ? null : ratio >= LEAST_RATIO,
      },
      controlCondition(planSigmaMm, Math.min(rmseEastMm, rmseNorthMm), 3),
      controlCondition(heightSigmaMm, rmseUpMm, 3),
    ],
    caution: FROM_MEMORY,
    rmseEastMm,
    rmseNorthMm,
    rmseRadialMm,
    rmseUpMm,
    horizontal95Mm: ratio >= LEAST_RATIO ? byFormula : null,
    vertical95Mm: heightPoints > 0 ? normalQuantile(0.975) * rmseUpMm : null,
    exactHorizontal95Mm: rmseRadialMm > 0 ? radialQuantile(rmseEastMm, rmseNorthMm, 0.95) : null,
  };
}
