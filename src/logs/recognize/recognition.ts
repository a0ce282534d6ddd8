import type { Geodetic } from '../../geodesy/index.js';
import type { CoordinateSystem } from '../coordinateSystem.js';
import type { DelimitedLayout, LogLayout } from '../layout.js';
import type { Message } from '../messages.js';
import type { ColumnRole } from '../roles.js';

/** What is known of a log beside its own bytes. */
export interface RecognizeOptions {
  /** System of the study; `geographic` says nothing against plane coordinates in a file, as it is the default. */
  readonly coordinates?: CoordinateSystem | undefined;
  /** Zone of times that are written without one. */
  readonly timeZone?: string | null | undefined;
  /** Kind of the heights, where the study states it. */
  readonly heights?: 'ellipsoidal' | 'orthometric' | undefined;
}

/** Something that the file does not say, or not surely. */
export interface Doubt {
  /** Stable name of the kind of doubt, lower case with hyphens. */
  readonly code: string;
  /** One full sentence that asks. */
  readonly question: string;
  /** One full sentence: what in the file makes it unclear. */
  readonly because: string;
  /** Key to state: `layout.…` and `coordinates` in the log's entry, others at the top of the study file. */
  readonly key: string;
  /** What the key may say; empty where only the user can know it. */
  readonly choices: readonly string[];
  /** Numbers would be wrong, or no row could be read, if it were guessed: it is asked for. */
  readonly decisive: boolean;
}

/** A row as the layout reads it. */
export interface PreviewRow {
  /** Line of the file, from 1. */
  readonly row: number;
  readonly texts: Readonly<Partial<Record<ColumnRole, string>>>;
  /** ISO 8601 in UTC, or the date of a row without a time of day; null while it cannot be read. */
  readonly time: string | null;
  /** Geographic coordinates and height; null while they cannot be computed. */
  readonly coordinates: Geodetic | null;
}

/** A file whose structure was understood. */
export interface RecognizedLog {
  readonly kind: 'recognized';
  readonly file: string;
  /** What was decided; keys that a decisive doubt asks for are left out. */
  readonly layout: LogLayout;
  /** Every column that was given a role, also those whose names the reader of the file knows without a layout. */
  readonly columns: NonNullable<DelimitedLayout['columns']>;
  /** Null when the user must state it. */
  readonly coordinates: CoordinateSystem | null;
  /** The first five rows. */
  readonly preview: readonly PreviewRow[];
  readonly unsure: readonly Doubt[];
  /** No doubt is decisive. */
  readonly complete: boolean;
}

/** A file that is no log, or holds no rows. */
export interface UnrecognizedLog {
  readonly kind: 'unrecognized';
  readonly message: Message;
  readonly unsure: readonly Doubt[];
}

export type Recognition = RecognizedLog | UnrecognizedLog;
