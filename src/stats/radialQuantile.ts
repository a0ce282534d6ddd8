import { requireProbability, requireRange } from './check.js';
import { normalQuantile } from './distributions.js';

/** Points of the integral at first, and at most: a very flat ellipse needs more. */
const FEWEST_POINTS = 32;
const MOST_POINTS = 1 << 16;

/**
 * Radius that holds a share p of two independent Gaussian errors with mean 0 and these standard deviations (Hoyt 1947,
 * from memory). The share outside R is the mean over the quarter circle of exp(-R²/(2 (σ₁² cos² φ + σ₂² sin² φ))), whose
 * integrand is periodic, so that the trapezoid rule gains digits with every doubling.
 * @param sigmaMajor,sigmaMinor in any order, not both 0
 * @throws RangeError for a negative σ, two that are 0, or p not between 0 and 1
 */
export function radialQuantile(sigmaMajor: number, sigmaMinor: number, p: number): number {
  requireProbability(p);
  requireRange(
    sigmaMajor >= 0 && sigmaMajor < Infinity,
    'sigmaMajor',
    'a finite number of at least 0',
    sigmaMajor,
  );
  requireRange(
    sigmaMinor >= 0 && sigmaMinor < Infinity,
    'sigmaMinor',
    'a finite number of at least 0',
    sigmaMinor,
  );
  const size = Math.max(sigmaMajor, sigmaMinor);
  requireRange(size > 0, 'sigmaMajor', 'a number above 0', size);
  const ratio = Math.min(sigmaMajor, sigmaMinor) / size;
  if (ratio === 1) return size * Math.sqrt(-2 * Math.log1p(-p));
  // One axis alone, and a circle of the longer one, hold the answer between them.
  let low = normalQuantile((1 + p) / 2);
  let high = Math.sqrt(-2 * Math.log1p(-p));
  if (ratio === 0) return size * low;
  const target = 1 - p;
  for (let k = 0; k < 200 && high - low > 2 * Number.EPSILON * high; k++) {
    const middle = (low + high) / 2;
    if (shareOutside(middle, ratio) > target) low = middle;
    else high = middle;
  }
  return (size * (low + high)) / 2;
}

/** Share beyond R for σ of 1 and `ratio`. */
function shareOutside(radius: number, ratio: number): number {
  const at = (phi: number): number =>
    Math.exp(-(radius ** 2) / (2 * (Math.cos(phi) ** 2 + (ratio * Math.sin(phi)) ** 2)));
  let points = FEWEST_POINTS;
  let sum = (at(0) + at(Math.PI / 2)) / 2;
  for (let k = 1; k < points; k++) sum += at((k * Math.PI) / 2 / points);
  let mean = sum / points;
  for (;;) {
    for (let k = 0; k < points; k++) sum += at(((k + 0.5) * Math.PI) / 2 / points);
    points *= 2;
    const next = sum / points;
    if (Math.abs(next - mean) <= 1e-15 + 1e-14 * next || points >= MOST_POINTS) return next;
    mean = next;
  }
}
