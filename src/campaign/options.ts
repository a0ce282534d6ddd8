import type { Geodetic } from '../geodesy/index.js';
import type { MarkGenerator, MarkPlan } from './marks.js';

/** One number for each axis of an error, millimetres or mm per km. */
export interface Axes {
  readonly east: number;
  readonly north: number;
  readonly up: number;
}

/** A range of whole numbers or of real numbers, both ends included. */
export interface Range {
  readonly from: number;
  readonly to: number;
}

/** The base: its name, how the antenna stands, where (WGS 84, ellipsoidal height). */
export interface CampaignBase extends Geodetic {
  readonly name: string;
  /** `pillar` keeps one setup all through; on a `tripod` every day has its own. */
  readonly mounting: 'pillar' | 'tripod';
  /** Setups a day on a tripod, in equal parts of the working hours; a pillar ignores it. */
  readonly setupsPerDay: number;
}

/** A share that changes with distance on a straight line of log share over log distance (see `shareAtKm`). */
export interface ShareByDistance {
  readonly shareAt1Km: number;
  readonly shareAt12Km: number;
}

/** Occupations called fixed with wrong integers: a vector comes on top of the ordinary error. */
export interface WrongFixOptions extends ShareByDistance {
  /** The vector's length is log-uniform between these, its direction random in space, mm. */
  readonly shortestMm: number;
  readonly longestMm: number;
  /** Mean number of consecutive occupations of a rover spoilt by the same wrong integers; 1 = singly. */
  readonly meanBurst: number;
}

/** Runs of consecutive working days, each day worse by a factor of its own, uniform in `factor`. */
export interface BadDayOptions {
  readonly runs: number;
  readonly runLength: number;
  /** Further bad days that stand alone. */
  readonly singles: number;
  readonly factor: Range;
}

/** Mistakes of people, each in one occupation with a fix on a known mark. */
export interface BlunderOptions {
  /** Occupations with a wrong height of the rod, too high or too low by `rodErrorMm`. */
  readonly rodHeights: number;
  readonly rodErrorMm: number;
  /** Occupations logged under the name of another mark. */
  readonly wrongMarks: number;
}

/** A second base that takes the place of the first for some working days, counted from 1, both ends included. */
export interface OtherBase extends CampaignBase {
  readonly fromDay: number;
  readonly toDay: number;
}

/** A firm that only checks in: few shots a day, mostly at near marks. Replaces `occupationsPerDay`. */
export interface HabitualOptions {
  /** Share of the shots at marks no farther than `nearKm`. */
  readonly nearShare: number;
  readonly nearKm: number;
  readonly occupationsPerDay: Range;
}

/** Everything a simulated campaign depends on. Defaults: `CAMPAIGN_DEFAULTS` of `defaults.ts`. */
export interface CampaignSettings {
  /** Whole number; equal settings and equal seeds give equal campaigns. */
  readonly seed: number;
  /** Working days. */
  readonly days: number;
  /** First day, `YYYY-MM-DD`; moved to Monday when it falls on a weekend and only weekdays are worked. */
  readonly startDate: string;
  readonly weekdaysOnly: boolean;
  /** Local time minus UTC, hours; days are local calendar days. */
  readonly utcOffsetHours: number;
  /** Local clock hours between which occupations start. */
  readonly workHours: Range;
  readonly base: CampaignBase;
  /** Null: the one base all through. */
  readonly otherBase: OtherBase | null;
  /** The marks themselves, or how to invent them. */
  readonly marks: readonly MarkPlan[] | MarkGenerator;
  readonly crews: readonly string[];
  /** At least as many as crews; they are dealt out to the crews anew every day. */
  readonly rovers: readonly string[];
  /** Planned occupations of all crews together. */
  readonly occupationsPerDay: Range;
  /** Different marks a crew goes to in a day, one from each of so many distance classes. */
  readonly marksPerCrew: Range;
  /** Rounds a crew makes over its marks of the day. */
  readonly roundsPerDay: number;
  /** Fixed positions of an occupation, one a second. */
  readonly epochsPerOccupation: number;
  /** Scatter of the epochs about their occupation's mean, standard deviation per axis, mm. */
  readonly epochSigmaMm: Axes;
  /** Constant part per axis, standard deviation, mm. */
  readonly constantMm: Axes;
  /** Distance-dependent part per axis on the median ordinary day, standard deviation, mm per km. */
  readonly ppm: Axes;
  /** Standard deviation of the log of the ordinary day factor (log-normal, median 1). */
  readonly dayFactorLogSd: number;
  /** Correlation of the random errors of east and north, −1 to 1. */
  readonly eastNorthCorrelation: number;
  /**
   * Null: normal errors. Else the random error of an occupation is multivariate t with so many degrees of freedom, scaled
   * to the same root-mean-square.
   */
  readonly tailDegrees: number | null;
  /** Whether shots near each other in time share errors; `false` makes shots of a day independent. */
  readonly dependent: boolean;
  /** Float rows before the first fixed one, as a share of the rows of visits that got a fix. */
  readonly floatRowShare: number;
  /** Share of visits that never get a fix. */
  readonly noFix: ShareByDistance;
  /** Share of visits logged under a mistyped mark name. */
  readonly unknownMarkShare: number;
  /** Share of fixed rows on known marks that stand in the log twice. */
  readonly duplicateRowShare: number;
  /** Null: none. */
  readonly wrongFixes: WrongFixOptions | null;
  /** Null: none. */
  readonly blunders: BlunderOptions | null;
  /** Error of the marks' published coordinates, standard deviation per axis, mm; one draw a mark. */
  readonly markSigmaMm: Axes;
  /** What the list of marks states about that, standard deviation per axis, mm. */
  readonly statedMarkSigmaMm: { readonly horizontal: number; readonly vertical: number };
  /** Offset common to all positions of a base setup, standard deviation per axis, mm. */
  readonly setupSigmaMm: Axes;
  /** Daily course of the ppm: factor exp(rise (2 cos(2π(t − 14)/24) − 1)), t in solar hours; 0 = none. */
  readonly middayRise: number;
  /** Null: none. */
  readonly badDays: BadDayOptions | null;
  /** Null: a planned campaign. */
  readonly habitual: HabitualOptions | null;
}

type Inner<T> = T extends readonly unknown[] ? T : T extends object ? Partial<T> : T;

/**
 * Settings as a caller gives them: all optional, and of a nested object the given keys only. `{}` for
 * `wrongFixes`, `blunders`, `badDays` or `habitual` switches them on with the values of `SWITCHED_ON_DEFAULTS`.
 */
export type CampaignOptions = { readonly [K in keyof CampaignSettings]?: Inner<CampaignSettings[K]> };
