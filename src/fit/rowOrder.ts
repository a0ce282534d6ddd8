/**
 * Puts rows in an order that does not depend on how they came: by day, then by each key in turn. Sums depend on order in
 * the last digits, so that a fixed order makes equal data give equal bytes.
 * @param rows places to be ordered, changed in place
 * @param keys numbers of all rows; NaN comes first
 */
export function orderRows(
  rows: Int32Array,
  days: readonly string[],
  keys: readonly ArrayLike<number>[],
): Int32Array {
  const names = [...new Set(days)].sort();
  const rank = new Map(names.map((name, d) => [name, d]));
  const dayOf = Int32Array.from(days, (day) => rank.get(day)!);
  return rows.sort((i, j) => {
    if (dayOf[i] !== dayOf[j]) return dayOf[i]! - dayOf[j]!;
    for (const key of keys) {
      const [a, b] = [key[i]!, key[j]!];
      if (a < b) return -1;
      if (a > b) return 1;
      if (a !== b && Number.isNaN(a) !== Number.isNaN(b)) return Number.isNaN(a) ? -1 : 1;
    }
    return 0;
  });
}
