import { chiSquareCdf, chiSquareQuantile, median } from '../../stats/index.js';
import { startWithoutTails, weightedSteps } from './longRunFit.js';

/** Errors to be screened, in an order that does not depend on the order of rows. */
export interface MixtureData {
  /** Errors of east, north and up, mm; NaN for what is not known. Every row knows at least one. */
  readonly errors: readonly Float64Array[];
  /** Squared length, km². */
  readonly l: Float64Array;
  /** Number of the day of each row, from 0. */
  readonly dayOf: Int32Array;
  readonly days: number;
}

export interface Mixture {
  /** Probability of each row to be a wrong fix. */
  readonly responsibilities: Float64Array;
  /** Share of wrong fixes in the mixture, kept within [1e-5, 0.2]. */
  readonly share: number;
  /** A (mm²) and B (ppm²) of ordinary errors of each component; null for a component that no row knows. */
  readonly ordinary: readonly ({ readonly A: number; readonly B: number } | null)[];
  /** Standard deviation of wrong fixes along each axis, mm. */
  readonly wrongSigmaMm: number;
  readonly iterations: number;
  readonly converged: boolean;
}

const MAX_ITERATIONS = 500;
const EARLIEST_STOP = 6;
const TOLERANCE = 1e-8;
/** From here on a day factor moves half way only: without it some campaigns end in a cycle of two. */
const AVERAGE_FROM = 10;
const [SHARE_START, SHARE_LEAST, SHARE_MOST] = [0.01, 1e-5, 0.2];
/** Weight of the prior factor 1 of a day, and of a shot that tells of distance alone. */
const [PRIOR_WEIGHT, SHOT_WEIGHT] = [6, 0.3];
const [FACTOR_LEAST, FACTOR_MOST] = [0.1, 50];
const LEAST_WRONG_MM = 50;
/** Below this squared distance no error is called wrong, by the number of components that are known. */
const GUARD = [
  Number.POSITIVE_INFINITY,
  9,
  ...[2, 3].map((components) => chiSquareQuantile(0.9973, components)),
];
/** Mean of min(z², 6.25) of a Gaussian error. */
const BOUNDED_MEAN = chiSquareCdf(6.25, 3) + 6.25 * (1 - chiSquareCdf(6.25, 1));

/**
 * Mixture of ordinary errors N(0, A + B f l) of each component, f a factor of the day, and wrong fixes N(0, τ²) of all
 * components together, by expectation-maximisation (Dempster, Laird & Rubin 1977; Aitkin & Wilson 1980; from memory). A
 * wrong fix is a vector: an occupation has one responsibility. The day factor keeps a disturbed day from being taken for
 * wrong fixes; A and B stay those of the long run. Errors within the guard are never called wrong.
 */
export function fitMixture({ errors, l, dayOf, days }: MixtureData): Mixture {
  const n = l.length;
  const lMean = l.reduce((sum, value) => sum + value, 0) / n;
  const x = l.map((value) => value / lMean);
  const squares = errors.map((column) => column.map((value) => value * value));
  const known = [0, 1, 2].filter((c) => squares[c]!.some((value) => !Number.isNaN(value)));
  const filled = squares.map((column) => column.map((value) => (Number.isNaN(value) ? 0 : value)));
  const scales = known.map((c) => typicalSize(errors[c]!));
  const largest = Math.max(...scales);
  const leastVariance = Math.max(LEAST_WRONG_MM, (10 * largest) / Math.sqrt(known.length)) ** 2;

  // On x = l / mean, so that A and B are of one size.
  const [A, B] = [new Float64Array(3), new Float64Array(3)];
  known.forEach((c, k) => {
    [A[c], B[c]] = startWithoutTails(squares[c]!, x, scales[k]!, BOUNDED_MEAN);
  });
  const factors = [0, 1, 2].map(() => new Float64Array(days).fill(1));
  const responsibilities = new Float64Array(n);
  const w = new Float64Array(n);
  let share = SHARE_START;
  let variance = Math.max(100, 10 * largest) ** 2;
  let converged = false;
  let iterations = 0;
  while (iterations < MAX_ITERATIONS && !converged) {
    iterations += 1;
    const sums = expect({ squares, known, x, dayOf, A, B, factors, share, variance }, responsibilities);
    for (let i = 0; i < n; i++) w[i] = 1 - responsibilities[i]!;
    const old = [share, ...known.flatMap((c) => [A[c]!, B[c]! / lMean])];
    share = Math.min(Math.max(sums.total / n, SHARE_LEAST), SHARE_MOST);
    variance = Math.max(sums.squares / Math.max(sums.components, 1e-9), leastVariance);
    for (const c of known) {
      [A[c], B[c]] = weightedSteps(filled[c]!, x, weightsOf(squares[c]!, w), [A[c]!, B[c]!], lMean);
      moveFactors(squares[c]!, x, w, dayOf, A[c]!, B[c]!, factors[c]!, iterations >= AVERAGE_FROM);
    }
    const now = [share, ...known.flatMap((c) => [A[c]!, B[c]! / lMean])];
    const change = now.map((value, k) => Math.abs(value - old[k]!) / (Math.abs(value) + 1e-6));
    converged = iterations >= EARLIEST_STOP && Math.max(...change) < TOLERANCE;
  }
  return {
    responsibilities,
    share,
    ordinary: [0, 1, 2].map((c) => (known.includes(c) ? { A: A[c]!, B: B[c]! / lMean } : null)),
    wrongSigmaMm: Math.sqrt(variance),
    iterations,
    converged,
  };
}

