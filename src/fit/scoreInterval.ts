import { studentTQuantile } from '../stats/index.js';
import { FORM_CURVES, type Form, type FormCurve } from './forms.js';
import type { SquaredErrors } from './scoring.js';

/**
 * Interval of q (b², or b in linear-sum) by inverting the self-normalised day score, for data that hold little
 * information on distance: for a trial q the constant is fitted, the day scores of q are freed of the constant, and q
 * is kept while their sum over its day-clustered error stays within Student t with G - 1. Cut at 0.
 * @param p first parameter of the solution
 * @param q second parameter of the solution
 * @returns limits in the unit of q; an upper limit of Infinity when no q is rejected
 */
export function scoreLimits(
  data: SquaredErrors,
  days: readonly string[],
  p: number,
  q: number,
  confidence: number,
  form: Form = 'root-sum-square',
): readonly [low: number, high: number] {
  const names = [...new Set(days)].sort();
  const index = new Map(names.map((name, d) => [name, d]));
  const dayOf = Int32Array.from(days, (day) => index.get(day)!);
  const t = studentTQuantile((1 + confidence) / 2, names.length - 1);
  const score = new DayScore(data, dayOf, names.length, FORM_CURVES[form]);
  const inside = (trial: number): boolean => Math.abs(score.at(trial, p)) <= t;
  const lowest = (-0.98 * p) / score.xMax;
  const start = Math.max(q, lowest);
  const reach = Math.max(Math.abs(q), p / score.xMax);
  return [
    Math.max(0, boundary(inside, start, -reach, lowest)),
    Math.max(0, boundary(inside, start, reach, null)),
  ];
}

/** Walks outward until the trial is rejected, then bisects; `limit` stops the walk. */
function boundary(
  inside: (q: number) => boolean,
  start: number,
  reach: number,
  limit: number | null,
): number {
  let [near, far] = [start, start + reach / 4];
  for (let k = 0; k < 60; k++) {
    if (limit !== null && far <= limit) {
      far = limit;
      if (inside(far)) return far;
      break;
    }
    if (!inside(far)) break;
    // With few days the score is bounded by their number: what is not rejected this far out never is.
    if (far > 1e4 * Math.abs(reach)) return Number.POSITIVE_INFINITY;
    [near, far] = [far, far + (far - start) + reach / 4];
  }
  for (let k = 0; k < 80; k++) {
    const middle = (near + far) / 2;
    if (inside(middle)) near = middle;
    else far = middle;
  }
  return (near + far) / 2;
}

/** The self-normalised score of q over days. */
class DayScore {
  readonly x: Float64Array;
  readonly xMax: number;

  constructor(
    private readonly data: SquaredErrors,
    private readonly dayOf: Int32Array,
    private readonly groups: number,
    private readonly curve: FormCurve,
  ) {
    this.x = data.l.map(curve.regressor);
    this.xMax = this.x.reduce((max, value) => Math.max(max, value), 0);
  }

  at(q: number, start: number): number {
    const { x, dayOf, groups, curve } = this;
    const { y, w, sharing } = this.data;
    const p = this.constantFor(q, start);
    const g1 = new Float64Array(groups);
    const g2 = new Float64Array(groups);
    const information = new Float64Array(y.length);
    let [h11, h12] = [0, 0];
    for (let i = 0; i < y.length; i++) {
      const eta = p + q * x[i]!;
      const [mu, slope] = [curve.variance(eta), curve.slope(eta)];
      const v = w[i]! * (slope / mu) ** 2;
      const score = (v * (y[i]! - mu)) / slope;
      g1[dayOf[i]!]! += score;
      g2[dayOf[i]!]! += score * x[i]!;
      information[i] = v;
      h11 += v;
      h12 += v * x[i]!;
    }
    const h = g2.map((value, d) => value - (h12 / h11) * g1[d]!);
    const total = h.reduce((sum, value) => sum + value, 0);
    const mean = total / groups;
    const spread = h.reduce((sum, value) => sum + (value - mean) ** 2, 0);
    const factor = sharing === undefined ? 1 : scoreFactor(x, information, sharing, h12 / h11);
    return total / Math.sqrt(factor * (groups / (groups - 1)) * spread);
  }

  /** p that solves Σ w σ²' (y - μ)/μ² = 0 for a given q, by bisection: the sum falls as p grows near the solution. */
  private constantFor(q: number, start: number): number {
    const { x, curve } = this;
    const { y, w } = this.data;
    const lowest = q < 0 ? -q * this.xMax * (1 + 1e-9) : 0;
    const sum = (p: number): number => {
      let total = 0;
      for (let i = 0; i < y.length; i++) {
        const eta = p + q * x[i]!;
        const mu = curve.variance(eta);
        total += (w[i]! * curve.slope(eta) * (y[i]! - mu)) / mu ** 2;
      }
      return total;
    };
    let low = lowest + 1e-9 * start;
    let high = Math.max(start, low) * 2;
    if (sum(low) < 0) return low;
    while (sum(high) > 0) high *= 2;
    for (let k = 0; k < 100 && high - low > 1e-12 * high; k++) {
      const middle = (low + high) / 2;
      if (sum(middle) > 0) low = middle;
      else high = middle;
    }
    return (low + high) / 2;
  }
}

/** The factor for shared means (see sharedMeansFactor) of the score of q freed of the constant. */
function scoreFactor(x: Float64Array, v: Float64Array, sharing: Float64Array, center: number): number {
  let [top, bottom] = [0, 0];
  for (let i = 0; i < x.length; i++) {
    const own = v[i]! * (x[i]! - center) ** 2;
    top += own * sharing[i]!;
    bottom += own;
  }
  return top / bottom;
}
