import type { Message } from '../logs/index.js';
import type { Symmetric2 } from '../stats/index.js';
import type { ClusterTerms } from './clusterCovariance.js';
import type { VarianceEstimate } from './estimate.js';
import type { Component, Form } from './forms.js';

/** An estimate with the limits of its interval; null is what the data cannot defend, and a note says why. */
export interface EstimateWithLimits {
  readonly estimate: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

/** What error is counted from. */
export type Reference = 'absolute';

/** The uncertainty behind the intervals of a fit with a distance term; null in a model of the constant alone. */
export interface ModelUncertainty {
  readonly terms: ClusterTerms;
  /** CR3 covariance of (A, B). */
  readonly covariance: Symmetric2;
}

/** The own error model of one component: σ² = a² + b² L². */
export interface ErrorModel {
  readonly component: Component;
  readonly reference: Reference;
  readonly form: Form;
  readonly screened: boolean;
  /** What σ means: `radial RMS` √(mean(E² + N²)), or `vertical RMS`. */
  readonly basis: 'radial RMS' | 'vertical RMS';
  readonly confidence: number;
  /** a with its interval, mm. */
  readonly constantMm: EstimateWithLimits;
  /** b with its interval, mm per km: the root-mean-square over the days observed. */
  readonly ppm: EstimateWithLimits;
  /** b if every shot were independent: too narrow, for comparison only. */
  readonly ppmIfIndependent: EstimateWithLimits;
  /** Name of the method behind the interval of the ppm. */
  readonly interval: string;
  /** Unconstrained and displayed A = a² (mm²) and B = b² (ppm²). */
  readonly variance: VarianceEstimate;
  readonly uncertainty: ModelUncertainty | null;
  /** About the number of shots that speak of distance, see informationNumber. */
  readonly informationNumber: number;
  readonly occupations: number;
  readonly days: number;
  readonly marks: number | null;
  readonly shortestKm: number;
  readonly longestKm: number;
  /** What a reader must know before using the numbers. */
  readonly notes: readonly Message[];
}
