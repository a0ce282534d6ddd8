/**
 * Smallest value whose cumulative weight reaches a level, for several levels at once.
 * @param weights ≥ 0, any sum
 * @param levels in (0, 1)
 */
export function weightedQuantiles(
  values: Float64Array,
  weights: Float64Array,
  levels: readonly number[],
): number[] {
  const order = Uint32Array.from(values.keys()).sort((i, j) => values[i]! - values[j]!);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return levels.map((level) => {
    let reached = 0;
    for (const i of order) {
      reached += weights[i]!;
      if (reached >= level * total) return values[i]!;
    }
    return values[order[order.length - 1]!]!;
  });
}
