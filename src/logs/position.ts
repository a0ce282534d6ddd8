/** What a receiver said of its ambiguities: `fixed`, `float`, or anything else (none, autonomous, differential). */
export type Fix = 'fixed' | 'float' | 'other';

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
  /** Geographic coordinates and ellipsoidal height; all NaN when the row has no coordinates. */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
  readonly satellites: number;
  readonly pdop: number;
  readonly ageSeconds: number;
  /** The receiver's own figures, in metres. */
  readonly horizontalSigmaM: number;
  readonly verticalSigmaM: number;
}
