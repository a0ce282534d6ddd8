/** Why a row of a log is not part of any occupation. */
export const ROW_REASONS = [
  'unreadable',
  'no-position',
  'not-fixed',
  'unknown-mark',
  'unknown-base',
  'duplicate',
  'conflicting',
  'moving',
  'outside-study',
  'not-single-base',
] as const;
export type RowReason = (typeof ROW_REASONS)[number];

/** Why a formed occupation takes no part in a fit. */
export const OCCUPATION_REASONS = [
  'suspected-wrong-fix',
  'suspected-blunder',
  'left-out-day',
  'error-over-10-m',
] as const;
export type OccupationReason = (typeof OCCUPATION_REASONS)[number];

/** What each reason means, in the words of tables and reports. */
export const REASON_WORDS: Readonly<Record<RowReason | OccupationReason, string>> = {
  unreadable: 'a value could not be read',
  'no-position': 'no coordinates in the row',
  'not-fixed': 'the receiver did not call the position fixed',
  'unknown-mark': 'the mark is not in the marks file',
  'unknown-base': 'the base is not in the bases file',
  duplicate: 'the same position a second time',
  conflicting: 'two different positions at the same time',
  moving: 'the rover was moving',
  'outside-study': 'outside the period of the study',
  'not-single-base': 'corrections not from a single base',
  'suspected-wrong-fix': 'looks like a wrong fix',
  'suspected-blunder': 'looks like a blunder',
  'left-out-day': 'day left out by the study file',
  'error-over-10-m': 'more than 10 m from the mark',
};

/** A row that was read and is not used, with the place where it stands and why. */
export interface SetAsideRow {
  readonly file: string;
  readonly row: number;
  readonly reason: RowReason;
  /** The column that caused it, where one did. */
  readonly column: string | null;
  /** What exactly was found and expected; empty when the reason says it all. */
  readonly detail: string;
}
