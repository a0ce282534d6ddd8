/**
 * Puts rows in an order that does not depend on how they came: by day, then by each key in turn. Sums depend on order in
 * the last digits, so that a fixed order makes equal data give equal bytes. Keys are ranked one after the other, only as
 * many as it takes to tell all rows apart: sorting numbers is many times faster than comparing rows.
 * @param rows places to be ordered
 * @param days,keys of all rows, not only of those to be ordered; NaN comes last
 */
export function orderRows(
  rows: Int32Array,
  days: readonly string[],
  keys: readonly ArrayLike<number>[],
): Int32Array {
  let ranks = dayRanks(rows, days);
  for (const key of keys) {
    if (ranks.distinct === rows.length) break;
    const own = denseRanks(Float64Array.from(rows, (row) => key[row]!));
    // Both factors are at most the number of rows: the product is exact.
    const joint = Float64Array.from(ranks.of, (rank, k) => rank * own.distinct + own.of[k]!);
    ranks = denseRanks(joint);
  }
  const starts = new Int32Array(ranks.distinct + 1);
  for (const rank of ranks.of) starts[rank + 1]! += 1;
  for (let r = 0; r < ranks.distinct; r++) starts[r + 1]! += starts[r]!;
  const ordered = new Int32Array(rows.length);
  rows.forEach((row, k) => {
    const rank = ranks.of[k]!;
    ordered[starts[rank]!] = row;
    starts[rank]! += 1;
  });
  return ordered;
}

/** Rank of each value among the distinct ones. */
interface Ranks {
  readonly of: Int32Array;
  readonly distinct: number;
}

function dayRanks(rows: Int32Array, days: readonly string[]): Ranks {
  const names = [...new Set(days)].sort();
  const rank = new Map(names.map((name, d) => [name, d]));
  return { of: Int32Array.from(rows, (row) => rank.get(days[row]!)!), distinct: names.length };
}

function denseRanks(values: Float64Array): Ranks {
  const sorted = values.slice().sort();
  let distinct = 0;
  for (let i = 0; i < sorted.length; i++) {
    const value = sorted[i]!;
    if (Number.isNaN(value)) break;
    if (distinct === 0 || value !== sorted[distinct - 1]) sorted[distinct++] = value;
  }
  const of = Int32Array.from(values, (value) => {
    if (Number.isNaN(value)) return distinct;
    let [low, high] = [0, distinct - 1];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (sorted[middle]! < value) low = middle + 1;
      else high = middle;
    }
    return low;
  });
  return { of, distinct: distinct + 1 };
}
