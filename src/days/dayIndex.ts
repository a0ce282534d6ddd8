/** Days in the order of their names, and for every row the number of its day. */
export interface DayIndex {
  readonly days: readonly string[];
  readonly dayOf: Int32Array;
  /** Rows of each day. */
  readonly occupations: Int32Array;
}

export function dayIndex(day: readonly string[]): DayIndex {
  const days = [...new Set(day)].sort();
  const number = new Map(days.map((name, d) => [name, d]));
  const dayOf = Int32Array.from(day, (name) => number.get(name)!);
  const occupations = new Int32Array(days.length);
  for (const d of dayOf) occupations[d]! += 1;
  return { days, dayOf, occupations };
}

/**
 * Rows of all days one after the other, within a day in the order of a key; equal keys keep their order.
 * @param key of every row
 */
export function rowsWithinDays({ dayOf, occupations }: DayIndex, key: Float64Array): Int32Array {
  const order = new Int32Array(dayOf.length);
  const next = new Int32Array(occupations.length);
  for (let d = 1; d < next.length; d++) next[d] = next[d - 1]! + occupations[d - 1]!;
  const starts = next.slice();
  for (let i = 0; i < dayOf.length; i++) order[next[dayOf[i]!]!++] = i;
  for (let d = 0; d < starts.length; d++) {
    const own = order.subarray(starts[d]!, next[d]!);
    // Rows of a fit come sorted by length: most days need no sorting by it.
    if (!ascending(own, key)) own.sort((i, j) => key[i]! - key[j]! || i - j);
  }
  return order;
}

function ascending(rows: Int32Array, key: Float64Array): boolean {
  for (let k = 1; k < rows.length; k++) if (key[rows[k]!]! < key[rows[k - 1]!]!) return false;
  return true;
}
