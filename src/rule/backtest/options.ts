import type { DayModel } from '../../days/index.js';
import type { Screening } from '../../fit/index.js';
import type { FormDoubt } from '../formDoubt.js';
import type { HeightAllowance, RuleGround } from '../ground.js';
import type { SpecSheet } from '../specSheet.js';
import type { Tolerance } from '../tolerance.js';

export interface BackTestOptions {
  /** How days differ, of the whole study; without it rules and limits are those of all days together. */
  readonly dayModel?: DayModel | null | undefined;
  /** The screening with whose weights the model was fitted; its suspects count as failures of the rules. */
  readonly screening?: Screening | null | undefined;
  /** Share that the limits of the first part are to hold; default 0.95. */
  readonly share?: number | undefined;
  /** Rules to count out; those of other components are passed over. */
  readonly tolerances?: readonly Tolerance[] | undefined;
  /** To be judged beside the own model, as a rule like any other. */
  readonly specSheet?: SpecSheet | null | undefined;
  /** The ground with the suspects of crowded days taken as good: of both rules the shorter one is judged. */
  readonly crowdedDaysKept?: RuleGround | null | undefined;
  readonly baseSigmaMm?: number | undefined;
  readonly basePpm?: number | undefined;
  readonly height?: HeightAllowance | undefined;
  readonly formDoubt?: FormDoubt | null | undefined;
}
