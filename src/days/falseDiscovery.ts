/**
 * Adjusted p-values: a set of those at most q has an expected share q of false ones (Benjamini & Hochberg 1995; from
 * memory).
 */
export function falseDiscoveryAdjusted(pValues: readonly number[]): number[] {
  const order = [...pValues.keys()].sort((i, j) => pValues[j]! - pValues[i]!);
  const adjusted = new Array<number>(pValues.length);
  let least = 1;
  order.forEach((i, k) => {
    least = Math.min(least, (pValues.length * pValues[i]!) / (pValues.length - k));
    adjusted[i] = least;
  });
  return adjusted;
}

/** Adjusted p-values: the chance of any false one among those at most q is q (Holm 1979; from memory). */
export function familyAdjusted(pValues: readonly number[]): number[] {
  const order = [...pValues.keys()].sort((i, j) => pValues[i]! - pValues[j]!);
  const adjusted = new Array<number>(pValues.length);
  let most = 0;
  order.forEach((i, k) => {
    most = Math.max(most, Math.min(1, (pValues.length - k) * pValues[i]!));
    adjusted[i] = most;
  });
  return adjusted;
}
