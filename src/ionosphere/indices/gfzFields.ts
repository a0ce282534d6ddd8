import { dateMismatch, dateMs, daysBetween, type LineFault, numberIn, unreadable } from './indexLine.js';

/** The day count of these files begins here. */
const DAY_COUNT_START_MS = Date.UTC(1932, 0, 1);

/** The cells of a line of blank-separated numbers. */
export const cellsOf = (line: string): string[] => line.trim().split(/\s+/);

export interface DatedNumbers {
  /** Beginning of the UTC day. */
  readonly dayMs: number;
  readonly numbers: readonly number[];
}

/**
 * The numbers of a line that begins with year, month and day and holds, at `dayCountAt`, the days since 1932-01-01.
 * Date and count must agree: one of them wrong would put the values into another day in silence.
 */
export function datedNumbers(line: string, count: number, dayCountAt: number): DatedNumbers | LineFault {
  const cells = cellsOf(line);
  if (cells.length !== count) return unreadable(`expected ${count} numbers in the row, came ${cells.length}`);
  const numbers = cells.map(Number);
  // without another character, what Number() refuses is all that can be wrong
  if (/[^\d\s.+-]/.test(line) || numbers.some(Number.isNaN)) {
    const cell = cells.find((one) => numberIn(one) === null);
    return unreadable(`expected a number, came ${JSON.stringify(cell?.slice(0, 20))}`);
  }
  const date = cells.slice(0, 3).join('-');
  const dayMs = dateMs(numbers[0]!, numbers[1]!, numbers[2]!);
  if (dayMs === null) return unreadable(`expected a date of the calendar, came ${date}`);
  const expected = daysBetween(DAY_COUNT_START_MS, dayMs);
  if (Math.floor(numbers[dayCountAt]!) === expected) return { dayMs, numbers };
  return dateMismatch(
    `the date ${date} is day ${expected} since 1932-01-01, and the row counts ${numbers[dayCountAt]}`,
  );
}

export const isFault = (read: DatedNumbers | LineFault): read is LineFault => 'code' in read;
