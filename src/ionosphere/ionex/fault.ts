import type { LineCursor } from './lineCursor.js';

/** The file cannot be read on from a line: the text is whole sentences for the user. */
export class IonexFault extends Error {
  constructor(
    readonly code: string,
    readonly line: number | null,
    text: string,
  ) {
    super(text);
    this.name = 'IonexFault';
  }
}

/** A number in fixed columns. @throws IonexFault when there is none */
export function numberAt(cursor: LineCursor, from: number, to: number, what: string): number {
  const cell = cursor.columns(from, to);
  if (/^\s*[+-]?(\d+\.?\d*|\.\d+)\s*$/.test(cell)) return Number(cell);
  throw new IonexFault(
    'map-row-unreadable',
    cursor.line,
    `Expected ${what} in columns ${from + 1} to ${to}, came ${JSON.stringify(cell)}. Get the file again.`,
  );
}

/** Six whole numbers of six columns: year, month, day, hour, minute, second. Hour 24 is the end of the day. */
export function epochAt(cursor: LineCursor): number {
  const [year, month, day, hour, minute, second] = [0, 1, 2, 3, 4, 5].map((k) =>
    numberAt(cursor, 6 * k, 6 * k + 6, 'a whole number of a date and time'),
  ) as [number, number, number, number, number, number];
  const ms = Date.UTC(year, month - 1, day, hour, minute, second);
  const date = new Date(Date.UTC(year, month - 1, day));
  const real =
    date.getUTCFullYear() === year &&
    date.getUTCMonth() === month - 1 &&
    date.getUTCDate() === day &&
    hour >= 0 &&
    minute >= 0 &&
    minute < 60 &&
    second >= 0 &&
    second < 60 &&
    hour * 3600 + minute * 60 + second <= 86_400;
  if (real) return ms;
  throw new IonexFault(
    'map-row-unreadable',
    cursor.line,
    `Expected a date and a time of day from 00:00 to 24:00, came ${JSON.stringify(cursor.columns(0, 36).trim())}. Get the file again.`,
  );
}
