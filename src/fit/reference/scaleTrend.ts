import { studentTCdf, studentTQuantile } from '../../stats/index.js';

/** How the marks' own errors grow with distance, mm per km: what is the same every day and looks like a ppm. */
export interface ScaleTrend {
  /** Signed slope of the marks' mean errors on distance; along the baseline, or up. */
  readonly ppm: number;
  readonly low: number;
  readonly high: number;
  readonly pValue: number;
  readonly degreesOfFreedom: number;
  /** Whether the slope differs from 0 at the level of the limits. */
  readonly significant: boolean;
}

export interface TrendPoint {
  readonly baselineKm: number;
  /** Mean error along the baseline, or up, mm. */
  readonly meanMm: number;
  /** Variance of that mean, with the marks' own errors in it, mm². */
  readonly variance: number;
}

/**
 * Weighted slope of the marks' mean errors on distance, its error scaled by the scatter about the line (Knapp & Hartung
 * 2003; from memory). Along the baseline the line goes through the origin, since a scale error has no constant part and
 * an error of the base acts in one direction only. Heights have a free offset: an error of the base's height or antenna
 * height is common to all marks and is no slope.
 * @returns null with too few marks for the line, or all at one distance
 */
export function scaleTrend(
  points: readonly TrendPoint[],
  withOffset: boolean,
  confidence: number,
): ScaleTrend | null {
  const df = points.length - (withOffset ? 2 : 1);
  if (df < 1) return null;
  const weights = points.map(({ variance }) => 1 / variance);
  const mean = (value: (p: TrendPoint) => number): number =>
    withOffset
      ? points.reduce((sum, p, k) => sum + weights[k]! * value(p), 0) / weights.reduce((a, b) => a + b, 0)
      : 0;
  const [centerKm, centerMm] = [mean((p) => p.baselineKm), mean((p) => p.meanMm)];
  const longest = Math.max(...points.map(({ baselineKm }) => baselineKm));
  let [sxx, sxy] = [0, 0];
  points.forEach(({ baselineKm, meanMm }, k) => {
    sxx += weights[k]! * (baselineKm - centerKm) ** 2;
    sxy += weights[k]! * (baselineKm - centerKm) * (meanMm - centerMm);
  });
  if (!(sxx > 1e-12 * longest ** 2 * weights.reduce((a, b) => a + b, 0))) return null;
  const ppm = sxy / sxx;
  const scatter = points.reduce(
    (sum, { baselineKm, meanMm }, k) =>
      sum + weights[k]! * (meanMm - centerMm - ppm * (baselineKm - centerKm)) ** 2,
    0,
  );
  const standardError = Math.sqrt(scatter / df / sxx);
  const half = studentTQuantile((1 + confidence) / 2, df) * standardError;
  const pValue = standardError === 0 ? 0 : 2 * studentTCdf(-Math.abs(ppm / standardError), df);
  return {
    ppm,
    low: ppm - half,
    high: ppm + half,
    pValue,
    degreesOfFreedom: df,
    significant: pValue < 1 - confidence,
  };
}
