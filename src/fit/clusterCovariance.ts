import {
  eigenSymmetric2,
  invertSymmetric2,
  multiplySymmetric2Vector,
  powerSymmetric2,
  type Symmetric2,
  type Vector2,
} from '../stats/index.js';
import { FORM_CURVES, type Form } from './forms.js';
import type { SquaredErrors } from './scoring.js';

/** Which small-sample correction a cluster-robust covariance has. */
export type CovarianceKind = 'CR0' | 'CR1' | 'CR2' | 'CR3';

/** What a cluster-robust covariance of the parameters (p, q) of a form is made of; x is divided by `scale`. */
export interface ClusterTerms {
  /** Mean of x: squared length, km², or length, km. */
  readonly scale: number;
  /** Days in the order of the arrays below. */
  readonly days: readonly string[];
  /** M = (Σ S_d)^-1 and its symmetric root. */
  readonly bread: Symmetric2;
  readonly breadRoot: Symmetric2;
  /** Q_d = M^½ S_d M^½: the share of the information that a day carries. */
  readonly shares: readonly Symmetric2[];
  /** M^½ g_d, g_d the score of a day. */
  readonly scores: readonly Vector2[];
  /** M (Σ r w x x' σ²'²/μ²) M with the factors r of rows that share means; null where they share none. */
  readonly shared: Symmetric2 | null;
}

/**
 * Sums per day of information S_d = Σ w x x' σ²'²/μ² and score g_d = Σ w x σ²' (y - μ)/μ² at (p, q), σ²' the slope of
 * the form: 1 for root-sum-square, where (p, q) = (A, B), and 2σ for linear-sum.
 * Cluster-robust theory: Liang & Zeger 1986; MacKinnon & White 1985; Mancl & DeRouen 2001; Bell & McCaffrey 2002;
 * Pustejovsky & Tipton 2018 (from memory).
 */
export function clusterTerms(
  { y, l, w, sharing }: SquaredErrors,
  days: readonly string[],
  p: number,
  q: number,
  form: Form = 'root-sum-square',
): ClusterTerms {
  const curve = FORM_CURVES[form];
  const scale = l.reduce((sum, value) => sum + curve.regressor(value), 0) / l.length;
  const names = [...new Set(days)].sort();
  const index = new Map(names.map((name, d) => [name, d]));
  // Columns: S00, S01, S11, g0, g1.
  const sums = new Float64Array(names.length * 5);
  const withFactor: [number, number, number] = [0, 0, 0];
  for (let i = 0; i < y.length; i++) {
    const x = curve.regressor(l[i]!);
    const eta = p + q * x;
    const [mu, slope] = [curve.variance(eta), curve.slope(eta)];
    const v = w[i]! * (slope / mu) ** 2;
    const at = index.get(days[i]!)! * 5;
    const score = (v * (y[i]! - mu)) / slope;
    sums[at]! += v;
    sums[at + 1]! += v * (x / scale);
    sums[at + 2]! += v * (x / scale) ** 2;
    sums[at + 3]! += score;
    sums[at + 4]! += score * (x / scale);
    if (sharing === undefined) continue;
    withFactor[0] += sharing[i]! * v;
    withFactor[1] += sharing[i]! * v * (x / scale);
    withFactor[2] += sharing[i]! * v * (x / scale) ** 2;
  }
  const column = (k: number): number => {
    let total = 0;
    for (let d = 0; d < names.length; d++) total += sums[d * 5 + k]!;
    return total;
  };
  const bread = invertSymmetric2([column(0), column(1), column(2)]);
  const breadRoot = powerSymmetric2(bread, 0.5);
  const shares = names.map((_, d) => sandwich(breadRoot, [sums[d * 5]!, sums[d * 5 + 1]!, sums[d * 5 + 2]!]));
  const scores = names.map((_, d) =>
    multiplySymmetric2Vector(breadRoot, [sums[d * 5 + 3]!, sums[d * 5 + 4]!]),
  );
  const shared = sharing === undefined ? null : sandwich(bread, withFactor);
  return { scale, days: names, bread, breadRoot, shares, scores, shared };
}

/**
 * Factor φ on the variance of c'(p, q) for means that rows of different days share: Σ v r / Σ v with
 * v = w (c'M x σ²')²/μ², written as a ratio of quadratic forms. 1 where nothing is shared.
 */
export function sharedMeansFactor({ shared, bread, scale }: ClusterTerms, [c0, c1]: Vector2): number {
  if (shared === null) return 1;
  const contrast: Vector2 = [c0, c1 / scale];
  return contrastVariance(shared, contrast) / contrastVariance(bread, contrast);
}

