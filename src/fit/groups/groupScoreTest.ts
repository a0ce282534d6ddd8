import type { Random } from '../../stats/index.js';
import type { SquaredErrors } from '../scoring.js';
import { type SignFlipTest, signFlipTest } from '../signFlips.js';

/** Squared errors with the day and the group of each. */
export interface GroupedErrors extends SquaredErrors {
  readonly day: readonly string[];
  readonly group: readonly string[];
}

/** A day's factor is drawn to 1 as if by so many shots, and kept within these bounds. */
const PRIOR_SHOTS = 8;
const FACTOR_BOUNDS = [0.15, 50] as const;

/**
 * Tests whether groups share one constant and one ppm. For each group but the first the scores of an own constant and an
 * own ppm, freed of the common ones, are summed by day; the quadratic form of their sums is compared with that of the days
 * under random signs. Each day's ppm is first freed of its own factor, so that a day which was bad for everybody does not
 * count as a difference.
 * @param common a² and b² of all groups together, mm² and ppm²
 * @returns null when the days are fewer than three for each of the compared quantities
 */
export function groupScoreTest(
  errors: GroupedErrors,
  common: { readonly p: number; readonly q: number },
  flips: number,
  random: Random,
): SignFlipTest | null {
  const days = [...new Set(errors.day)].sort();
  const basis = orthonormal(dayScores(errors, common, days));
  if (basis.length === 0 || days.length < 3 * basis.length) return null;
  const statistic = (signs: Float64Array): number =>
    basis.reduce((sum, column) => sum + inner(column, signs) ** 2, 0);
  return signFlipTest(days.length, statistic, flips, random);
}

/** One column for each group but the first and each of its two terms, one entry a day. */
function dayScores(
  { y, l, w, day, group }: GroupedErrors,
  { p: A, q: B }: { readonly p: number; readonly q: number },
  days: readonly string[],
): Float64Array[] {
  const dayIndex = new Map(days.map((name, d) => [name, d]));
  const dayOf = Int32Array.from(day, (name) => dayIndex.get(name)!);
  const groups = [...new Set(group)].sort();
  const groupIndex = new Map(groups.map((name, g) => [name, g]));
  const groupOf = Int32Array.from(group, (name) => groupIndex.get(name)!);
  const factor = dayFactors({ y, l, w }, dayOf, days.length, A, B);
  const columns = 2 * groups.length;
  const score = Array.from({ length: columns }, () => new Float64Array(days.length));
  // Information of each group: Σ v, Σ v x, Σ v x².
  const information = groups.map(() => [0, 0, 0] as [number, number, number]);
  for (let i = 0; i < y.length; i++) {
    const x = factor[dayOf[i]!]! * l[i]!;
    const mu = A + B * x;
    const v = w[i]! / mu ** 2;
    const g = groupOf[i]!;
    score[2 * g]![dayOf[i]!]! += v * (y[i]! - mu);
    score[2 * g + 1]![dayOf[i]!]! += v * (y[i]! - mu) * x;
    information[g]![0] += v;
    information[g]![1] += v * x;
    information[g]![2] += v * x * x;
  }
  const total = [0, 1, 2].map((k) => information.reduce((sum, each) => sum + each[k]!, 0));
  const [t0, t1, t2] = total as [number, number, number];
  const determinant = t0 * t2 - t1 * t1;
  const all = [0, 1].map((k) =>
    Float64Array.from(days, (_, d) => groups.reduce((sum, _g, g) => sum + score[2 * g + k]![d]!, 0)),
  ) as [Float64Array, Float64Array];
  return groups.slice(1).flatMap((_, k) => {
    const g = k + 1;
    const [s0, s1, s2] = information[g]!;
    return [
      [s0, s1],
      [s1, s2],
    ].map(([c0, c1], term) => {
      // What of this score the common constant and ppm take up: H_zx H_xx^-1.
      const a = (c0! * t2 - c1! * t1) / determinant;
      const b = (c1! * t0 - c0! * t1) / determinant;
      return score[2 * g + term]!.map((value, d) => value - a * all[0][d]! - b * all[1][d]!);
    });
  });
}

function dayFactors(
  { y, l, w }: SquaredErrors,
  dayOf: Int32Array,
  days: number,
  A: number,
  B: number,
): Float64Array {
  const top = new Float64Array(days);
  const bottom = new Float64Array(days);
  if (B > 0) {
    for (let i = 0; i < y.length; i++) {
      const distance = B * l[i]!;
      const share = (distance / (A + distance)) ** 2;
      top[dayOf[i]!]! += (w[i]! * share * (y[i]! - A)) / distance;
      bottom[dayOf[i]!]! += w[i]! * share;
    }
  }
  return top.map((value, d) => {
    const factor = (PRIOR_SHOTS + 0.5 * value) / (PRIOR_SHOTS + 0.5 * bottom[d]!);
    return Math.min(FACTOR_BOUNDS[1], Math.max(FACTOR_BOUNDS[0], factor));
  });
}

const inner = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
};

/** Modified Gram-Schmidt, twice for accuracy; columns that depend on earlier ones are left out. */
function orthonormal(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const length = Math.sqrt(inner(column, column));
    let rest = column;
    for (let pass = 0; pass < 2; pass++) {
      for (const unit of basis) {
        const along = inner(rest, unit);
        rest = rest.map((value, i) => value - along * unit[i]!);
      }
    }
    const left = Math.sqrt(inner(rest, rest));
    if (left > 1e-8 * length) basis.push(rest.map((value) => value / left));
  }
  return basis;
}
