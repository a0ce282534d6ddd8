import type { ErrorsInput } from '../errors/index.js';
import { type Component, type ErrorModel, sigmaAtMm, sigmaUpperLimitMm } from '../fit/index.js';
import type { RuleOptions } from './ground.js';
import { demandedShare } from './reach/demandedShare.js';
import {
  equalAxesLimit,
  LARGEST_RMS_SHARE,
  type PreparedGround,
  prepareGround,
} from './reach/preparedGround.js';
import { percent, whyNoRule } from './reasons.js';
import { longestSupportedKm } from './supportedLength.js';
import { checkTolerance, type Tolerance, toleranceFactorAt } from './tolerance.js';

/** What may be promised at a length: the question of a rule turned round. */
export interface PositionPromise {
  readonly component: Component;
  readonly baselineKm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly confidence: number;
  readonly method: 'day-model' | 'pooled';
  /** Upper confidence limit of what holds the share on the share of days, mm; null with a reason. */
  readonly limitMm: number | null;
  readonly bestEstimateMm: number | null;
  readonly reason: string | null;
}

/** How often and how surely a promise is to hold; defaults 95 % of positions on 90 % of days, 95 % confidence. */
export interface PromiseDemand {
  readonly share?: number | undefined;
  readonly dayShare?: number | undefined;
  readonly confidence?: number | undefined;
}

/**
 * The smallest limit that can be promised at a length from the base.
 * @throws InputError when a column is missing or the demand is impossible
 */
export function promiseAtKm(
  errors: ErrorsInput,
  model: ErrorModel,
  baselineKm: number,
  options: RuleOptions & PromiseDemand = {},
): PositionPromise {
  return promiser(errors, model, options)(baselineKm);
}

/** The same for many lengths: what they share is computed once. */
export function promiser(
  errors: ErrorsInput,
  model: ErrorModel,
  { share = 0.95, dayShare = 0.9, confidence = 0.95, ...options }: RuleOptions & PromiseDemand = {},
): (baselineKm: number) => PositionPromise {
  const { component } = model;
  const demand: Tolerance = { component, limitMm: 1, share, dayShare, confidence };
  checkTolerance(demand, component);
  const supportedKm = longestSupportedKm(errors, component);
  const { dayModel, wrongFixes, crowdedDaysKept: kept } = options;
  const grounds = [{ model, dayModel, wrongFixes }, ...(kept ? [kept] : [])].map((ground) =>
    prepareGround(ground, options),
  );
  const none = grounds
    .map((ground) => whyNoRule(errors, ground, demand, supportedKm))
    .find((why) => why !== null);
  return (baselineKm) => {
    const common = {
      component,
      baselineKm,
      share,
      dayShare,
      confidence,
      method: grounds[0]!.days === null ? 'pooled' : 'day-model',
    } as const;
    const reason = none ?? whyNotAt(grounds, demand, baselineKm, supportedKm);
    if (reason !== null) return { ...common, limitMm: null, bestEstimateMm: null, reason };
    const limits = grounds.map((ground) =>
      limitAt(ground, demand, baselineKm, ground.shares.reckoned(baselineKm)),
    );
    const [first] = grounds as [PreparedGround, ...PreparedGround[]];
    return {
      ...common,
      limitMm: Math.max(...limits),
      bestEstimateMm: limitAt(
        first,
        { ...demand, confidence: 0.5 },
        baselineKm,
        first.shares.mean(baselineKm),
        true,
      ),
      reason: null,
    };
  };
}

function whyNotAt(
  grounds: readonly PreparedGround[],
  { share }: Tolerance,
  km: number,
  supportedKm: number | null,
): string | null {
  if (!(km > 0)) return 'a promise needs a length above 0 km';
  if (supportedKm === null || km > supportedKm) {
    return `nothing can be promised at ${km.toFixed(1)} km: 2 marks with 20 occupations on 5 days support lengths up to ${(Math.floor((supportedKm ?? 0) * 10) / 10).toFixed(1)} km; take shots on marks at or beyond it`;
  }
  if (grounds.every(({ shares }) => demandedShare(share, shares.reckoned(km)) < 1)) return null;
  return `wrong fixes alone defeat the share at ${km.toFixed(1)} km: ${percent(1 - share)} of the positions may fail; ask for a smaller share, or check every point twice`;
}

function limitAt(
  { model, days, limits, allDays, added, left }: PreparedGround,
  { share, dayShare, confidence }: Tolerance,
  km: number,
  wrongFixShare: number,
  plain = false,
): number {
  const demanded = demandedShare(share, wrongFixShare);
  const factor = toleranceFactorAt(model, demanded, km);
  if (days === null || allDays === null) {
    const sigma = plain ? sigmaAtMm(model, km) : sigmaUpperLimitMm(model, km, confidence)!;
    return left.neededMm(factor * Math.hypot(sigma, Math.sqrt(added)), km);
  }
  const ofDays = left.neededMm(factor * Math.sqrt(limits(dayShare).variance(km, confidence) + added), km);
  if (share <= LARGEST_RMS_SHARE) return ofDays;
  const holds = (limitMm: number): boolean =>
    allDays.confidence(km, equalAxesLimit(model, left.leftMm(limitMm, km), demanded, km), demanded) >=
    confidence;
  if (holds(ofDays)) return ofDays;
  let [low, high] = [ofDays, 2 * ofDays];
  while (!holds(high)) [low, high] = [high, 2 * high];
  while (high - low > 1e-6 * high) {
    const middle = (low + high) / 2;
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return high;
}
