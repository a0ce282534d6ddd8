import type { Component } from '../fit/index.js';
import type {
  BackTest,
  BackTestScore,
  ForwardTest,
  JobPlan,
  LeftOutGroup,
  Rule,
  SecondVisit,
  SecondVisits,
  WatchStart,
} from '../rule/index.js';

/** The rule of a part of the shots. */
export interface PartRule
  extends Pick<Rule, 'component' | 'limitMm' | 'share' | 'maximumBaselineKm' | 'bestEstimateKm' | 'reason'> {}

/** The rule of one third of the working hours, solar time. */
export interface HourRule extends PartRule {
  readonly hours: string;
}

/** The rule of one month. */
export interface SeasonRule extends PartRule {
  readonly month: string;
}

/** How limits and rules held on days that they had not seen; the score itself is that of the own model. */
export interface BackTestResult extends Omit<BackTest, 'own' | 'notes'>, BackTestScore {
  readonly forward: ForwardTest;
  readonly groups: readonly (LeftOutGroup & { readonly by: 'crew' | 'rover' | 'base' })[];
}

/** What new days can be watched by, or why they cannot. */
export type WatchResult = WatchStart & { readonly component: Component };

/** The points of a file under one tolerance. */
export interface JobResult extends JobPlan {
  readonly file: string;
}

/** What a second visit on the same day gains, with how far both may lie apart before something is wrong. */
export interface SecondVisitsResult extends Omit<SecondVisits, 'visits'> {
  /** Share of good pairs beyond the limit of their difference. */
  readonly alarmShare: number;
  /** `differenceLimitMm` is null where the data allow no limit. */
  readonly visits: readonly (SecondVisit & { readonly differenceLimitMm: number | null })[];
}
