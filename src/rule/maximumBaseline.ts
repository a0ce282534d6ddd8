import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { type Component, type ErrorModel, type Form, sigmaAtMm, sigmaUpperLimitMm } from '../fit/index.js';
import { componentRows } from './componentRows.js';
import { longestSupportedKm, marksBeyond } from './supportedLength.js';
import { type Tolerance, toleranceFactorAt } from './tolerance.js';

/** How far from the base a tolerance holds, and on what that rests. */
export interface Rule {
  readonly component: Component;
  readonly limitMm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly confidence: number;
  /** `pooled`: over all days together; how many single days meet it is not judged. */
  readonly method: 'pooled';
  /** Lower confidence limit of the maximum baseline, km; 0 or null with a reason. */
  readonly maximumBaselineKm: number | null;
  /** The same from the estimates without their uncertainty, never beyond the supported length. */
  readonly bestEstimateKm: number | null;
  /** Lower limit of the rule over all days together. */
  readonly allDaysKm: number | null;
  readonly longestSupportedKm: number | null;
  /** Why the maximum baseline is 0, null, or cut at the supported length; null otherwise. */
  readonly reason: string | null;
  /** Where and when the rule was found, and nothing beyond. */
  readonly conditions: RuleConditions;
}

export interface RuleConditions {
  readonly occupations: number;
  readonly days: number;
  readonly from: string;
  readonly to: string;
  readonly marks: readonly string[];
  readonly bases: readonly string[];
}

/** Below these numbers a rule would promise what the data do not hold. */
const FEWEST_DAYS = 15;
const LEAST_INFORMATION = 15;
/** An RMS says little of rarer errors: beyond this share a Gaussian factor is too small on days that differ. */
const LARGEST_SHARE = 0.95;
const STEP_KM = 0.1;

/**
 * The largest length at which the one-sided upper limit of the spread still holds the tolerance, scanned outward in
 * steps of 0.1 km and stopped at the first length that fails, never beyond the supported length.
 * @param errors the errors to which the model was fitted, with `day`, `mark`, `base` and `baselineKm`
 * @throws InputError when a column is missing
 */
export function maximumBaseline(errors: ErrorsInput, model: ErrorModel, tolerance: Tolerance): Rule {
  const supportedKm = longestSupportedKm(errors, tolerance.component);
  const common = {
    ...tolerance,
    method: 'pooled',
    longestSupportedKm: supportedKm,
    conditions: conditionsOf(errors, tolerance.component),
  } as const;
  const reason = whyNoRule(model, tolerance, supportedKm);
  if (reason !== null || supportedKm === null) {
    return { ...common, maximumBaselineKm: null, bestEstimateKm: null, allDaysKm: null, reason };
  }
  const allowedMm = (km: number): number => tolerance.limitMm / toleranceFactorAt(model, tolerance.share, km);
  const bestEstimateKm = bestEstimate(model, allowedMm, supportedKm);
  const holds = (km: number): boolean => sigmaUpperLimitMm(model, km, tolerance.confidence)! <= allowedMm(km);
  let steps = 0;
  while ((steps + 1) * STEP_KM <= supportedKm && holds((steps + 1) * STEP_KM)) steps += 1;
  const reached = steps / 10;
  const capped = (steps + 1) * STEP_KM > supportedKm && holds(supportedKm);
  const maximumBaselineKm = capped ? supportedKm : reached;
  return {
    ...common,
    maximumBaselineKm,
    bestEstimateKm,
    allDaysKm: maximumBaselineKm,
    reason: capped
      ? cappedReason(errors, tolerance.component, supportedKm)
      : maximumBaselineKm === 0
        ? zeroReason(model, tolerance, allowedMm(0))
        : null,
  };
}

/** The rule of a tolerance whose component could not be fitted. */
export function noRule(errors: ErrorsInput, tolerance: Tolerance, reason: string): Rule {
  return {
    ...tolerance,
    method: 'pooled',
    maximumBaselineKm: null,
    bestEstimateKm: null,
    allDaysKm: null,
    longestSupportedKm: null,
    reason,
    conditions: conditionsOf(errors, tolerance.component),
  };
}

/**
 * Length at which σ of a form reaches the allowed one; null when the constant alone exceeds it, Infinity without growth.
 * @param p,q displayed parameters: a² and b² for root-sum-square, a and b for linear-sum
 */
