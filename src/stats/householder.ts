/**
 * Householder QR of a matrix held by columns, in place (Golub & Van Loan, "Matrix Computations", ch. 5). Row k of R
 * stands at `columns[j][k]` for j > k, its diagonal in `diagonal`; reflector k stands in column k from row k on.
 */
export interface Triangle {
  readonly columns: readonly Float64Array[];
  readonly diagonal: Float64Array;
}

/** Euclidean length of the values from `from` on. */
export function lengthFrom(values: Float64Array, from: number): number {
  let sum = 0;
  for (let i = from; i < values.length; i += 1) sum += values[i]! * values[i]!;
  return Math.sqrt(sum);
}

/** Applies I − vv'/half, v being `reflector` from `from` on and half = v'v/2. */
function reflect(target: Float64Array, reflector: Float64Array, from: number, half: number): void {
  let product = 0;
  for (let i = from; i < target.length; i += 1) product += reflector[i]! * target[i]!;
  const factor = product / half;
  for (let i = from; i < target.length; i += 1) target[i]! -= factor * reflector[i]!;
}

/**
 * Turns `columns` into reflectors and R, and `right` into Q'·right; both are overwritten.
 * @returns the triangle, or the index of the first column whose |R_kk| is below `tolerance`.
 */
export function triangularize(
  columns: Float64Array[],
  right: Float64Array,
  tolerance: number,
): Triangle | number {
  const p = columns.length;
  const diagonal = new Float64Array(p);
  for (let k = 0; k < p; k += 1) {
    const column = columns[k]!;
    const norm = lengthFrom(column, k);
    if (norm < tolerance) return k;
    const head = column[k]!;
    // opposite sign, so that the reflector's head does not cancel
    diagonal[k] = head > 0 ? -norm : norm;
    column[k] = head - diagonal[k]!;
    const half = norm * (norm + Math.abs(head));
    for (let j = k + 1; j < p; j += 1) reflect(columns[j]!, column, k, half);
    reflect(right, column, k, half);
  }
  return { columns, diagonal };
}

/** Solves R x = b; only the first values of b, as many as R has rows, are read. */
export function solveUpper({ columns, diagonal }: Triangle, b: Float64Array): Float64Array {
  const x = new Float64Array(diagonal.length);
  for (let k = x.length - 1; k >= 0; k -= 1) {
    let rest = b[k]!;
    for (let j = k + 1; j < x.length; j += 1) rest -= columns[j]![k]! * x[j]!;
    x[k] = rest / diagonal[k]!;
  }
  return x;
}

/** Solves R' x = b. */
export function solveTransposed({ columns, diagonal }: Triangle, b: Float64Array): Float64Array {
  const x = new Float64Array(diagonal.length);
  for (let k = 0; k < x.length; k += 1) {
    let rest = b[k]!;
    for (let j = 0; j < k; j += 1) rest -= columns[k]![j]! * x[j]!;
    x[k] = rest / diagonal[k]!;
  }
  return x;
}
