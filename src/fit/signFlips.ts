import type { Random } from '../stats/index.js';

/** Share of sign patterns over days that give a statistic at least as large as the one observed. */
export interface SignFlipTest {
  readonly statistic: number;
  readonly pValue: number;
  /** Sign patterns tried; all of them where the days are few. */
  readonly flips: number;
  readonly exact: boolean;
}

/**
 * Test by sign flips of whole days, which keeps what the shots of a day share (Hemerik, Goeman & Finos 2020; from
 * memory). Where all patterns are no more than the wanted number, all are tried.
 * @param statistic of signs, one for each day
 * @param flips random patterns, drawn only where not all are tried
 */
export function signFlipTest(
  days: number,
  statistic: (signs: Float64Array) => number,
  flips: number,
  random: Random,
): SignFlipTest {
  const signs = new Float64Array(days).fill(1);
  const observed = statistic(signs);
  // Patterns that give the same value but for rounding count as equal.
  const reached = (): boolean => statistic(signs) >= observed - 1e-12 * Math.max(1, Math.abs(observed));
  const patterns = 2 ** days;
  let count = 0;
  if (patterns <= flips + 1) {
    for (let pattern = 0; pattern < patterns; pattern++) {
      for (let d = 0; d < days; d++) signs[d] = (pattern >> d) & 1 ? -1 : 1;
      if (reached()) count += 1;
    }
    return { statistic: observed, pValue: count / patterns, flips: patterns, exact: true };
  }
  for (let k = 0; k < flips; k++) {
    for (let d = 0; d < days; d++) signs[d] = random() < 0.5 ? -1 : 1;
    if (reached()) count += 1;
  }
  return { statistic: observed, pValue: (1 + count) / (flips + 1), flips, exact: false };
}
