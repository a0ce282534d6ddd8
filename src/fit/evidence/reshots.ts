import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { inputError, type Message, message } from '../../logs/index.js';

export interface ReshotOptions {
  /** Occupations of one mark that begin within so many minutes are re-shots; default 10. */
  readonly withinMinutes?: number | undefined;
}

/** Signs that shots were repeated or taken out before they came here. */
export interface Reshots {
  /** Rows (from 0) of each occupation and of the one that repeats it at once. */
  readonly pairs: readonly { readonly first: number; readonly again: number; readonly minutes: number }[];
  /** Numbers missing between the first and the last point number of a rover and day; null without the column. */
  readonly missingNumbers: number | null;
  /** Numbers that are present, where missing ones are counted. */
  readonly numbered: number | null;
  readonly notes: readonly Message[];
}

const DEFAULT_MINUTES = 10;
const MS_A_MINUTE = 60_000;
/** A run of missing numbers longer than this is other work, not shots taken out. */
const LONGEST_GAP = 3;

/**
 * Quick re-shots of a mark, and gaps in point numbers. If a bad shot is taken again and the first one deleted, the errors
 * that remain are too small.
 * @param errors with `day`, `mark` and `startMs`; `rover` keeps rovers apart, `pointNumber` shows gaps
 * @throws InputError when a column is missing or the minutes are not above 0
 */
export function reshots(
  errors: ErrorsInput,
  { withinMinutes = DEFAULT_MINUTES }: ReshotOptions = {},
): Reshots {
  if (!(withinMinutes > 0)) {
    throw inputError(
      'bad-option',
      `Expected a number above 0 as withinMinutes, came ${JSON.stringify(withinMinutes)}. Correct the option.`,
    );
  }
  const columns = errorColumns(errors);
  const marks = columns.texts('mark', 'reshots');
  const days = columns.texts('day', 'reshots');
  const starts = columns.numbers('startMs', 'reshots');
  const rovers = columns.has('rover') ? columns.texts('rover', 'reshots') : null;
  const series = (i: number): string => `${days[i]}\u0000${rovers?.[i] ?? ''}`;
  const order = marks
    .map((_, i) => i)
    .filter((i) => !Number.isNaN(starts[i]!))
    .sort(
      (i, j) => compare(series(i), series(j)) || starts[i]! - starts[j]! || compare(marks[i]!, marks[j]!),
    );
  const pairs = order.flatMap((again, k) => {
    const first = order[k - 1];
    if (first === undefined || series(first) !== series(again) || marks[first] !== marks[again]) return [];
    const minutes = (starts[again]! - starts[first]!) / MS_A_MINUTE;
    return minutes <= withinMinutes ? [{ first, again, minutes }] : [];
  });
  const numbers = columns.has('pointNumber')
    ? missing(
        columns.texts('pointNumber', 'reshots'),
        marks.map((_, i) => series(i)),
      )
    : null;
  return {
    pairs,
    missingNumbers: numbers?.missing ?? null,
    numbered: numbers?.present ?? null,
    notes: [...pairNote(pairs.length, order.length, withinMinutes), ...numberNote(numbers)],
  };
}

/** Counts short gaps between the numbers at the end of point names, within each series. */
function missing(names: readonly string[], series: readonly string[]): { present: number; missing: number } {
  const lists = new Map<string, Set<number>>();
  names.forEach((name, i) => {
    const match = /^(.*?)(\d{1,9})$/.exec(name.trim());
    if (match === null) return;
    const key = `${series[i]}\u0000${match[1]}`;
    const list = lists.get(key) ?? new Set();
    lists.set(key, list);
    list.add(Number(match[2]));
  });
  let [present, gone] = [0, 0];
  for (const list of lists.values()) {
    const sorted = [...list].sort((a, b) => a - b);
    present += sorted.length;
    sorted.forEach((number, k) => {
      const gap = k === 0 ? 0 : number - sorted[k - 1]! - 1;
      if (gap <= LONGEST_GAP) gone += gap;
    });
  }
  return { present, missing: gone };
}

function pairNote(pairs: number, occupations: number, minutes: number): Message[] {
  if (pairs === 0) return [];
  return [
    message(
      'info',
      'quick-reshots',
      `${pairs} of ${occupations} occupations begin within ${minutes} minutes of another one by the same rover on the same mark. They say little new; if bad shots were repeated and the first ones kept back, the errors here are too small.`,
    ),
  ];
}

function numberNote(numbers: { readonly present: number; readonly missing: number } | null): Message[] {
  if (numbers === null || numbers.missing === 0) return [];
  return [
    message(
      'info',
      'point-numbers-missing',
      `${numbers.missing} ${numbers.missing === 1 ? 'point number is' : 'point numbers are'} missing in short gaps between ${numbers.present} that are present. They may be other points of the day; if they are shots that were deleted because they looked bad, the errors here are too small. Use logs as the receiver wrote them.`,
    ),
  ];
}

const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
