import type { DailyFactor, DayVerdict, DegradedEvent, HourClass, HourHarmonics } from '../days/index.js';
import type { Component, EstimateWithLimits } from '../fit/index.js';
import type { Rule } from '../rule/index.js';

/** How the ppm differs from day to day. */
export interface DayModelResult {
  readonly component: Component;
  /** Of which half of the days are worse. */
  readonly medianDayPpm: EstimateWithLimits;
  /** Root-mean-square over days to come. */
  readonly longRunPpm: EstimateWithLimits;
  /** Spread of the log of the daily factors. */
  readonly spread: EstimateWithLimits;
  /** What a shot is worth against an independent one. */
  readonly effectiveShare: number;
  /** Degraded days in a row. */
  readonly events: readonly DegradedEvent[];
  readonly lagOneCorrelation: number | null;
  readonly clusteredBy: 'day' | 'week';
}

/** A day's ppm over that of the median day. */
export interface DailyFactorResult extends DailyFactor {
  /** Whether a moderated variance names the day too; null where it cannot be asked. */
  readonly secondOpinion: boolean | null;
}

/** A degraded day and what it is put down to. */
export interface DegradedDayResult {
  readonly component: Component;
  readonly day: string;
  readonly factor: number;
  readonly probabilityDegraded: number;
  readonly occupations: number;
  readonly verdict: DayVerdict;
  readonly subject: string | null;
  readonly text: string;
}

/** Whether the ppm depends on the hour of the day, by solar time. */
export interface TimeOfDayResult {
  readonly component: Component;
  readonly pValue: number | null;
  readonly hours: readonly HourClass[];
  readonly harmonics: HourHarmonics | null;
}

/** What the fit behind the rules of one component would be with all days. */
export interface FitWithAllDays {
  readonly component: Component;
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  readonly occupations: number;
  readonly days: number;
}

/** A rule as it would be with all days. */
export type RuleWithAllDays = Pick<
  Rule,
  'component' | 'limitMm' | 'share' | 'maximumBaselineKm' | 'bestEstimateKm' | 'reason'
>;

/** The days that a study leaves out, and what its results would be with them. */
export interface LeftOutDays {
  /** Those with occupations. */
  readonly days: readonly string[];
  readonly occupations: number;
  /** Of the components that can be fitted with all days. */
  readonly fits: readonly FitWithAllDays[];
  /** One for each rule of the study, in the same order. */
  readonly rules: readonly RuleWithAllDays[];
}
