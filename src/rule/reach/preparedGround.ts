import { type Component, type ErrorModel, sigmaAtMm, sigmaUpperLimitMm } from '../../fit/index.js';
import { addedVariance, type HeightAllowance, type RuleGround, type RuleOptions } from '../ground.js';
import { type Tolerance, toleranceFactor, toleranceFactorAt } from '../tolerance.js';
import { type AllDays, allDays } from './allDays.js';
import { type DayLimits, type DayNodes, dayLimits, dayNodes } from './dayLimits.js';
import { demandedShare, type WrongFixShares, wrongFixShares } from './demandedShare.js';
import { type LimitLeft, limitLeft } from './limitLeft.js';
import { monotone } from './scan.js';

/** Whether a tolerance holds at a length, in three senses. */
export interface Reach {
  readonly method: 'day-model' | 'pooled';
  /** With the tolerance's confidence. */
  readonly holds: (km: number) => boolean;
  /** By the best estimate. */
  readonly likelyHolds: (km: number) => boolean;
  /** Over all days together, with the tolerance's confidence. */
  readonly holdsOverAllDays: (km: number) => boolean;
  /** Probability that it holds on the share of days; null for the pooled rule. */
  readonly confidence: ((km: number) => number) | null;
  /** σ² that the tolerance leaves at a length for constant and ppm, mm²; -1 where wrong fixes alone defeat the share. */
  readonly allowedVariance: (km: number) => number;
}

/** A ground with what all tolerances share, computed once. */
export interface PreparedGround {
  readonly model: ErrorModel;
  readonly ground: RuleGround;
  readonly shares: WrongFixShares;
  readonly added: number;
  /** What comes off the limit at a length. */
  readonly left: LimitLeft;
  /** The site that the rule is for, where it is stated. */
  readonly height: HeightAllowance | null;
  readonly days: DayNodes | null;
  /** Limits of a share of days, remembered. */
  readonly limits: (dayShare: number) => DayLimits;
  readonly allDays: AllDays | null;
}

/** Beyond this share of positions an RMS, of a day or of all days, says too little of the rare large errors. */
export const LARGEST_RMS_SHARE = 0.95;

export function prepareGround(
  ground: RuleGround,
  options: Pick<RuleOptions, 'baseSigmaMm' | 'basePpm' | 'formDoubt' | 'height'>,
): PreparedGround {
  const { model, dayModel, wrongFixes } = ground;
  const posterior = model.form === 'root-sum-square' ? (dayModel?.posterior ?? null) : null;
  const days = posterior && dayNodes(posterior);
  const added = addedVariance(model.component, options);
  const left = limitLeft(options);
  const height = options.height ?? null;
  const shares = wrongFixShares(wrongFixes ?? null);
  return preparedDays({ model, ground, shares, added, left, height }, days);
}

/** The same ground with other nodes of the days. */
export function preparedDays(
  {
    model,
    ground,
    shares,
    added,
    left,
    height,
  }: Pick<PreparedGround, 'model' | 'ground' | 'shares' | 'added' | 'left' | 'height'>,
  days: DayNodes | null,
): PreparedGround {
  const remembered = new Map<number, DayLimits>();
  return {
    model,
    ground,
    shares,
    added,
    left,
    height,
    days,
    limits: (dayShare) => {
      let limits = remembered.get(dayShare);
      if (limits === undefined) {
        limits = dayLimits(days!, dayShare);
        remembered.set(dayShare, limits);
      }
      return limits;
    },
    allDays: days && allDays(model.component, days, added),
  };
}

/** How far a tolerance reaches on a ground. */
export function reachOf(prepared: PreparedGround, tolerance: Tolerance): Reach {
  const { shares } = prepared;
  const allowed = (km: number): number => allowedVariance(prepared, tolerance, km, shares.reckoned(km));
  const likelyAllowed = (km: number): number => allowedVariance(prepared, tolerance, km, shares.mean(km));
  return prepared.days === null
    ? pooledReach(prepared, tolerance, allowed, likelyAllowed)
    : dayModelReach(prepared, tolerance, allowed, likelyAllowed);
}

function allowedVariance(
  { model, added, left }: PreparedGround,
  { share, limitMm }: Tolerance,
  km: number,
  wrongFixShare: number,
): number {
  const demanded = demandedShare(share, wrongFixShare);
  if (demanded >= 1) return -1;
  return Math.max(0, (left.leftMm(limitMm, km) / toleranceFactorAt(model, demanded, km)) ** 2 - added);
}

type Allowed = (km: number) => number;

function pooledReach(
  { model }: PreparedGround,
  { confidence }: Tolerance,
  allowed: Allowed,
  likelyAllowed: Allowed,
): Reach {
  const holds = (km: number): boolean => sigmaUpperLimitMm(model, km, confidence)! ** 2 <= allowed(km);
  return {
    method: 'pooled',
    holds,
    likelyHolds: (km) => sigmaAtMm(model, km) ** 2 <= likelyAllowed(km),
    holdsOverAllDays: holds,
    confidence: null,
    allowedVariance: allowed,
  };
}

function dayModelReach(
  { model, shares, limits, left, allDays: all }: PreparedGround,
  { share, dayShare, confidence, limitMm }: Tolerance,
  allowed: Allowed,
  likelyAllowed: Allowed,
): Reach {
  const days = limits(dayShare);
  const overAllDays = (km: number, wrongFixShare: number): number => {
    const demanded = demandedShare(share, wrongFixShare);
    if (demanded >= 1) return 0;
    return all!.confidence(km, equalAxesLimit(model, left.leftMm(limitMm, km), demanded, km), demanded);
  };
  const holdsOverAllDays = monotone((km) => overAllDays(km, shares.reckoned(km)) >= confidence);
  const likelyOverAllDays = monotone((km) => overAllDays(km, shares.mean(km)) >= 0.5);
  const rare = share > LARGEST_RMS_SHARE;
  return {
    method: 'day-model',
    // A day's own errors have longer tails than a normal law of its RMS: a rare error needs the mixture as well.
    holds: (km) => days.confidence(km, allowed(km)) >= confidence && (!rare || holdsOverAllDays(km)),
    likelyHolds: (km) => days.confidence(km, likelyAllowed(km)) >= 0.5 && (!rare || likelyOverAllDays(km)),
    holdsOverAllDays,
    confidence: (km) => days.confidence(km, allowed(km)),
    allowedVariance: allowed,
  };
}

/** The limit on equal axes that is as hard to hold as one on the axes of the model. */
export function equalAxesLimit(model: ErrorModel, limitMm: number, share: number, km: number): number {
  const component: Component = model.component;
  return (limitMm * toleranceFactor(component, share)) / toleranceFactorAt(model, share, km);
}
