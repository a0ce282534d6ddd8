import type { Geodetic } from '../../geodesy/index.js';
import type { PositionPromise } from '../promise.js';
import type { Rule } from '../rule.js';

/** A point of a job, or a base; a height that is not known is NaN. */
export interface JobPlace {
  readonly name: string;
  readonly position: Geodetic;
}

/** A rule with what may be promised at a length, as `promiser` gives it. */
export interface RuleFromBase {
  readonly rule: Rule;
  readonly promise: (baselineKm: number) => PositionPromise;
}

/** A place as results hold it; null where the height is not known. */
export interface PlannedPlace {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number | null;
}

/** A base with how far the rule reaches from it. */
export interface JobBase extends PlannedPlace {
  readonly base: string;
  readonly maximumBaselineKm: number | null;
  /** Why that is null or 0, or ends where it does; null otherwise. */
  readonly reason: string | null;
  /** The rule was found from this base. */
  readonly baseOfRule: boolean;
}

/** A point from one base. */
export interface JobReach {
  readonly point: string;
  readonly base: string;
  readonly baselineKm: number;
  /** Point minus base, m; null where the height is not known. */
  readonly heightDifferenceM: number | null;
  /** The rule reaches it; null where there is no rule. */
  readonly holds: boolean | null;
  /** What can be promised there, mm; null with a reason. */
  readonly promisedMm: number | null;
  readonly reason: string | null;
}

/** A point with the base from which most can be promised. */
export interface JobPoint extends PlannedPlace {
  readonly point: string;
  readonly bestBase: string;
  readonly baselineKm: number;
  readonly promisedMm: number | null;
  readonly reason: string | null;
  /** Bases from which the rule reaches it, the nearest first. */
  readonly reachedFrom: readonly string[];
  /** Whether no base reaches it; null without a rule, which says nothing of any base. */
  readonly needsAnotherBase: boolean | null;
}

export interface JobPlan
  extends Pick<
    Rule,
    'component' | 'limitMm' | 'share' | 'dayShare' | 'confidence' | 'maximumBaselineKm' | 'reason'
  > {
  readonly bases: readonly JobBase[];
  readonly points: readonly JobPoint[];
  /** Every point from every base, in the order of points and lengths. */
  readonly reaches: readonly JobReach[];
  readonly sentence: string;
}
