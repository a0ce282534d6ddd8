import { betaQuantile } from '../../stats/index.js';

/** Share of occupations that are wrong fixes, with an interval that counts days. */
export interface WrongFixShare {
  /** Runs of suspected occupations that follow one another on one day and rover. */
  readonly events: number;
  readonly estimate: number;
  readonly low: number;
  readonly high: number;
  /** By how much wrong fixes crowd on days: variance over that of independent ones. */
  readonly designEffect: number;
}

/**
 * Mean responsibility with the Clopper-Pearson interval at the effective number of occupations (Korn & Graubard 1998,
 * from memory), the variance taken between days.
 */
export function clusteredShare(
  responsibilities: Float64Array,
  dayOf: Int32Array,
  days: number,
  confidence: number,
): Omit<WrongFixShare, 'events'> {
  const n = responsibilities.length;
  const [counts, sums] = [new Float64Array(days), new Float64Array(days)];
  let total = 0;
  for (let i = 0; i < n; i++) {
    counts[dayOf[i]!]! += 1;
    sums[dayOf[i]!]! += responsibilities[i]!;
    total += responsibilities[i]!;
  }
  const estimate = total / n;
  let designEffect = 1;
  if (estimate > 1e-4 && days > 1) {
    const squares = sums.reduce((sum, value, d) => sum + (value - estimate * counts[d]!) ** 2, 0);
    const variance = ((days / (days - 1)) * squares) / n ** 2;
    designEffect = Math.max(1, (variance * n) / (estimate * (1 - estimate)));
  }
  const effective = n / designEffect;
  const x = estimate * effective;
  const tail = (1 - confidence) / 2;
  return {
    estimate,
    low: x > 0 ? betaQuantile(tail, x, effective - x + 1) : 0,
    high: x < effective ? betaQuantile(1 - tail, x + 1, effective - x) : 1,
    designEffect,
  };
}
