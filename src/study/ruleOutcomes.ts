import type { AdjustmentWeight } from './adjustmentWeights.js';
import type { RuleMove } from './ruleMoves.js';

/** What follows from fits and rules. */
export interface RuleOutcomes {
  /** The first rule of each component found again with one thing changed. */
  readonly ruleMoves: readonly RuleMove[];
  /** What an adjustment may be given. */
  readonly adjustmentWeights: readonly AdjustmentWeight[];
}
