import type { OccupationError, SetAsideOccupation } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import type { FileResult } from './results.js';

/** Occupations of days that the earlier run covers, which it never read. */
export interface LateOccupations {
  readonly occupations: number;
  /** In order. */
  readonly days: readonly string[];
}

interface ReadOccupations {
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly files: readonly FileResult[];
}

/**
 * Logs that came in late: from files that the earlier run did not read, or from beyond the rows it read of one that has
 * grown since, on days up to its last. Neither the model nor the watch has seen them.
 * @param after last day of the earlier run; null without one, when no day is earlier
 */
export function lateOccupations(
  { errors, setAside, files }: ReadOccupations,
  earlier: readonly FileResult[],
  after: string | null,
): LateOccupations {
  const before = new Map(earlier.map((file) => [file.file, file]));
  const changed = new Set(
    files.filter(({ file, sha256 }) => before.get(file)?.sha256 !== sha256).map(({ file }) => file),
  );
  const late = [...errors, ...setAside.map(({ error }) => error)].filter(
    ({ day, file, row }) =>
      after !== null && day <= after && changed.has(file) && row > lastLine(before.get(file)),
  );
  return { occupations: late.length, days: [...new Set(late.map(({ day }) => day))].sort() };
}

/** About the last line that was read: rows, and a header. */
const lastLine = (file: FileResult | undefined): number => (file === undefined ? 0 : file.read + 1);

/** What to do about them; nothing without any. */
export function lateMessages({ occupations, days }: LateOccupations, after: string | null): Message[] {
  if (occupations === 0) return [];
  const some = occupations === 1 ? 'occupation lies' : 'occupations lie';
  const span =
    days.length === 1 ? `on ${days[0]}` : `on ${days.length} days from ${days[0]} to ${days.at(-1)}`;
  return [
    message(
      'warning',
      'late-occupations',
      `Expected only days after ${after}, came logs that the earlier run did not read: ${occupations} ${some} ${span}. They are neither in its model nor watched here. Run the study again to take them in.`,
    ),
  ];
}
