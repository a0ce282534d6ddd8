import type { DailyFactor, DayVerdict, DegradedEvent, HourClass, HourHarmonics } from '../days/index.js';
import type { CommonCauses, StaticShots } from '../errors/index.js';
import type { Component, EstimateWithLimits, Form, Reference, SetupOffsets } from '../fit/index.js';
import type { LogResolution, Message, OccupationReason, ReasonCount, RowReason } from '../logs/index.js';
import type { Rule, SpecSheet } from '../rule/index.js';
import type { Interval, MarkMean } from '../split/index.js';
import type { ControlMark } from './controlMarks.js';

/** One fitted model, as `results.json` states it. */
export interface FitResult {
  readonly component: Component;
  readonly reference: Reference;
  /** Whether the constant was put together from repeatability and the marks' own errors. */
  readonly composed: boolean;
  readonly form: Form;
  readonly screened: boolean;
  /** The rules of this component rest on this fit; true for exactly one fit of each component. */
  readonly basisOfRule: boolean;
  readonly basis: 'radial RMS' | 'vertical RMS';
  readonly confidence: number;
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  /** The interval of the ppm if every shot were independent: too narrow. */
  readonly ppmIfIndependent: EstimateWithLimits;
  /** Name of the method behind the intervals. */
  readonly interval: string;
  /** Ppm of the median day, of which half of the days are worse; null where days cannot be judged. */
  readonly medianDayPpm: EstimateWithLimits | null;
  /** Share of wrong fixes among the occupations; null in a fit that is not screened. */
  readonly wrongFixShare: WrongFixShareResult | null;
  /** Signed growth of the marks' mean errors with distance, in a composed fit: no part of the ppm. */
  readonly signedPpm: SignedPpm | null;
  /** Σ w B² (l - l̄)²/μ²: about the number of shots that speak of distance. */
  readonly informationNumber: number;
  readonly occupations: number;
  readonly days: number;
  readonly marks: number | null;
  readonly shortestKm: number;
  readonly longestKm: number;
  /** The day whose absence changes the ppm most; null when no day can be left out. */
  readonly mostInfluentialDay: { readonly day: string; readonly ppmWithout: number } | null;
  readonly notes: readonly string[];
}

/** How many occupations are wrong fixes, in all and by distance. */
export interface WrongFixShareResult {
  /** Runs of suspected occupations that follow one another. */
  readonly events: number;
  readonly estimate: number;
  readonly low: number;
  readonly high: number;
  readonly atKm: readonly { readonly baselineKm: number; readonly estimate: number; readonly high: number }[];
}

/** A systematic, signed ppm of the marks' mean errors. */
export interface SignedPpm {
  readonly ppm: number;
  readonly low: number;
  readonly high: number;
  readonly pValue: number;
  readonly degreesOfFreedom: number;
  readonly significant: boolean;
}

/** Which form predicts unseen days better. */
export interface ComparisonResult {
  readonly component: Component;
  readonly against: 'linear-sum';
  readonly gain: number | null;
  readonly se: number | null;
  readonly days: number;
  readonly verdict: Form | 'cannot be told apart';
}

/** The marks' own errors in one component. */
export interface MarkComponentResult {
  readonly component: Component;
  readonly marks: number;
  readonly standing: 'given' | 'indicative' | 'too few marks';
  /** Spread per axis, mm. */
  readonly sigmaMm: EstimateWithLimits;
  readonly signedPpm: SignedPpm | null;
  /** Chance of marks differing so much by the scatter of days alone; null with too few marks. */
  readonly differPValue: number | null;
  /** The same against the published coordinates, what all marks share included. */
  readonly anyPValue: number | null;
  readonly spreadMm: number | null;
  readonly standOut: readonly string[];
}

/** Mean error of a mark, and whether it stands out. */
export interface MarkResult extends MarkMean {
  readonly standsOut: { readonly horizontal: boolean; readonly vertical: boolean };
}

