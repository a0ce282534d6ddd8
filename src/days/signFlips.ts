import type { Random } from '../stats/index.js';

const FLIPS = 9999;
/** Up to so many groups every pattern of signs is gone through. */
const MOST_ENUMERATED = 12;
const TIES = 1e-12;
/** A column that is this small a share of itself after the others are taken out says nothing new. */
const DEPENDENT = 1e-10;

export interface SignFlipTest {
  /** s′ C⁻¹ s, s the sum of the scores over groups and C the sum of their squares. */
  readonly statistic: number;
  readonly pValue: number;
}

/**
 * Test that scores of independent groups have mean 0: their signs are flipped at random, which keeps whatever
 * dependence there is within a group (Hemerik, Goeman & Finos 2020; from memory).
 * @param scores one array a score, each with one value a group
 * @param random not called when all patterns are gone through
 */
export function signFlipTest(scores: readonly Float64Array[], random: Random): SignFlipTest {
  const groups = scores[0]!.length;
  // With an orthonormal basis of the scores the statistic is a sum of squares.
  const basis = orthonormal(scores);
  const statisticOf = (sign: (d: number) => number): number => {
    const sums = new Float64Array(basis.length);
    for (let d = 0; d < groups; d++) {
      const s = sign(d);
      for (let c = 0; c < basis.length; c++) sums[c]! += s * basis[c]![d]!;
    }
    return sums.reduce((total, value) => total + value * value, 0);
  };
  const statistic = statisticOf(() => 1);
  const reaches = (value: number): boolean => value >= statistic - TIES;
  let reached = 0;
  if (groups <= MOST_ENUMERATED) {
    const patterns = 2 ** groups;
    for (let pattern = 0; pattern < patterns; pattern++) {
      if (reaches(statisticOf((d) => (pattern & (1 << d) ? -1 : 1)))) reached += 1;
    }
    return { statistic, pValue: reached / patterns };
  }
  for (let k = 0; k < FLIPS; k++) {
    if (reaches(statisticOf(() => (random() < 0.5 ? -1 : 1)))) reached += 1;
  }
  return { statistic, pValue: (1 + reached) / (FLIPS + 1) };
}

/** Gram-Schmidt, twice for the sake of rounding; dependent columns are left out. */
function orthonormal(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const rest = Float64Array.from(column);
    const size = norm(rest);
    for (const unit of [...basis, ...basis]) {
      const along = rest.reduce((sum, value, d) => sum + value * unit[d]!, 0);
      for (let d = 0; d < rest.length; d++) rest[d]! -= along * unit[d]!;
    }
    const left = norm(rest);
    if (left > DEPENDENT * size) basis.push(rest.map((value) => value / left));
  }
  return basis;
}

const norm = (values: Float64Array): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0));
