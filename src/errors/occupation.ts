import type { Geodetic } from '../geodesy/index.js';

/** Who was where, and when. */
interface Stay {
  readonly rover: string;
  readonly mark: string;
  readonly base: string;
  readonly setup: string;
  readonly crew: string;
  /** Local calendar day of the start, `YYYY-MM-DD`. */
  readonly day: string;
  readonly startMs: number;
  readonly endMs: number;
}

/** A crew's stay at a mark, with or without a fix. */
export interface Visit extends Stay {
  readonly rows: number;
  readonly fixedRows: number;
}

/** Consecutive fixed positions of one visit, averaged: the unit that is analysed. */
export interface Occupation extends Stay {
  /** Fixed rows that were averaged. */
  readonly epochs: number;
  /** Mean of the fixed epochs. */
  readonly position: Geodetic;
  /** Standard deviation of a single epoch about the mean, mm; NaN for one epoch. */
  readonly scatterEastMm: number;
  readonly scatterNorthMm: number;
  readonly scatterUpMm: number;
  /** Means over the epochs; NaN where no epoch gave a value. */
  readonly satellites: number;
  readonly pdop: number;
  readonly ageSeconds: number;
  readonly horizontalSigmaM: number;
  readonly verticalSigmaM: number;
  readonly tiltDeg: number;
  /** What held the rod, of the first epoch; empty when the log does not tell. */
  readonly support: string;
  /** Where its first epoch stands. */
  readonly file: string;
  readonly row: number;
}
