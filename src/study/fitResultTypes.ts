import type { Component, EstimateWithLimits, Form, Reference } from '../fit/index.js';
import type { MarkMean } from '../split/index.js';

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
