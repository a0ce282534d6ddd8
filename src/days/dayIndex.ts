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
