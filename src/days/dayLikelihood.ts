import type { FitData } from '../fit/index.js';
import { DAY_COMBOS, dayPrior, priorSupport, THETAS } from './dayGrid.js';
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

/** What the likelihoods of all days say of the combos. */
export interface ComboFit {
  /** Probability of each combo; they sum to 1. */
  readonly weights: Float64Array;
  /** Likelihood of each day under each combo: combos × days. */
  readonly marginals: Float64Array;
}

/** @param likelihood relative likelihoods, days × thetas */
export function comboFit(likelihood: Float64Array): ComboFit {
  const prior = dayPrior();
  const thetas = THETAS.length;
  const days = likelihood.length / thetas;
  const marginals = new Float64Array(DAY_COMBOS.length * days);
  const logs = new Float64Array(DAY_COMBOS.length);
  const { first, end } = priorSupport();
  for (let j = 0; j < DAY_COMBOS.length; j++) {
    const from = j * thetas;
    const [low, high] = [first[j]!, end[j]!];
    let sumOfLogs = 0;
    const settle = (d: number, total: number): void => {
      // A combo that makes a day impossible keeps a finite logarithm.
      marginals[j * days + d] = total + 1e-300;
      sumOfLogs += Math.log(total + 1e-300);
    };
    let d = 0;
    // Four days at a time: one sum alone waits for each of its additions.
    for (; d + 4 <= days; d += 4) {
      const at = d * thetas;
      let [t0, t1, t2, t3] = [0, 0, 0, 0];
      for (let k = low; k < high; k++) {
        const p = prior[from + k]!;
        t0 += p * likelihood[at + k]!;
        t1 += p * likelihood[at + thetas + k]!;
        t2 += p * likelihood[at + 2 * thetas + k]!;
        t3 += p * likelihood[at + 3 * thetas + k]!;
      }
      settle(d, t0);
      settle(d + 1, t1);
      settle(d + 2, t2);
      settle(d + 3, t3);
    }
    for (; d < days; d++) {
      let total = 0;
      for (let k = low; k < high; k++) total += prior[from + k]! * likelihood[d * thetas + k]!;
      settle(d, total);
    }
    logs[j] = sumOfLogs;
  }
  const best = logs.reduce((a, b) => Math.max(a, b));
  const weights = logs.map((value, j) => Math.exp(value - best) * DAY_COMBOS[j]!.width);
  const total = weights.reduce((a, b) => a + b);
  return { weights: weights.map((weight) => weight / total), marginals };
}
