/** What a receiver said of its ambiguities: `fixed`, `float`, or anything else (none, autonomous, differential). */
export type Fix = 'fixed' | 'float' | 'other';

/** From where the corrections of a position came. */
export const CORRECTION_KINDS = ['single-base', 'network', 'virtual-base', 'satellite'] as const;
export type Corrections = (typeof CORRECTION_KINDS)[number];

/** What only some logs tell of a row. A number that the row does not give is NaN, a text is empty. */
export interface PositionExtras {
  /** Coordinates that the base receiver was given in the field; all NaN when the log does not tell. */
  readonly baseLatitudeDeg: number;
  readonly baseLongitudeDeg: number;
  readonly baseHeightM: number;
  /** As the log writes it; empty when it does not tell. */
  readonly corrections: string;
  /** Number of the station whose corrections were used. */
  readonly station: string;
  /** Tilt of the rod, degrees from plumb. */
  readonly tiltDeg: number;
  /** What held the rod: a bipod, a hand, in the log's own words. */
  readonly support: string;
}

/** Extras that tell nothing. */
export const NO_EXTRAS: PositionExtras = {
  baseLatitudeDeg: Number.NaN,
  baseLongitudeDeg: Number.NaN,
  baseHeightM: Number.NaN,
  corrections: '',
  station: '',
  tiltDeg: Number.NaN,
  support: '',
};

/** One row of a log. A number that the row does not give is NaN, a text that it does not give is empty. */
export interface Position {
  readonly file: string;
  /** Line of the file, from 1, the header included. */
  readonly row: number;
  /** NaN when the row has a date and no time of day. */
  readonly utcMs: number;
  /** The day, `YYYY-MM-DD`, of a row without a time of day; else empty. */
  readonly dateOnly: string;
  readonly mark: string;
  readonly pointNumber: string;
  readonly description: string;
  readonly base: string;
  readonly setup: string;
  readonly rover: string;
  readonly crew: string;
  readonly fix: Fix;
  /** Epochs that the row is the mean of; 1 when it does not say. */
  readonly epochs: number;
  /** Geographic coordinates, and height of the kind the study compares; all NaN when the row has no coordinates. */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
  readonly satellites: number;
  readonly pdop: number;
  readonly ageSeconds: number;
  /** The receiver's own figures, in metres. */
  readonly horizontalSigmaM: number;
  readonly verticalSigmaM: number;
  /** Null when the log tells none of it. */
  readonly extras: PositionExtras | null;
}
