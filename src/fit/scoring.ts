import { dot, RankDeficientError } from '../stats/index.js';
import { FORM_CURVES, type Form, type FormCurve } from './forms.js';

/** Squared errors and squared lengths of the occupations, with weights in [0, 1]. */
export interface SquaredErrors {
  /** Squared error, mm². */
  readonly y: Float64Array;
  /** Squared baseline length, km². */
  readonly l: Float64Array;
  readonly w: Float64Array;
  /**
   * Factor on the variance of each row's score where rows of different days share a mean that was taken out of them;
   * absent where they share none.
   */
  readonly sharing?: Float64Array | undefined;
}

/** Parameters (p, q) of a form, σ² a function of p + q x, see FormCurve. */
export interface FormSolution {
  readonly p: number;
  readonly q: number;
  /** p stands at its floor: no short shots identify the constant. */
  readonly constantAtFloor: boolean;
  readonly converged: boolean;
  readonly iterations: number;
}

const MAX_ITERATIONS = 200;
const MAX_HALVINGS = 40;
const TOLERANCE = 1e-12;

/** Numbers of a form relative to its size: the mean square, or its root. */
interface Settings {
  readonly floor: number;
  readonly start: readonly [p: number, q: number];
  /** A start nearby must stay above this. */
  readonly leastStart: number;
}

const SETTINGS: Readonly<Record<Form, Settings>> = {
  'root-sum-square': { floor: 1e-3, start: [0.5, 0.5], leastStart: 0.01 },
  'linear-sum': { floor: 0.02, start: [0.6, 0.4], leastStart: 0.03 },
};

/**
 * Solves Σ w x σ²'(η) (y - μ)/μ² = 0 for μ = σ²(η), η = p + q x: Gaussian maximum likelihood and the gamma model at
 * once, unbiased without normality (Davidian & Carroll 1987; McCullagh & Nelder 1989; from memory). Fisher scoring, as
 * iteratively reweighted least squares, with three safeguards: μ stays positive by halving the step; the step is halved
 * for good when Q = Σ w (log μ + y/μ) rises, since the plain iteration can fall into a cycle; p is held at a floor while
 * the data push it below.
 * @param data with a positive weighted mean square
 * @param start a solution nearby, from which fewer steps are needed
 * @throws RankDeficientError when all lengths are equal
 */
export function solveForm(
  { y, l, w }: SquaredErrors,
  form: Form,
  start?: { readonly p: number; readonly q: number },
): FormSolution {
  const n = y.length;
  const curve = FORM_CURVES[form];
  const settings = SETTINGS[form];
  const total = w.reduce((sum, value) => sum + value, 0);
  const meanSquare = dot(w, y) / total;
  const size = form === 'root-sum-square' ? meanSquare : Math.sqrt(meanSquare);
  const x = l.map(curve.regressor);
  const scale = dot(w, x) / total;
  for (let i = 0; i < n; i++) x[i]! /= scale;
  const xMax = x.reduce((max, value, i) => (w[i]! > 0 ? Math.max(max, value) : max), 0);
  const floor = settings.floor * size;
  const work = new Workspace(y, x, w, curve);

  let at = startingPoint(start && { p: start.p, q: start.q * scale }, settings, size, xMax);
  let [step, held, converged] = [1, false, false];
  let quality = work.objective(at);
  let iterations = 0;
  while (iterations < MAX_ITERATIONS) {
    iterations += 1;
    let target = held ? { p: floor, q: 0 } : work.step(at);
    held ||= at.p <= 1.05 * floor && target.p < floor;
    if (held) {
      at = { p: floor, q: at.q };
      target = { p: floor, q: work.stepOfSlope(at) };
      quality = work.objective(at);
    }
    // Shorten the step until the next point is allowed, then until it is no worse; the latter for good.
    const [old, toward] = [at, target];
    const along = (factor: number): Point => ({
      p: old.p + factor * (toward.p - old.p),
      q: old.q + factor * (toward.q - old.q),
    });
    const allowed = ({ p, q }: Point): boolean => (held || p > floor) && p + q * xMax > floor;
    let factor = step;
    for (let h = 0; h < MAX_HALVINGS && !allowed(along(factor)); h++) factor /= 2;
    let next = along(factor);
    let reached = work.objective(next);
    for (let h = 0; h < MAX_HALVINGS && reached > quality + 1e-13 * Math.abs(quality); h++) {
      step /= 2;
      factor /= 2;
      next = along(factor);
      reached = work.objective(next);
    }
    const done = standsStill(form, at, next, size);
    [at, quality] = [next, reached];
    if (!done) continue;
    if (held && work.constantScore(at) > 0) {
      [held, step] = [false, 1];
      continue;
    }
    converged = true;
    break;
  }
  return { p: at.p, q: at.q / scale, constantAtFloor: at.p <= 1.05 * floor, converged, iterations };
}

