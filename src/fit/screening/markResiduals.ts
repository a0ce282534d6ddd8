import { median } from '../../stats/index.js';

/** Rows by mark and day: every run of one mark holds runs of one day each. */
export interface MarkDays {
  /** Places of rows, by mark and then by day. */
  readonly rows: Int32Array;
  readonly markOf: Int32Array;
  readonly dayOf: Int32Array;
  /** On how many days each mark was visited. */
  readonly daysOfMark: Int32Array;
}

/** @param rows that take part; @param marks,days of all rows */
export function groupByMarkAndDay(
  rows: Int32Array,
  marks: readonly string[],
  days: readonly string[],
): MarkDays {
  const [markOf, markCount] = numbered(marks);
  const [dayOf, dayCount] = numbered(days);
  const ordered = bucketed(bucketed(rows, dayOf, dayCount), markOf, markCount);
  const daysOfMark = new Int32Array(markCount);
  ordered.forEach((row, k) => {
    const before = k === 0 ? -1 : ordered[k - 1]!;
    if (before < 0 || markOf[before] !== markOf[row] || dayOf[before] !== dayOf[row]) {
      daysOfMark[markOf[row]!]! += 1;
    }
  });
  return { rows: ordered, markOf, dayOf, daysOfMark };
}

/** Errors minus the median of their mark's day medians; a mark's own error then hides no wrong fix and makes none. */
export function markResiduals(errors: Float64Array, { rows, markOf, dayOf }: MarkDays): Float64Array {
  const residuals = new Float64Array(errors.length).fill(Number.NaN);
  let from = 0;
  while (from < rows.length) {
    const mark = markOf[rows[from]!];
    let to = from;
    const dayMedians: number[] = [];
    while (to < rows.length && markOf[rows[to]!] === mark) {
      const day = dayOf[rows[to]!];
      const values: number[] = [];
      for (; to < rows.length && markOf[rows[to]!] === mark && dayOf[rows[to]!] === day; to++) {
        const value = errors[rows[to]!]!;
        if (!Number.isNaN(value)) values.push(value);
      }
      if (values.length > 0) dayMedians.push(median(values));
    }
    const center = dayMedians.length === 0 ? Number.NaN : median(dayMedians);
    for (let k = from; k < to; k++) residuals[rows[k]!] = errors[rows[k]!]! - center;
    from = to;
  }
  return residuals;
}

/** A number for each name. */
function numbered(names: readonly string[]): [numbers: Int32Array, count: number] {
  const index = new Map<string, number>();
  const numbers = Int32Array.from(names, (name) => {
    let number = index.get(name);
    if (number === undefined) {
      number = index.size;
      index.set(name, number);
    }
    return number;
  });
  return [numbers, index.size];
}

/** Counting sort that keeps the order of rows with the same key. */
function bucketed(rows: Int32Array, keyOf: Int32Array, keys: number): Int32Array {
  const starts = new Int32Array(keys + 1);
  for (const row of rows) starts[keyOf[row]! + 1]! += 1;
  for (let k = 0; k < keys; k++) starts[k + 1]! += starts[k]!;
  const ordered = new Int32Array(rows.length);
  for (const row of rows) {
    ordered[starts[keyOf[row]!]!] = row;
    starts[keyOf[row]!]! += 1;
  }
  return ordered;
}
