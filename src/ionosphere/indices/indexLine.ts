import type { IndexName, IndexStatus } from './indexSeries.js';

/** Takes one value of a line; a value marked as missing is NaN. */
export type AddValue = (name: IndexName, startMs: number, value: number, status: IndexStatus) => void;

/** What is wrong with a line: the text ends a sentence and begins in lower case. */
export interface LineFault {
  readonly code: 'index-row-unreadable' | 'index-date-mismatch';
  readonly detail: string;
}

/** One of the public layouts of index files. */
export interface IndexLayout {
  /** In messages, with its article. */
  readonly words: string;
  /** Whether a line has the outline of this layout. */
  readonly matches: (line: string) => boolean;
  /**
   * Hands the values of a line to `add`, all or none.
   * @param doubt takes what contradicts itself in a line that is used nevertheless
   */
  readonly read: (line: string, add: AddValue, doubt: (detail: string) => void) => LineFault | null;
}

const DAY_MS = 86_400_000;

export const unreadable = (detail: string): LineFault => ({ code: 'index-row-unreadable', detail });

export const dateMismatch = (detail: string): LineFault => ({ code: 'index-date-mismatch', detail });

/** UTC milliseconds of the beginning of a date, or null when the calendar has no such date. */
export function dateMs(year: number, month: number, day: number): number | null {
  const ms = Date.UTC(year, month - 1, day);
  const date = new Date(ms);
  const real =
    date.getUTCFullYear() === year && date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
  return real ? ms : null;
}

/** Days between two instants that are whole days apart. */
export const daysBetween = (fromMs: number, toMs: number): number => Math.round((toMs - fromMs) / DAY_MS);

/** A number that fills a cell from end to end, or null. */
export function numberIn(cell: string): number | null {
  return /^\s*[+-]?(\d+\.?\d*|\.\d+)\s*$/.test(cell) ? Number(cell) : null;
}
