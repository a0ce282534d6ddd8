import type { FormEstimate } from './estimate.js';
import { FORM_CURVES } from './forms.js';
import type { GroupCells, LengthCells } from './lengthCells.js';

/**
 * Gaussian log score of the errors of a group under a fit made without it: Σ w log density (Gneiting & Raftery 2007,
 * from memory).
 * @param components 1, or 2 where a row is a radial square with the variance shared by both axes
 */
export function logScore(
  { form, displayP, displayQ }: FormEstimate,
  { lengths }: LengthCells,
  group: GroupCells,
  components: number,
): number {
  const curve = FORM_CURVES[form];
  let score = 0;
  group.cells.forEach((k, j) => {
    const perAxis = curve.variance(displayP + displayQ * curve.regressor(lengths[k]!)) / components;
    score -=
      0.5 * (components * group.weights[j]! * Math.log(2 * Math.PI * perAxis) + group.squares[j]! / perAxis);
  });
  return score;
}

/** The mean over days of what one description gains over another, with its standard error over days. */
export interface ScoreGain {
  readonly gain: number;
  readonly se: number;
  /** 1 or -1: which one predicts better by more than one standard error; 0: neither. */
  readonly winner: -1 | 0 | 1;
}

/** The one-standard-error rule (Breiman et al. 1984, from memory) on gains per shot, one for each day. */
export function scoreGain(gains: readonly number[]): ScoreGain {
  const gain = gains.reduce((sum, value) => sum + value, 0) / gains.length;
  const squares = gains.reduce((sum, value) => sum + (value - gain) ** 2, 0);
  const se = Math.sqrt(squares / (gains.length - 1) / gains.length);
  return { gain, se, winner: gain > se ? 1 : gain < -se ? -1 : 0 };
}
