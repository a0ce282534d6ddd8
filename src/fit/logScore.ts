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

/** Two descriptions that say the same differ by this much through rounding; no gain this small matters. */
const ROUNDING = 1e-9;

/** The one-standard-error rule (Breiman et al. 1984, from memory) on gains per shot, one for each day. */
export function scoreGain(gains: readonly number[]): ScoreGain {
  const gain = gains.reduce((sum, value) => sum + value, 0) / gains.length;
  const squares = gains.reduce((sum, value) => sum + (value - gain) ** 2, 0);
  const se = Math.sqrt(squares / (gains.length - 1) / gains.length);
  const clear = Math.abs(gain) > Math.max(se, ROUNDING);
  return { gain, se, winner: clear ? (gain > 0 ? 1 : -1) : 0 };
}
