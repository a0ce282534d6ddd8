import type { FitData } from '../fit/index.js';
import { THETAS } from './dayGrid.js';
import { type DayIndex, dayIndex, rowsWithinDays } from './dayIndex.js';

/**
 * Rows of one day and one length: the likelihood needs their number and their sum of squares alone. Logs repeat a few
 * marks over and over, so there are few cells.
 */
export interface DayCells extends DayIndex {
  /** Cells of day d are those from starts[d] to starts[d + 1]. */
  readonly starts: Int32Array;
  readonly l: Float64Array;
  /** Σ w and Σ w y of each cell. */
  readonly weights: Float64Array;
  readonly squares: Float64Array;
  /** Axes in a row: a radial square has two degrees of freedom. */
  readonly axes: number;
}

export function dayCells({ y, l, w, day, components }: FitData): DayCells {
  const index = dayIndex(day);
  const { dayOf, days } = index;
  const starts = new Int32Array(days.length + 1);
  const [lengths, weights, squares]: number[][] = [[], [], []];
  let last = -1;
  for (const i of rowsWithinDays(index, l)) {
    const opens = last < 0 || dayOf[i] !== dayOf[last] || l[i] !== l[last];
    if (opens) {
      lengths!.push(l[i]!);
      weights!.push(0);
      squares!.push(0);
    }
    const cell = lengths!.length - 1;
    weights![cell]! += w[i]!;
    squares![cell]! += w[i]! * y[i]!;
    starts[dayOf[i]! + 1] = cell + 1;
    last = i;
  }
  return {
    ...index,
    starts,
    l: Float64Array.from(lengths!),
    weights: Float64Array.from(weights!),
    squares: Float64Array.from(squares!),
    axes: components.length,
  };
}

/**
 * Tempered log likelihood -κ/2 Σ w (log μ + y/μ), μ = A + B e^2θ l, of every day at every θ; days × thetas. The square
 * of a radial error counts twice.
 * @param tempering κ, the effective share of the shots
 */
export function dayLogLikelihood(cells: DayCells, A: number, B: number, tempering: number): Float64Array {
  const { starts, l, weights, squares, axes, days } = cells;
  const table = new Float64Array(days.length * THETAS.length);
  for (let k = 0; k < THETAS.length; k++) {
    const slope = B * Math.exp(2 * THETAS[k]!);
    for (let d = 0; d < days.length; d++) {
      let total = 0;
      for (let c = starts[d]!; c < starts[d + 1]!; c++) {
        const mu = A + slope * l[c]!;
        total += weights[c]! * Math.log(mu) + squares[c]! / mu;
      }
      table[d * THETAS.length + k] = -0.5 * tempering * axes * total;
    }
  }
  return table;
}

/** Likelihood of every day at every θ against the best θ of that day. */
export function relativeLikelihood(logLikelihood: Float64Array): Float64Array {
  const table = new Float64Array(logLikelihood.length);
  for (let at = 0; at < table.length; at += THETAS.length) {
    const row = logLikelihood.subarray(at, at + THETAS.length);
    const best = row.reduce((a, b) => Math.max(a, b));
    for (let k = 0; k < THETAS.length; k++) table[at + k] = Math.exp(row[k]! - best);
  }
  return table;
}
