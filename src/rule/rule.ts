import type { Component } from '../fit/index.js';
import type { DayBound } from './dayBound.js';

/** How far from the base a tolerance holds, and on what that rests. */
export interface Rule {
  readonly component: Component;
  readonly limitMm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly confidence: number;
  /**
   * `day-model`: on the share of days. `pooled`: over all days together; how many single days meet it is not judged.
   */
  readonly method: 'day-model' | 'pooled';
  /** Lower confidence limit of the maximum baseline, km; 0 or null with a reason. */
  readonly maximumBaselineKm: number | null;
  /** The posterior median of the same (`pooled`: from the estimates alone), never beyond the supported length. */
  readonly bestEstimateKm: number | null;
  /** Lower limit of the rule over all days together. */
  readonly allDaysKm: number | null;
  readonly longestSupportedKm: number | null;
  /** Share of wrong fixes that was reckoned with at the maximum baseline; null where none was searched for. */
  readonly wrongFixShare: number | null;
  /** What the days say by their order alone, without a model of how they differ; null without a rule. */
  readonly dayBound: DayBound | null;
  /** Why the maximum baseline is 0, null, or cut before the tolerance ends; null otherwise. */
  readonly reason: string | null;
  /** What must be known beside the numbers, in sentences. */
  readonly remarks: readonly string[];
  /** Where and when the rule was found, and nothing beyond. */
  readonly conditions: RuleConditions;
}

/** The smallest and the largest value seen. */
export interface SeenRange {
  readonly from: number;
  readonly to: number;
}

/** Where, when and how the errors behind a rule were measured; null or an empty list is what the logs do not tell. */
export interface RuleConditions {
  readonly occupations: number;
  readonly days: number;
  /** First and last day. */
  readonly from: string;
  readonly to: string;
  readonly marks: readonly string[];
  readonly bases: readonly string[];
  /** Fixed positions averaged to an occupation. */
  readonly epochs: SeenRange | null;
  /** Local mean solar time of the shots. */
  readonly solarHours: SeenRange | null;
  /** What held the rod, in the words of the logs. */
  readonly supports: readonly string[];
  readonly tiltDeg: SeenRange | null;
  readonly skies: readonly string[];
  /** Share of visits that got a fix: the rule speaks of those alone. */
  readonly visitsWithFix: number | null;
  /** Solar radio flux of the days, solar flux units. */
  readonly f107: SeenRange | null;
  /** Stated standard deviation of the base's coordinates that the rule contains, mm per axis. */
  readonly baseSigmaMm: number | null;
  /** What an assumed base coordinate adds to every baseline, which the rule takes off its limit, ppm. */
  readonly basePpm: number | null;
  /** Height difference between base and site that the rule contains, m. */
  readonly heightDifferenceM: number | null;
  /** The rule is to be looked at again by this day, a year after its last one. */
  readonly reviewBy: string | null;
}
