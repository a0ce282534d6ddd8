import { choleskyFactor, choleskySolve } from '../../stats/index.js';
import type { TermDesign } from './termData.js';

export interface TermSolution {
  /** Parameters of the additive columns (mm², ppm², …), then powers of the multipliers. */
  readonly theta: Float64Array;
  readonly converged: boolean;
}

/** Information and score of each day, row by row of a p × p matrix; for the cluster-robust covariance. */
export interface DaySums {
  readonly information: readonly Float64Array[][];
  readonly scores: readonly Float64Array[];
}

const MAX_ITERATIONS = 200;
const MAX_HALVINGS = 40;
const TOLERANCE = 1e-10;
/** Of the mean square: σ² before multipliers stays above it. */
const FLOOR = 1e-3;

/**
 * Solves Σ w ∂μ/∂θ (y - μ)/μ² = 0 for μ = (Σ θ_a x_a) exp(2 Σ k z) by Fisher scoring; a step is halved until μ is positive
 * everywhere and Q = Σ w (log μ + y/μ) does not rise.
 * @param start a point at which μ is positive
 * @param without number of a day to leave out; -1 for none
 * @returns null when the columns cannot be told apart
 */
export function solveTerms(design: TermDesign, start: Float64Array, without = -1): TermSolution | null {
  const rows = [...design.y.keys()].filter((i) => design.dayOf[i] !== without && design.w[i]! > 0);
  const kept = Int32Array.from(rows);
  let [total, weight] = [0, 0];
  for (const i of kept) {
    total += design.w[i]! * design.y[i]!;
    weight += design.w[i]!;
  }
  const floor = (FLOOR * total) / weight;
  let theta = Float64Array.from(start);
  let quality = objective(design, theta, kept, floor);
  for (let iteration = 0; iteration < MAX_ITERATIONS; iteration++) {
    const { information, score } = sums(design, theta, kept);
    const factor = choleskyFactor(information);
    if (factor === null) return null;
    const step = choleskySolve(factor, score);
    // In standard errors of a single shot, so that parameters of all units count alike.
    const sizes = step.map((value, j) => Math.abs(value) * Math.sqrt(information[j]![j]! / weight));
    if (Math.max(...sizes) < TOLERANCE) return { theta, converged: true };
    let next = theta;
    let reached = Number.POSITIVE_INFINITY;
    let part = 1;
    for (let h = 0; h < MAX_HALVINGS; h++, part /= 2) {
      next = theta.map((value, j) => value + part * step[j]!);
      reached = objective(design, next, kept, floor);
      if (reached <= quality + 1e-13 * Math.abs(quality)) break;
    }
    [theta, quality] = [next, reached];
  }
  return { theta, converged: false };
}

/** μ of a row. */
export function varianceAt(design: TermDesign, theta: Float64Array, i: number): number {
  return additivePart(design, theta, i) * multiplier(design, theta, i);
}

function additivePart({ additive }: TermDesign, theta: Float64Array, i: number): number {
  let eta = 0;
  for (let a = 0; a < additive.length; a++) eta += theta[a]! * additive[a]![i]!;
  return eta;
}

function multiplier({ additive, multipliers }: TermDesign, theta: Float64Array, i: number): number {
  let power = 0;
  for (let m = 0; m < multipliers.length; m++) power += theta[additive.length + m]! * multipliers[m]![i]!;
  return power === 0 ? 1 : Math.exp(2 * power);
}

/** Q; infinite where μ falls below the floor anywhere. */
function objective(design: TermDesign, theta: Float64Array, rows: Int32Array, floor: number): number {
  let sum = 0;
  for (const i of rows) {
    const eta = additivePart(design, theta, i);
    if (!(eta > floor)) return Number.POSITIVE_INFINITY;
    const mu = eta * multiplier(design, theta, i);
    sum += design.w[i]! * (Math.log(mu) + design.y[i]! / mu);
  }
  return sum;
}

/** Fills ∂ log μ/∂θ of a row. */
function gradient(design: TermDesign, theta: Float64Array, i: number, into: Float64Array): void {
  const { additive, multipliers } = design;
  const eta = additivePart(design, theta, i);
  for (let a = 0; a < additive.length; a++) into[a] = additive[a]![i]! / eta;
  for (let m = 0; m < multipliers.length; m++) into[additive.length + m] = 2 * multipliers[m]![i]!;
}

const square = (p: number): Float64Array[] => Array.from({ length: p }, () => new Float64Array(p));

/** Σ w J J' and Σ w J (y/μ - 1), J = ∂ log μ/∂θ. */
function sums(design: TermDesign, theta: Float64Array, rows: Int32Array) {
  const information = square(theta.length);
  const score = new Float64Array(theta.length);
  const J = new Float64Array(theta.length);
  for (const i of rows) addRow(design, theta, i, J, information, score);
  return { information, score };
}

function addRow(
  design: TermDesign,
  theta: Float64Array,
  i: number,
  J: Float64Array,
  information: Float64Array[],
  score: Float64Array,
): void {
  gradient(design, theta, i, J);
  const w = design.w[i]!;
  const excess = w * (design.y[i]! / varianceAt(design, theta, i) - 1);
  for (let a = 0; a < J.length; a++) {
    score[a]! += excess * J[a]!;
    for (let b = 0; b < J.length; b++) information[a]![b]! += w * J[a]! * J[b]!;
  }
}

/** The same sums for each day by itself. */
export function daySums(design: TermDesign, theta: Float64Array): DaySums {
  const information = design.dayNames.map(() => square(theta.length));
  const scores = design.dayNames.map(() => new Float64Array(theta.length));
  const J = new Float64Array(theta.length);
  for (let i = 0; i < design.y.length; i++) {
    const d = design.dayOf[i]!;
    addRow(design, theta, i, J, information[d]!, scores[d]!);
  }
  return { information, scores };
}
