import { type SignFlipTest, signFlipTest } from '../fit/index.js';
import type { Random } from '../stats/index.js';

const FLIPS = 9999;
/** A column that is this small a share of itself after the others are taken out says nothing new. */
const DEPENDENT = 1e-10;

/**
 * Test that several scores of independent days have mean 0, by flipped signs of days. Statistic: s′ C⁻¹ s, s the sum of
 * the scores over days and C the sum of their squares.
 * @param scores one array a score, each with one value a day
 * @param random not called when the days are so few that all patterns are gone through
 */
export function flippedScores(scores: readonly Float64Array[], random: Random): SignFlipTest {
  // With an orthonormal basis of the scores the statistic is a sum of squares.
  const basis = orthonormal(scores);
  const statistic = (signs: Float64Array): number => {
    let total = 0;
    for (const column of basis) {
      let along = 0;
      for (let d = 0; d < signs.length; d++) along += signs[d]! * column[d]!;
      total += along * along;
    }
    return total;
  };
  return signFlipTest(scores[0]!.length, statistic, FLIPS, random);
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
