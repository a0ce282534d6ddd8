import type { ErrorsInput } from '../errors/index.js';
import type { ErrorModel, Form } from '../fit/index.js';
import { conditionsOf, type Surroundings } from './conditions.js';
import { dayBound } from './dayBound.js';
import type { RuleOptions } from './ground.js';
import { type PreparedGround, prepareGround, reachOf } from './reach/preparedGround.js';
import { reach, reachByHalves, reachExactly } from './reach/scan.js';
import { whyItEnds, whyNoRule } from './reasons.js';
import { remarksOf } from './remarks.js';
import type { Rule } from './rule.js';
import { longestSupportedKm } from './supportedLength.js';
import { checkTolerance, type Tolerance } from './tolerance.js';

/**
 * The largest length at which, with the stated confidence, on at least a share of days at least a share of that day's
 * positions lie within the limit. Lower limit from the posterior of the day model and of the constant; wrong fixes count
 * as failures with the 80 % quantile of their share at the length; scanned outward in steps of 0.1 km and stopped at the
 * first length that fails, never beyond the supported length. Without a day model: the one-sided upper limit of the
 * spread over all days together.
 * @param errors the errors to which the model was fitted, with `day`, `mark`, `base` and `baselineKm`, and what its
 *   conditions can be told from: `azimuthDeg`, `epochs`, `solarHour`, `support`, `tiltDeg`, `sky`
 * @throws InputError when a column is missing, the tolerance is impossible, or the model is of another component
 */
export function maximumBaseline(
  errors: ErrorsInput,
  model: ErrorModel,
  tolerance: Tolerance,
  options: RuleOptions = {},
): Rule {
  return ruleFinder(errors, model, options)(tolerance);
}

/** The same for many tolerances of one component: what they share is computed once. */
export function ruleFinder(
  errors: ErrorsInput,
  model: ErrorModel,
  options: RuleOptions = {},
): (tolerance: Tolerance) => Rule {
  const { dayModel, wrongFixes, crowdedDaysKept: kept } = options;
  const supportedKm = longestSupportedKm(errors, model.component);
  const conditions = conditionsOf(errors, model.component, options, options.height?.differenceM ?? null);
  const grounds = [{ model, dayModel, wrongFixes }, ...(kept ? [kept] : [])].map((ground) =>
    prepareGround(ground, options),
  );
  return (tolerance) => {
    checkTolerance(tolerance, model.component);
    const [first, other] = grounds.map((prepared) => judge(errors, prepared, tolerance, supportedKm));
    const crowded = other !== undefined && (other.maximumBaselineKm ?? -1) < (first!.maximumBaselineKm ?? -1);
    const found = crowded ? other : first!;
    return {
      component: tolerance.component,
      limitMm: tolerance.limitMm,
      share: tolerance.share,
      dayShare: tolerance.dayShare,
      confidence: tolerance.confidence,
      ...found,
      longestSupportedKm: supportedKm,
      remarks: remarksOf(found, tolerance, options, crowded),
      conditions,
    };
  };
}

/** The part of a rule that a ground decides. */
export type Judged = Pick<
  Rule,
  'method' | 'maximumBaselineKm' | 'bestEstimateKm' | 'allDaysKm' | 'wrongFixShare' | 'dayBound' | 'reason'
>;

function judge(
  errors: ErrorsInput,
  prepared: PreparedGround,
  tolerance: Tolerance,
  supportedKm: number | null,
): Judged {
  const method = prepared.days === null ? 'pooled' : 'day-model';
  const reason = whyNoRule(errors, prepared, tolerance, supportedKm);
  if (reason !== null || supportedKm === null) {
    return {
      method,
      maximumBaselineKm: null,
      bestEstimateKm: null,
      allDaysKm: null,
      wrongFixShare: null,
      dayBound: null,
      reason,
    };
  }
  const found = reachOf(prepared, tolerance);
  const limit = reach(found.holds, supportedKm);
  const { dayModel, wrongFixes } = prepared.ground;
  const { posterior } = dayModel ?? { posterior: null };
  return {
    method,
    maximumBaselineKm: limit.km,
    bestEstimateKm: reachExactly(found.likelyHolds, supportedKm),
    allDaysKm: method === 'pooled' ? limit.km : reachByHalves(found.holdsOverAllDays, supportedKm).km,
    wrongFixShare: wrongFixes ? prepared.shares.reckoned(Math.max(limit.km, 0.1)) : null,
    dayBound:
      prepared.days === null || !posterior
        ? null
        : dayBound(posterior, tolerance.dayShare, tolerance.confidence, (slope) =>
            reachExactly((km) => posterior.A + slope * km * km <= found.allowedVariance(km), supportedKm),
          ),
    reason: whyItEnds(errors, prepared, tolerance, found, limit),
  };
}

/** The rule of a tolerance whose component could not be fitted. */
export function noRule(
  errors: ErrorsInput,
  tolerance: Tolerance,
  reason: string,
  surroundings: Surroundings = {},
): Rule {
  return {
    ...tolerance,
    method: 'pooled',
    maximumBaselineKm: null,
    bestEstimateKm: null,
    allDaysKm: null,
    longestSupportedKm: null,
    wrongFixShare: null,
    dayBound: null,
    reason,
    remarks: [],
    conditions: conditionsOf(errors, tolerance.component, surroundings),
  };
}

/**
 * Length at which σ of a form reaches the allowed one; null when the constant alone exceeds it, Infinity without growth.
 * @param p displayed parameter: a² for root-sum-square, a for linear-sum
 * @param q displayed parameter: b² for root-sum-square, b for linear-sum
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
