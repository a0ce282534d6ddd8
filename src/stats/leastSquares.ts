import { lengthFrom, solveTransposed, solveUpper, type Triangle, triangularize } from './householder.js';
import { dot } from './summation.js';

/** Result of a (weighted) linear least-squares fit. */
export interface LeastSquaresSolution {
  /** One coefficient a column, in the order of the columns. */
  readonly coefficients: Float64Array;
  /** Σ w (y − Xb)². */
  readonly residualSumOfSquares: number;
  /** (X'WX)⁻¹; times the residual variance it is the covariance of the coefficients. */
  readonly unscaledCovariance: number[][];
}

/** A column is, within rounding, a combination of the columns before it (or zero). */
export class RankDeficientError extends Error {
  override readonly name = 'RankDeficientError';
  /** Index of the first such column, from 0. */
  readonly columnIndex: number;

  constructor(columnIndex: number) {
    super(`column ${columnIndex} is a combination of the columns before it: leave it out or add other data`);
    this.columnIndex = columnIndex;
  }
}

/**
 * Smallest |R_kk| that counts as independent, the columns being scaled to a length of about 1: the sine of the angle
 * between a column and the space of those before it. Some 50 roundings: polynomials of degree 10 still pass.
 */
export const RANK_TOLERANCE = 1e-14;

function checkInput(
  columns: readonly Float64Array[],
  y: Float64Array,
  weights: Float64Array | undefined,
): void {
  const n = y.length;
  if (columns.length === 0) throw new RangeError('columns: expected at least one column, received none');
  columns.forEach((column, j) => {
    if (column.length !== n)
      throw new RangeError(`columns[${j}]: expected ${n} values as in y, received ${column.length}`);
  });
  if (n < columns.length)
    throw new RangeError(`y: expected at least ${columns.length} values for as many columns, received ${n}`);
  if (!weights) return;
  if (weights.length !== n)
    throw new RangeError(`weights: expected ${n} values as in y, received ${weights.length}`);
  const bad = weights.findIndex((w) => !(w >= 0 && w < Number.POSITIVE_INFINITY));
  if (bad >= 0)
    throw new RangeError(`weights[${bad}]: expected a finite number of at least 0, received ${weights[bad]}`);
}

/** √w · values / scale. A scale that is a power of 2 adds no rounding. */
function scaledCopy(
  values: Float64Array,
  rootWeights: Float64Array | undefined,
  scale: number,
): Float64Array {
  const copy = new Float64Array(values.length);
  if (rootWeights) for (let i = 0; i < copy.length; i += 1) copy[i] = (values[i]! * rootWeights[i]!) / scale;
  else for (let i = 0; i < copy.length; i += 1) copy[i] = values[i]! / scale;
  return copy;
}

/** The power of 2 nearest to the length of the weighted column. */
function scaleOf(column: Float64Array, rootWeights: Float64Array | undefined, j: number): number {
  const length = lengthFrom(rootWeights ? scaledCopy(column, rootWeights, 1) : column, 0);
  if (!Number.isFinite(length))
    throw new RangeError(`columns[${j}]: expected finite values, received others`);
  if (length === 0) throw new RankDeficientError(j);
  return 2 ** Math.round(Math.log2(length));
}

/**
 * Minimises Σ w (y − Xb)² by Householder QR; X is given by columns, each scaled to a length of about 1 first, so that
 * the units of the columns do not matter. One step of the corrected seminormal equations R'R db = X'(y − Xb) follows
 * (Björck 1987, Linear Algebra Appl. 88/89), its right-hand side a compensated sum: large residuals then cost no
 * digits. Weights default to 1; 0 leaves a row out. Inputs are not changed; n rows and p columns cost about 2np²
 * operations and no memory per row beyond a copy of the columns.
 * @throws RankDeficientError when a column depends on those before it (|R_kk| < RANK_TOLERANCE).
 * @throws RangeError for unequal lengths, fewer rows than columns, values that are not finite, negative weights.
 */
export function leastSquares(
  columns: readonly Float64Array[],
  y: Float64Array,
  weights?: Float64Array,
): LeastSquaresSolution {
  checkInput(columns, y, weights);
  const rootWeights = weights?.map(Math.sqrt);
  const scales = columns.map((column, j) => scaleOf(column, rootWeights, j));
  const right = scaledCopy(y, rootWeights, 1);
  if (!Number.isFinite(lengthFrom(right, 0)))
    throw new RangeError('y: expected finite values, received others');

  const work = columns.map((column, j) => scaledCopy(column, rootWeights, scales[j]!));
  const triangle = triangularize(work, right, RANK_TOLERANCE);
  if (typeof triangle === 'number') throw new RankDeficientError(triangle);
  const solution = solveUpper(triangle, right);

  const residuals = scaledCopy(y, rootWeights, 1);
  columns.forEach((column, j) => {
    const coefficient = solution[j]!;
    const x = scaledCopy(column, rootWeights, scales[j]!);
    for (let i = 0; i < x.length; i += 1) residuals[i]! -= coefficient * x[i]!;
  });
  const gradient = Float64Array.from(columns, (column, j) =>
    dot(scaledCopy(column, rootWeights, scales[j]!), residuals),
  );
  const correction = solveUpper(triangle, solveTransposed(triangle, gradient));

  return {
    coefficients: solution.map((value, j) => (value + correction[j]!) / scales[j]!),
    residualSumOfSquares: lengthFrom(right, columns.length) ** 2,
    unscaledCovariance: unscaledCovarianceOf(triangle, scales),
  };
}

/** R⁻¹R⁻ᵀ in the units of the columns. */
function unscaledCovarianceOf(triangle: Triangle, scales: readonly number[]): number[][] {
  const rows = scales.map((_, j) => {
    const unit = new Float64Array(scales.length);
    unit[j] = 1;
    return solveTransposed(triangle, unit);
  });
  return rows.map((row, i) =>
    rows.map(
      (other, j) => row.reduce((total, value, m) => total + value * other[m]!, 0) / (scales[i]! * scales[j]!),
    ),
  );
}
