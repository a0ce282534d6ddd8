import type { Tails } from './specialFunctions.js';

/** Steps of the bracket search; 2^12 in a logarithmic variable is beyond every double. */
const MAX_DOUBLINGS = 12;
const MAX_STEPS = 200;

/**
 * Root of a continuous function between a and b where it changes sign: Brent's method (Brent, "Algorithms for
 * Minimization without Derivatives", 1973, ch. 4), to a few roundings of the root.
 */
function brentRoot(f: (u: number) => number, left: number, right: number): number {
  let a = left;
  let b = right;
  let fa = f(a);
  let fb = f(b);
  let c = a;
  let fc = fa;
  let step = b - a;
  let previous = step;
  for (let i = 0; i < MAX_STEPS; i += 1) {
    if (Math.abs(fc) < Math.abs(fb)) [a, b, c, fa, fb, fc] = [b, c, b, fb, fc, fb];
    const tolerance = 2 * Number.EPSILON * Math.max(Math.abs(b), 0.1);
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    if (Math.abs(previous) < tolerance || Math.abs(fa) <= Math.abs(fb)) {
      step = half;
      previous = half;
    } else {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const t = fa / fc;
        const r = fb / fc;
        p = s * (2 * half * t * (t - r) - (b - a) * (r - 1));
        q = (t - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      p = Math.abs(p);
      if (2 * p < Math.min(3 * half * q - Math.abs(tolerance * q), Math.abs(previous * q))) {
        previous = step;
        step = p / q;
      } else {
        step = half;
        previous = half;
      }
    }
    a = b;
    fa = fb;
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    fb = f(b);
    if (fb > 0 === fc > 0) {
      c = a;
      fc = fa;
      step = b - a;
      previous = step;
    }
  }
  return b;
}

/**
 * The u at which an increasing distribution function reaches `target`, solved on the logarithm of the smaller tail so
 * that far tails are as exact as the middle. `start` is a first guess; u is a logarithm or logit, so the search goes
 * outward by doubling steps. Returns −Infinity or +Infinity when the target lies beyond every representable u.
 */
export function invertTails(tailsAt: (u: number) => Tails, target: Tails, start: number): number {
  const useLower = target.lower <= target.upper;
  const logTarget = Math.log(useLower ? target.lower : target.upper);
  const excess = (u: number): number => {
    const tails = tailsAt(u);
    const tail = Math.max(useLower ? tails.lower : tails.upper, Number.MIN_VALUE);
    const difference = Math.log(tail) - logTarget;
    return useLower ? difference : -difference;
  };
  let width = 0.5;
  let near = start;
  const direction = excess(start) > 0 ? -1 : 1;
  for (let i = 0; i < MAX_DOUBLINGS; i += 1) {
    const far = near + direction * width;
    if (excess(far) * direction >= 0) return brentRoot(excess, near, far);
    near = far;
    width *= 2;
  }
  return direction * Number.POSITIVE_INFINITY;
}
