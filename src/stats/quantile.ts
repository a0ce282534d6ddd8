/**
 * Sample quantile, type 7 of Hyndman & Fan (1996, The American Statistician 50): linear between order statistics, the
 * smallest value at p = 0 and the largest at 1. The values need no order and are not changed.
 * @throws RangeError for no values, a NaN among them, or p outside [0, 1].
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`p: expected a number from 0 to 1, received ${p}`);
  if (values.length === 0) throw new RangeError('values: expected at least one number, received none');
  const sorted = Float64Array.from(values).sort();
  // a typed array sorts NaN to its end
  if (Number.isNaN(sorted[sorted.length - 1])) throw new RangeError('values: expected numbers, received NaN');
  const position = (sorted.length - 1) * p;
  const below = Math.floor(position);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, sorted.length - 1)]!;
  const share = position - below;
  // without this, infinite neighbours would give NaN
  return share === 0 || low === high ? low : low + share * (high - low);
}

/**
 * Median: the middle value, or the mean of the two middle ones.
 * @throws RangeError for no values or a NaN among them.
 */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}
