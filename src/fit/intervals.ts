import { type Symmetric2, studentTQuantile, type Vector2 } from '../stats/index.js';
import {
  type ClusterTerms,
  contrastVariance,
  degreesOfFreedom,
  sharedMeansFactor,
} from './clusterCovariance.js';

/** θ = c'(p, q), a variance or a spread, with its cluster-robust uncertainty. */
export interface ContrastEstimate {
  readonly value: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
}

/**
 * An estimate with the standard error of `v`, enlarged where days share means ({@link sharedMeansFactor}). p is the
 * contrast (1, 0), q is (0, 1), and η(L), which is σ²(L) or σ(L), is (1, x).
 */
export function contrastEstimate(
  p: number,
  q: number,
  terms: ClusterTerms,
  v: Symmetric2,
  contrast: Vector2,
): ContrastEstimate {
  return {
    value: contrast[0] * p + contrast[1] * q,
    standardError: Math.sqrt(sharedMeansFactor(terms, contrast) * contrastVariance(v, contrast)),
    degreesOfFreedom: degreesOfFreedom(terms, contrast),
  };
}

/** Beyond two standard errors the log scale is used: a variance or spread is skewed, and cannot be negative. */
export const usesLogScale = ({ value, standardError }: ContrastEstimate): boolean =>
  value > 2 * standardError;

/** Two-sided limits of a variance or spread. On the raw scale they are cut at 0. */
export function varianceLimits(
  estimate: ContrastEstimate,
  confidence: number,
): readonly [low: number, high: number] {
  const t = studentTQuantile((1 + confidence) / 2, estimate.degreesOfFreedom);
  return [Math.max(0, limit(estimate, -t)), limit(estimate, t)];
}

/** One-sided upper limit of a variance or spread. */
export function varianceUpperLimit(estimate: ContrastEstimate, confidence: number): number {
  return limit(estimate, studentTQuantile(confidence, estimate.degreesOfFreedom));
}

function limit(estimate: ContrastEstimate, t: number): number {
  const { value, standardError } = estimate;
  if (usesLogScale(estimate)) return value * Math.exp((t * standardError) / value);
  const raw = value + t * standardError;
  // A clearly negative estimate must not give an upper limit below what chance alone allows.
  return t > 0 && raw <= 0 ? t * standardError : raw;
}