interface Point {
  readonly p: number;
  readonly q: number;
}

/** A start that would make μ small or negative somewhere is not taken. */
function startingPoint(start: Point | undefined, settings: Settings, size: number, xMax: number): Point {
  const least = settings.leastStart * size;
  if (start !== undefined && start.p > least && start.p + start.q * xMax > least) return start;
  return { p: settings.start[0] * size, q: settings.start[1] * size };
}

/** Variances are compared each with itself, since they differ in size; a and b with the root mean square. */
function standsStill(form: Form, old: Point, next: Point, size: number): boolean {
  const [dp, dq] = [Math.abs(next.p - old.p), Math.abs(next.q - old.q)];
  if (form === 'linear-sum') return Math.max(dp, dq) < TOLERANCE * size;
  return dp / Math.abs(next.p) + dq / Math.max(Math.abs(next.q), 1e-9 * Math.abs(next.p)) < TOLERANCE;
}

/** Sums over the data at a point; x is divided by its mean. */
class Workspace {
  constructor(
    private readonly y: Float64Array,
    private readonly x: Float64Array,
    private readonly w: Float64Array,
    private readonly curve: FormCurve,
  ) {}

  /** Q = Σ w (log μ + y/μ): minus twice the Gaussian log likelihood but for a constant. */
  objective({ p, q }: Point): number {
    const { y, x, w, curve } = this;
    let sum = 0;
    for (let i = 0; i < y.length; i++) {
      const mu = curve.variance(p + q * x[i]!);
      sum += w[i]! * (Math.log(mu) + y[i]! / mu);
    }
    return sum;
  }

  /** The next point: least squares of η + (y - μ)/σ²' on (1, x), centred so that no digits are lost. */
  step({ p, q }: Point): Point {
    const { y, x, w, curve } = this;
    let [s0, sx, sz] = [0, 0, 0];
    for (let i = 0; i < y.length; i++) {
      const eta = p + q * x[i]!;
      const [mu, slope] = [curve.variance(eta), curve.slope(eta)];
      const v = w[i]! * (slope / mu) ** 2;
      s0 += v;
      sx += v * x[i]!;
      sz += v * (eta + (y[i]! - mu) / slope);
    }
    const [xMean, zMean] = [sx / s0, sz / s0];
    let [top, bottom] = [0, 0];
    for (let i = 0; i < y.length; i++) {
      const eta = p + q * x[i]!;
      const [mu, slope] = [curve.variance(eta), curve.slope(eta)];
      const v = w[i]! * (slope / mu) ** 2;
      const away = x[i]! - xMean;
      top += v * away * (eta + (y[i]! - mu) / slope - zMean);
      bottom += v * away * away;
    }
    if (!(bottom > 1e-28 * s0 * xMean * xMean)) throw new RankDeficientError(1);
    const next = top / bottom;
    return { p: zMean - next * xMean, q: next };
  }

  /** The next q with p held. */
  stepOfSlope({ p, q }: Point): number {
    const { y, x, w, curve } = this;
    let [top, bottom] = [0, 0];
    for (let i = 0; i < y.length; i++) {
      const eta = p + q * x[i]!;
      const [mu, slope] = [curve.variance(eta), curve.slope(eta)];
      const v = w[i]! * (slope / mu) ** 2;
      top += v * x[i]! * (eta + (y[i]! - mu) / slope - p);
      bottom += v * x[i]! * x[i]!;
    }
    return top / bottom;
  }

  /** Σ w σ²' (y - μ)/μ²: positive where the data want a larger p. */
  constantScore({ p, q }: Point): number {
    const { y, x, w, curve } = this;
    let sum = 0;
    for (let i = 0; i < y.length; i++) {
      const eta = p + q * x[i]!;
      const mu = curve.variance(eta);
      sum += (w[i]! * curve.slope(eta) * (y[i]! - mu)) / mu ** 2;
    }
    return sum;
  }
}
