import type { ErrorsInput } from '../errors/index.js';
import type { ErrorModel } from '../fit/index.js';
import type { RuleOptions } from './ground.js';
import { ruleFinder } from './maximumBaseline.js';
import type { Rule } from './rule.js';

/** Which tolerances a table of rules has. */
export interface RuleTableOptions extends RuleOptions {
  /** Default 10, 15, 20, 25, 30, 40, 50, 75 and 100 mm. */
  readonly limitsMm?: readonly number[] | undefined;
  /** Default 68, 95 and 99 %. */
  readonly shares?: readonly number[] | undefined;
  /** Default 0.9. */
  readonly dayShare?: number | undefined;
  /** Default 0.95. */
  readonly confidence?: number | undefined;
}

/** One cell of the table. */
export type RuleTableRow = Pick<
  Rule,
  | 'component'
  | 'limitMm'
  | 'share'
  | 'dayShare'
  | 'confidence'
  | 'method'
  | 'maximumBaselineKm'
  | 'bestEstimateKm'
  | 'allDaysKm'
  | 'reason'
>;

const LIMITS_MM = [10, 15, 20, 25, 30, 40, 50, 75, 100];
const SHARES = [0.68, 0.95, 0.99];

/**
 * Maximum baselines for many limits and shares, one row for each.
 * @throws InputError as maximumBaseline
 */
export function ruleTable(
  errors: ErrorsInput,
  model: ErrorModel,
  {
    limitsMm = LIMITS_MM,
    shares = SHARES,
    dayShare = 0.9,
    confidence = 0.95,
    ...options
  }: RuleTableOptions = {},
): RuleTableRow[] {
  const find = ruleFinder(errors, model, options);
  return limitsMm.flatMap((limitMm) =>
    shares.map((share): RuleTableRow => {
      const rule = find({ component: model.component, limitMm, share, dayShare, confidence });
      const { method, maximumBaselineKm, bestEstimateKm, allDaysKm, reason } = rule;
      return {
        component: model.component,
        limitMm,
        share,
        dayShare,
        confidence,
        method,
        maximumBaselineKm,
        bestEstimateKm,
        allDaysKm,
        reason,
      };
    }),
  );
}
