import { requireRange } from './check.js';

/** The lower triangle L of a positive definite matrix, L L' = m, row by row. */
export type CholeskyFactor = readonly Float64Array[];

/** Below this part of its diagonal a pivot is rounding. */
const PIVOT_TOLERANCE = 1e-13;

/**
 * Factor of a symmetric positive definite matrix (Golub & Van Loan, from memory); null when it is not definite to within
 * a rounding.
 * @param m rows; only the lower triangle is read
 */
export function choleskyFactor(m: readonly ArrayLike<number>[]): CholeskyFactor | null {
  const n = m.length;
  const factor = Array.from({ length: n }, () => new Float64Array(n));
  for (let j = 0; j < n; j++) {
    for (let i = j; i < n; i++) {
      let sum = m[i]![j]!;
      for (let k = 0; k < j; k++) sum -= factor[i]![k]! * factor[j]![k]!;
      if (i > j) factor[i]![j] = sum / factor[j]![j]!;
      else if (sum > PIVOT_TOLERANCE * m[j]![j]!) factor[j]![j] = Math.sqrt(sum);
      else return null;
    }
  }
  return factor;
}

/**
 * Solves m x = b with the factor of m.
 * @throws RangeError when b has another length
 */
export function choleskySolve(factor: CholeskyFactor, b: ArrayLike<number>): Float64Array {
  const n = factor.length;
  requireRange(b.length === n, 'b.length', String(n), b.length);
  const x = Float64Array.from(b);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) x[i]! -= factor[i]![k]! * x[k]!;
    x[i]! /= factor[i]![i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) x[i]! -= factor[k]![i]! * x[k]!;
    x[i]! /= factor[i]![i]!;
  }
  return x;
}
