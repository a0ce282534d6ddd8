import { dayModel, hourClasses } from '../days/index.js';
import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { type ErrorModel, fitErrorModel } from '../fit/index.js';
import { InputError } from '../logs/index.js';
import type { RuleOptions } from './ground.js';
import { noRule, ruleFinder } from './maximumBaseline.js';
import { recordsOf } from './records.js';
import type { Rule } from './rule.js';
import type { Tolerance } from './tolerance.js';

/** The rule of a part of the data. */
export interface GroupRule {
  /** Such as `8.1 to 11.4 h` or `March`. */
  readonly group: string;
  /** A rule of its own, from the shots of the group alone; null with a reason where they are too few. */
  readonly rule: Rule;
}

export interface GroupRuleOptions extends Omit<RuleOptions, 'dayModel' | 'crowdedDaysKept'> {
  /** Weights in [0, 1] with which the whole model was fitted, one for each error. */
  readonly weights?: Float64Array | undefined;
}

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/**
 * A rule for each third of the working hours, by solar time, fitted to the shots of that third alone. Where a third is
 * too thin for a rule its reason says so, and the rule of all hours is the one to use.
 * @param errors all that were fitted, with `solarHour`
 * @throws InputError when a column is missing
 */
export function ruleByHour(
  errors: ErrorsInput,
  model: ErrorModel,
  tolerances: Tolerance | readonly Tolerance[],
  options: GroupRuleOptions = {},
): GroupRule[] {
  const classes = hourClasses(errorColumns(errors).numbers('solarHour', 'rules by hour'));
  if (classes === null) return [];
  const { edges, classOf } = classes;
  const clock = (hour: number): string => (hour % 24).toFixed(1);
  return [0, 1, 2].flatMap((k) =>
    groupRules(
      errors,
      `${clock(edges[k]!)} to ${clock(edges[k + 1]!)} h`,
      (row) => classOf[row] === k,
      model,
      [tolerances].flat(),
      options,
    ),
  );
}

/**
 * A rule for each calendar month that has shots, from its shots of all years.
 * @param errors all that were fitted, `day` as `YYYY-MM-DD`
 * @throws InputError when a column is missing
 */
export function ruleBySeason(
  errors: ErrorsInput,
  model: ErrorModel,
  tolerances: Tolerance | readonly Tolerance[],
  options: GroupRuleOptions = {},
): GroupRule[] {
  const months = errorColumns(errors)
    .texts('day', 'rules by season')
    .map((day) => (/^\d{4}-\d{2}-\d{2}$/.test(day) ? Number(day.slice(5, 7)) - 1 : -1));
  return MONTHS.flatMap((name, m) =>
    months.includes(m)
      ? groupRules(errors, name, (row) => months[row] === m, model, [tolerances].flat(), options)
      : [],
  );
}

/**
 * What the tolerances of a group share is fitted once. Wrong fixes and the doubt about the form are those of all shots: a
 * third of them tells too little of either.
 */
function groupRules(
  errors: ErrorsInput,
  group: string,
  belongs: (row: number) => boolean,
  { component, form, reference, confidence, screened }: ErrorModel,
  tolerances: readonly Tolerance[],
  { weights, ...options }: GroupRuleOptions,
): GroupRule[] {
  const records = recordsOf(errors);
  const rows = Array.from(records.keys()).filter(belongs);
  const own = rows.map((row) => records[row]!);
  const ownWeights = weights && screened ? Float64Array.from(rows, (row) => weights[row]!) : undefined;
  const used = ownWeights === undefined ? own : own.filter((_, i) => ownWeights[i]! >= 0.5);
  try {
    const fit = fitErrorModel(own, { component, form, reference, confidence, weights: ownWeights });
    const days = form === 'root-sum-square' ? dayModel(own, fit, ownWeights) : null;
    const find = ruleFinder(used, fit, { ...options, dayModel: days });
    return tolerances.map((tolerance) => ({ group, rule: find(tolerance) }));
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    const reason = 'the shots of this group alone cannot be fitted: add days with near and far shots';
    return tolerances.map((tolerance) => ({ group, rule: noRule(used, tolerance, reason, options) }));
  }
}
