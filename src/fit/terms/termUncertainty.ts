import { type CholeskyFactor, choleskyFactor, choleskySolve } from '../../stats/index.js';
import type { ContrastEstimate } from '../intervals.js';
import type { DaySums } from './solveTerms.js';

/** What a standard error of any parameter is made of. */
export interface TermUncertainty {
  readonly sums: DaySums;
  readonly whole: CholeskyFactor;
  /** H - S_d: the information of all other days. */
  readonly others: readonly CholeskyFactor[];
}

/** Null when a day alone tells of some parameter, so that nothing can be said of its uncertainty. */
export function termUncertainty(sums: DaySums): TermUncertainty | null {
  const p = sums.scores[0]!.length;
  const H = Array.from({ length: p }, () => new Float64Array(p));
  for (const S of sums.information) {
    S.forEach((row, a) => {
      row.forEach((value, b) => {
        H[a]![b]! += value;
      });
    });
  }
  const whole = choleskyFactor(H);
  const others: CholeskyFactor[] = [];
  for (const S of sums.information) {
    const factor = choleskyFactor(H.map((row, a) => row.map((value, b) => value - S[a]![b]!)));
    if (factor === null) return null;
    others.push(factor);
  }
  return whole === null ? null : { sums, whole, others };
}

/**
 * CR3 standard error of one parameter and the Satterthwaite degrees of freedom of that variance under the working model
 * (Bell & McCaffrey 2002; Pustejovsky & Tipton 2018; from memory). CR3 needs no square roots of matrices: day d enters as
 * (H - S_d)^-1 g_d.
 */
export function parameterEstimate(
  { sums, whole, others }: TermUncertainty,
  theta: Float64Array,
  parameter: number,
): ContrastEstimate {
  const days = others.length;
  const contrast = theta.map((_, j) => Number(j === parameter));
  let variance = 0;
  let [trace, ownSquares, diagonalSquares] = [0, 0, 0];
  const BB = Array.from(theta, () => new Float64Array(theta.length));
  others.forEach((factor, d) => {
    const a = choleskySolve(factor, contrast);
    variance += product(a, sums.scores[d]!) ** 2;
    const b = times(sums.information[d]!, a);
    const own = product(b, choleskySolve(whole, b));
    const diagonal = product(a, b) - own;
    trace += diagonal;
    ownSquares += own ** 2;
    diagonalSquares += diagonal ** 2;
    b.forEach((left, i) => {
      b.forEach((right, j) => {
        BB[i]![j]! += left * right;
      });
    });
  });
  // Σ over all pairs of (b_d' M b_e)² is the trace of (M ΣBB')².
  const columns = BB.map((row) => choleskySolve(whole, row));
  let pairs = 0;
  columns.forEach((column, i) => {
    columns.forEach((_, j) => {
      pairs += column[j]! * columns[j]![i]!;
    });
  });
  const df = trace ** 2 / (pairs - ownSquares + diagonalSquares);
  return {
    value: theta[parameter]!,
    standardError: Math.sqrt(variance),
    degreesOfFreedom: Math.max(1, Math.min(df, days - 1)),
  };
}

const product = (a: Float64Array, b: Float64Array): number =>
  a.reduce((sum, value, i) => sum + value * b[i]!, 0);

const times = (m: readonly Float64Array[], v: Float64Array): Float64Array =>
  Float64Array.from(m, (row) => product(row, v));
