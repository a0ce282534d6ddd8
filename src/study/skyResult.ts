import type { ThresholdRule } from '../days/index.js';
import type { Component } from '../fit/index.js';

/** Geomagnetic activity and the ionosphere of one day of the study; null where no file tells. */
export interface SkyDay {
  readonly day: string;
  /** Mean of ap over the day; for a UTC day this is Ap before rounding. */
  readonly ap: number | null;
  readonly kpMax: number | null;
  /** Greatest Hp30 of the day, of Hp60 where no file has Hp30; unlike Kp it goes on above 9. */
  readonly hpMax: number | null;
  /** Observed F10.7, solar flux units. */
  readonly f107: number | null;
  /** nT. */
  readonly dstMin: number | null;
  /** Share of the day for which Kp is known (without it ap or Hp): below 1 a disturbance may have been missed. */
  readonly indexShare: number;
  /** Vertical TEC of the daytime over the site, TECU. */
  readonly tecMean: number | null;
  readonly tecMax: number | null;
  /** Mean of the steepest gradient of the daytime, TECU per 100 km. */
  readonly gradientMean: number | null;
  /** `tecMean` minus that of the day before, TECU. */
  readonly tecChange: number | null;
  /**
   * What `tecMean` does to the length of a baseline measured on L1 alone, or fixed on it, ppm: negative is shorter.
   * Mask 15°, the shell of the maps.
   */
  readonly shorteningPpm: number | null;
  /** Share of the daytime for which the maps give TEC. */
  readonly mapShare: number;
  readonly shareWithoutFix: number | null;
}

/** What is compared day by day with the sky. */
export const SKY_OUTCOMES = [
  'horizontal daily factor',
  'vertical daily factor',
  'share without a fix',
] as const;
export type SkyOutcome = (typeof SKY_OUTCOMES)[number];

/** What of the sky it is compared with. */
export const SKY_MEASURES = [
  'Ap',
  'greatest Kp',
  'greatest Hp',
  'F10.7',
  'least Dst',
  'TEC',
  'TEC gradient',
  'TEC change',
] as const;
export type SkyMeasure = (typeof SKY_MEASURES)[number];

/** How far an outcome and a measure of the sky go together over the days. */
export interface SkyAssociation {
  readonly outcome: SkyOutcome;
  readonly measure: SkyMeasure;
  readonly days: number;
  /** Days on which one of the two is not known. */
  readonly leftOut: number;
  readonly spearman: number | null;
  readonly low: number | null;
  readonly high: number | null;
  readonly pValue: number | null;
  /** For as many comparisons as were made (Holm 1979). */
  readonly adjustedPValue: number | null;
  readonly blockDays: number;
  readonly permutations: number;
  /** Whole sentences that keep going together and causing apart. */
  readonly statement: string;
}

/** What a rule "no work from this Kp on" would have done with the degraded days of a component. */
export interface SkyThreshold extends ThresholdRule {
  readonly component: Component;
}

/** The sky over a study, day by day, and what goes with it. */
export interface Sky {
  /** Where TEC is taken: the base with the most occupations. */
  readonly site: { readonly base: string; readonly latitudeDeg: number; readonly longitudeDeg: number };
  readonly files: readonly string[];
  readonly days: readonly SkyDay[];
  readonly associations: readonly SkyAssociation[];
  readonly thresholds: readonly SkyThreshold[];
}
