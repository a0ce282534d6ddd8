import type { Results } from '../study/index.js';

/**
 * The rows of a card up to where its farthest rule reaches, or the data where no rule holds: a crew takes a row beyond as
 * leave to go there.
 */
export function withinReach<T extends { readonly baselineKm: number }>(
  { rules }: Results,
  rows: readonly T[],
): T[] {
  const reach = Math.max(0, ...rules.map(({ maximumBaselineKm }) => maximumBaselineKm ?? 0));
  const supported = Math.max(0, ...rules.map(({ longestSupportedKm }) => longestSupportedKm ?? 0));
  const lastKm = reach || supported || Number.POSITIVE_INFINITY;
  return rows.filter(({ baselineKm }) => tenths(baselineKm) <= tenths(lastKm));
}

/** As it is read, rounded down. */
const tenths = (km: number): number => Math.floor(10 * km + 1e-9);