/** Weights that are 0 where the error is not known. */
const weightsOf = (squares: Float64Array, w: Float64Array): Float64Array =>
  w.map((weight, i) => (Number.isNaN(squares[i]!) ? 0 : weight));

/** Median size over that of a standard Gaussian error; the root mean square where more than half are 0. */
function typicalSize(errors: Float64Array): number {
  const sizes = errors.filter((value) => !Number.isNaN(value)).map(Math.abs);
  const robust = median(sizes) / 0.6745;
  if (robust > 0) return robust;
  return Math.sqrt(sizes.reduce((sum, value) => sum + value * value, 0) / sizes.length);
}

interface State {
  readonly squares: readonly Float64Array[];
  readonly known: readonly number[];
  readonly x: Float64Array;
  readonly dayOf: Int32Array;
  readonly A: Float64Array;
  readonly B: Float64Array;
  readonly factors: readonly Float64Array[];
  readonly share: number;
  readonly variance: number;
}

/** Fills the responsibilities; returns Σ π, Σ π C and Σ π |e|². */
function expect(state: State, responsibilities: Float64Array) {
  const { squares, known, x, dayOf, A, B, factors, share, variance } = state;
  const [logOrdinary, logWrong, logVariance] = [Math.log1p(-share), Math.log(share), Math.log(variance)];
  const sums = { total: 0, components: 0, squares: 0 };
  for (let i = 0; i < x.length; i++) {
    let [distance, product, square, components] = [0, 1, 0, 0];
    for (const c of known) {
      const y = squares[c]![i]!;
      if (Number.isNaN(y)) continue;
      const mu = A[c]! + B[c]! * x[i]! * factors[c]![dayOf[i]!]!;
      distance += y / mu;
      product *= mu;
      square += y;
      components += 1;
    }
    if (distance < GUARD[components]!) {
      responsibilities[i] = 0;
      continue;
    }
    const core = logOrdinary - 0.5 * (Math.log(product) + distance);
    const wrong = logWrong - 0.5 * (components * logVariance + square / variance);
    const pi = 1 / (1 + Math.exp(Math.min(Math.max(core - wrong, -700), 700)));
    responsibilities[i] = pi;
    sums.total += pi;
    sums.components += pi * components;
    sums.squares += pi * square;
  }
  return sums;
}

/** The factor of each day from its shots' excess over A in units of B l, drawn towards 1. */
function moveFactors(
  y: Float64Array,
  x: Float64Array,
  w: Float64Array,
  dayOf: Int32Array,
  A: number,
  B: number,
  factors: Float64Array,
  average: boolean,
): void {
  const top = new Float64Array(factors.length).fill(PRIOR_WEIGHT);
  const bottom = new Float64Array(factors.length).fill(PRIOR_WEIGHT);
  for (let i = 0; i < y.length; i++) {
    if (Number.isNaN(y[i]!)) continue;
    const d = dayOf[i]!;
    const part = B * x[i]!;
    const weight = SHOT_WEIGHT * w[i]! * ((part * factors[d]!) / (A + part * factors[d]!)) ** 2;
    top[d]! += (weight * (y[i]! - A)) / Math.max(part, 1e-9);
    bottom[d]! += weight;
  }
  for (let d = 0; d < factors.length; d++) {
    const next = Math.min(Math.max(top[d]! / bottom[d]!, FACTOR_LEAST), FACTOR_MOST);
    factors[d] = average ? (factors[d]! + next) / 2 : next;
  }
}