/** R S R for symmetric R and S. */
function sandwich(root: Symmetric2, s: Symmetric2): Symmetric2 {
  const [c0, c1] = [
    multiplySymmetric2Vector(s, [root[0], root[1]]),
    multiplySymmetric2Vector(s, [root[1], root[2]]),
  ];
  const [first, second] = [multiplySymmetric2Vector(root, c0), multiplySymmetric2Vector(root, c1)];
  return [first[0], (first[1] + second[0]) / 2, second[1]];
}

/** (I - Q)^power with the eigenvalues of I - Q kept from 0. */
const leverage = (q: Symmetric2, power: number): Symmetric2 =>
  power === 0 ? [1, 0, 1] : powerSymmetric2([1 - q[0], -q[1], 1 - q[2]], power, 1e-8);

const POWER: Readonly<Record<CovarianceKind, number>> = { CR0: 0, CR1: 0, CR2: -0.5, CR3: -1 };

/** Covariance of (p, q), in their units. CR2 takes the symmetric root of the whitened problem. */
export function covariance(terms: ClusterTerms, kind: CovarianceKind): Symmetric2 {
  const sum: [number, number, number] = [0, 0, 0];
  terms.shares.forEach((share, d) => {
    const [u0, u1] = multiplySymmetric2Vector(leverage(share, POWER[kind]), terms.scores[d]!);
    sum[0] += u0 * u0;
    sum[1] += u0 * u1;
    sum[2] += u1 * u1;
  });
  const groups = terms.shares.length;
  const factor = kind === 'CR1' ? groups / (groups - 1) : 1;
  const scaled = sandwich(terms.breadRoot, sum);
  return unscale(scaled, terms.scale, factor);
}

/** Covariance if every shot were independent: 2M where a row is one Gaussian component, M where it is a radial square. */
export function naiveCovariance(terms: ClusterTerms, componentsInRow: 1 | 2): Symmetric2 {
  return unscale(terms.bread, terms.scale, 2 / componentsInRow);
}

const unscale = (m: Symmetric2, scale: number, factor: number): Symmetric2 => [
  factor * m[0],
  (factor * m[1]) / scale,
  (factor * m[2]) / scale ** 2,
];

/** Variance of c'(p, q). */
export function contrastVariance(v: Symmetric2, [c0, c1]: Vector2): number {
  return c0 * c0 * v[0] + 2 * c0 * c1 * v[1] + c1 * c1 * v[2];
}

/**
 * Satterthwaite degrees of freedom of c'(p, q) under the working model (Bell & McCaffrey 2002; Pustejovsky & Tipton
 * 2018; from memory), cut to [1, G - 1].
 */
export function degreesOfFreedom(terms: ClusterTerms, [c0, c1]: Vector2): number {
  const groups = terms.shares.length;
  const direction = multiplySymmetric2Vector(terms.breadRoot, [c0, c1 / terms.scale]);
  // P = diag(p) - K'K with K of two rows, so that all sums over pairs of days reduce to the 2x2 matrix KK'.
  const kk: [number, number, number] = [0, 0, 0];
  let [trace, ownSquares, diagonalSquares] = [0, 0, 0];
  for (const share of terms.shares) {
    const f = multiplySymmetric2Vector(leverage(share, -0.5), direction);
    const k = multiplySymmetric2Vector(share, f);
    const own = k[0] * k[0] + k[1] * k[1];
    const diagonal = f[0] * k[0] + f[1] * k[1] - own;
    trace += diagonal;
    ownSquares += own * own;
    diagonalSquares += diagonal * diagonal;
    kk[0] += k[0] * k[0];
    kk[1] += k[0] * k[1];
    kk[2] += k[1] * k[1];
  }
  const allSquares = kk[0] ** 2 + 2 * kk[1] ** 2 + kk[2] ** 2;
  const df = trace ** 2 / (allSquares - ownSquares + diagonalSquares);
  return Math.max(1, Math.min(df, groups - 1));
}

/** The day that carries the largest share of the information in any direction, and that share (0 to 1). */
export function dominantDay(terms: ClusterTerms): { readonly day: string; readonly share: number } {
  let best = { day: terms.days[0]!, share: 0 };
  terms.shares.forEach((q, d) => {
    const share = eigenSymmetric2(q).values[1];
    if (share > best.share) best = { day: terms.days[d]!, share };
  });
  return best;
}
