import type { Component } from '../fit/index.js';
import type { DayModel } from './dayModel.js';

/** How a day's ppm compares with that of the median day. */
export interface DailyFactor {
  readonly component: Component;
  readonly day: string;
  /** Shrunken factor with its 95 % limits. */
  readonly factor: number;
  readonly low: number;
  readonly high: number;
  /** Probability that the factor is 1.5 or more. */
  readonly probabilityDegraded: number;
  /** Null where degraded days cannot be named. */
  readonly degraded: boolean | null;
  readonly occupations: number;
}

/** One row for each day, in order; none where the days cannot be judged. */
export function dailyFactors({ component, dayEstimates, degradedDays }: DayModel): DailyFactor[] {
  const degraded = degradedDays === null ? null : new Set(degradedDays);
  return dayEstimates.map(({ day, occupations, factor, probabilityDegraded }) => ({
    component,
    day,
    factor: factor.estimate,
    low: factor.low,
    high: factor.high,
    probabilityDegraded,
    degraded: degraded?.has(day) ?? null,
    occupations,
  }));
}