export function lengthWithin(
  p: number,
  q: number,
  allowedMm: number,
  form: Form = 'root-sum-square',
): number | null {
  const squared = form === 'root-sum-square';
  const room = (squared ? allowedMm ** 2 : allowedMm) - p;
  if (room <= 0) return null;
  if (q === 0) return Number.POSITIVE_INFINITY;
  return squared ? Math.sqrt(room / q) : room / q;
}

/**
 * The length at which the fitted σ reaches what is allowed there. The latter depends on the length only as the ratio of
 * the axes does, so that a few repetitions settle it.
 */
function bestEstimate(
  { fitted }: ErrorModel,
  allowedMm: (km: number) => number,
  supportedKm: number,
): number {
  const within = (km: number): number => {
    const length = lengthWithin(fitted.displayP, fitted.displayQ, allowedMm(km), fitted.form);
    return length === null ? 0 : Math.min(length, supportedKm);
  };
  let km = within(supportedKm);
  for (let k = 0; k < 100; k++) {
    const next = within(km);
    if (Math.abs(next - km) < 1e-9) return next;
    km = (km + next) / 2;
  }
  return km;
}

function whyNoRule(model: ErrorModel, { share }: Tolerance, supportedKm: number | null): string | null {
  if (model.days < FEWEST_DAYS) {
    return `${model.days} ${model.days === 1 ? 'day is' : 'days are'} too few: a rule needs ${FEWEST_DAYS} days`;
  }
  if (!model.fitted.converged) return 'the fit did not converge';
  if (model.uncertainty === null) return 'the distances are too alike to separate mm and ppm';
  if (share > LARGEST_SHARE) {
    return `a share of ${percent(share)} cannot be derived from an RMS: errors of bad days are rarer and larger than a Gaussian factor allows for`;
  }
  if (supportedKm === null) return 'no length has 20 occupations on 5 days and 2 marks at or beyond it';
  if (model.informationNumber < LEAST_INFORMATION) {
    return `the shots say too little of distance (information number ${model.informationNumber.toFixed(0)}, a rule needs ${LEAST_INFORMATION}): add days with far shots`;
  }
  return null;
}

const percent = (share: number): string => `${Number((100 * share).toFixed(1))} %`;

/** The tolerance holds as far as the data support a rule; what would carry it farther. */
function cappedReason(errors: ErrorsInput, component: Component, km: number): string {
  const stop = (Math.floor(km * 10) / 10).toFixed(1);
  const beyond = marksBeyond(errors, component, km);
  if (beyond.length === 0) {
    return `at least ${stop} km: the tolerance holds as far as the data reach, and nothing is known beyond`;
  }
  const names = beyond.map(({ mark, baselineKm }) => `"${mark}" at ${baselineKm.toFixed(1)} km`).join(', ');
  const few =
    beyond.length === 1
      ? `only one mark lies beyond (${names}), and one mark cannot be told from its own error`
      : `too few shots lie beyond (${names})`;
  return `it stops at ${stop} km because ${few}: a rule needs 2 marks with 20 occupations on 5 days at or beyond its length`;
}

function zeroReason(model: ErrorModel, { share, limitMm }: Tolerance, allowedMm: number): string {
  const needed = `${percent(share)} within ${limitMm} mm needs a ${model.basis} of ${allowedMm.toFixed(1)} mm`;
  const constant = sigmaAtMm(model, 0);
  return constant > allowedMm
    ? `the constant alone exceeds the tolerance: ${needed}, the constant is ${constant.toFixed(1)} mm`
    : `the upper limit of the constant exceeds the tolerance: ${needed}; more days narrow the limit`;
}

function conditionsOf(errors: ErrorsInput, component: Component): RuleConditions {
  const columns = errorColumns(errors);
  const rows = componentRows(columns, component);
  const distinct = (name: string): string[] => {
    const texts = columns.texts(name, 'the conditions of a rule');
    return [...new Set(rows.map((i) => texts[i]!))].sort();
  };
  const days = distinct('day');
  return {
    occupations: rows.length,
    days: days.length,
    from: days[0] ?? '',
    to: days.at(-1) ?? '',
    marks: distinct('mark'),
    bases: distinct('base'),
  };
}