/** An occupation that looks like a wrong fix. */
export interface WrongFixResult {
  readonly day: string;
  readonly mark: string;
  readonly rover: string;
  readonly crew: string;
  readonly baselineKm: number;
  readonly east: number | null;
  readonly north: number | null;
  readonly up: number | null;
  readonly probability: number;
  readonly file: string;
  readonly row: number;
}

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

/** Measured spread by class of baseline length. Shown, never fitted. */
export interface LengthClass {
  readonly fromKm: number;
  readonly toKm: number;
  readonly baselineKm: number;
  readonly occupations: number;
  readonly days: number;
  readonly visitsWithoutFix: number;
  readonly horizontalRmsMm: Interval | null;
  readonly verticalRmsMm: Interval | null;
  readonly tooFew: boolean;
}

/** The account of one log file. */
export interface FileResult {
  readonly file: string;
  /** SHA-256 of its bytes. */
  readonly sha256: string;
  /** Steps in which its positions are written, mm; null when nothing could be read. */
  readonly resolution: LogResolution | null;
  readonly read: number;
  readonly used: number;
  readonly setAside: Readonly<Partial<Record<RowReason, ReasonCount>>>;
}

/** An occupation that a person likely got wrong. */
export interface BlunderResult {
  readonly mark: string;
  readonly day: string;
  readonly crew: string;
  readonly rover: string;
  readonly cause: string;
  readonly file: string;
  readonly row: number;
}

/** Everything a run found: the value from which every output is written. `results.json` is this, in JSON. */
export interface Results {
  readonly version: 1;
  readonly study: { readonly title: string; readonly timeZone: string | null; readonly seed: number };
  readonly messages: readonly Message[];
  readonly rows: {
    readonly read: number;
    readonly used: number;
    readonly setAside: Readonly<Partial<Record<RowReason, number>>>;
  };
  readonly files: readonly FileResult[];
  /** What rounding of the coarsest log adds to the constant, mm: radial, and vertical; null without positions. */
  readonly roundingMm: { readonly horizontal: number; readonly vertical: number } | null;
  /** Static occupations cut into shots, and about how many of these are independent; null without windowSeconds. */
  readonly staticShots: StaticShots | null;
  readonly visits: { readonly withFix: number; readonly withoutFix: number };
  readonly occupations: {
    readonly formed: number;
    readonly used: number;
    readonly setAside: Readonly<Partial<Record<OccupationReason, number>>>;
  };
  /** Kind of heights that were compared, and so of every vertical error. */
  readonly heights: 'ellipsoidal' | 'orthometric';
  /** What the marks of each base have in common, and what likely caused it. Signed: no part of the scatter. */
  readonly commonCauses: CommonCauses;
  /** Occupations taken for blunders, which are among those set aside. */
  readonly blunders: readonly BlunderResult[];
  /** Where the coordinates behind the errors come from. */
  readonly controlMarks: readonly ControlMark[];
  /** Marks to which a job was fitted: their errors are residuals, not checks. */
  readonly siteMarks: readonly string[];
  /** Days with at least one used occupation. */
  readonly days: number;
  readonly period: { readonly from: string; readonly to: string } | null;
  readonly bases: readonly string[];
  readonly fits: readonly FitResult[];
  readonly comparison: readonly ComparisonResult[];
  readonly setups: readonly SetupOffsets[];
  readonly markComponents: readonly MarkComponentResult[];
  /** Occupations that look like wrong fixes, for review. */
  readonly wrongFixes: readonly WrongFixResult[];
  readonly dayModels: readonly DayModelResult[];
  readonly dailyFactors: readonly DailyFactorResult[];
  readonly degradedDays: readonly DegradedDayResult[];
  readonly timeOfDay: readonly TimeOfDayResult[];
  readonly lengthClasses: readonly LengthClass[];
  readonly marks: readonly MarkResult[];
  readonly rules: readonly Rule[];
  readonly specSheet: SpecSheet | null;
}
