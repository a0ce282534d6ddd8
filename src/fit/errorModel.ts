import type { Message } from '../logs/index.js';
import type { Symmetric2 } from '../stats/index.js';
import type { ClusterTerms } from './clusterCovariance.js';
import type { FormEstimate, VarianceEstimate } from './estimate.js';
import type { BASIS, Component, FitComponent, Form } from './forms.js';

import type { MarkComponent } from './reference/markComponent.js';
import type { SetupSeparation } from './reference/relative.js';
import type { MarkDay } from './reference/repeatability.js';

/** An estimate with the limits of its interval; null is what the data cannot defend, and a note says why. */
export interface EstimateWithLimits {
  readonly estimate: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

/**
 * What error is counted from: `absolute` the published coordinates; `repeatability` the mean of the mark's other days, or
 * how well a position is found again; `relative` the offset common to its base setup.
 */
export type Reference = 'absolute' | 'repeatability' | 'relative';

/** The uncertainty behind the intervals of a fit with a distance term; null in a model of the constant alone. */
export interface ModelUncertainty {
  readonly terms: ClusterTerms;
  /**
   * CR3 covariance of the parameters (p, q) of the form, without the factor of shared means; take standard errors from
   * contrastEstimate.
   */
  readonly covariance: Symmetric2;
}

/** East and north fitted each by itself with the form and weights of the radial fit. */
export interface AxisFits {
  readonly east: FormEstimate;
  readonly north: FormEstimate;
}

/** What a fit of repeatability found beside the model. */
export interface RepeatabilityTerms {
  /** Correlation of occupations of one mark on one day. */
  readonly rho: number;
  /** Factor on the variance of p and of q for the means that days share; null in a model without intervals. */
  readonly sharedMeans: { readonly constant: number; readonly ppm: number } | null;
  /** Occupations on marks with a single counting day. */
  readonly setAside: number;
  /** The means of all marks and days, from which the marks' own errors can be found. */
  readonly markDays: readonly MarkDay[];
}

/** The offsets of the base setups without the errors they were taken from. */
export type SetupSummary = Omit<SetupSeparation, 'data' | 'setAside' | 'onLoneMarks'>;

/** The own error model of one component: σ² = a² + b² L², or σ = a + b L. */
export interface ErrorModel<C extends FitComponent = Component> {
  readonly component: C;
  readonly reference: Reference;
  readonly form: Form;
  /** Suspected wrong fixes count less, or not at all. */
  readonly screened: boolean;
  /** What σ means: `radial RMS` √(mean(E² + N²)), or the RMS of one axis. */
  readonly basis: (typeof BASIS)[C];
  readonly confidence: number;
  /** a with its interval, mm. */
  readonly constantMm: EstimateWithLimits;
  /** b with its interval, mm per km: the root-mean-square over the days observed. */
  readonly ppm: EstimateWithLimits;
  /** b if every shot were independent: too narrow, for comparison only. */
  readonly ppmIfIndependent: EstimateWithLimits;
  /** Name of the method behind the interval of the ppm. */
  readonly interval: string;
  /** The parameters of the form, unconstrained and as displayed; σ at a length is `sigmaAtMm`. */
  readonly fitted: FormEstimate;
  /** A = a² (mm²) and B = b² (ppm²); null in the linear-sum form, whose σ² is no A + B L². */
  readonly variance: VarianceEstimate | null;
  /** Of the horizontal component; null for the others, and where one of the axes could not be fitted. */
  readonly axes: AxisFits | null;
  readonly uncertainty: ModelUncertainty | null;
  /** About the number of shots that speak of distance, see informationNumber. */
  readonly informationNumber: number;
  readonly occupations: number;
  readonly days: number;
  readonly marks: number | null;
  readonly shortestKm: number;
  readonly longestKm: number;
  /** Null unless the reference is repeatability, or the model is composed from one. */
  readonly repeatability: RepeatabilityTerms | null;
  /** The setups' offsets; null unless the reference is `relative`. */
  readonly setups: SetupSummary | null;
  /** The marks' own errors in a composed absolute model, whose constant holds them; null elsewhere. */
  readonly markComponent: MarkComponent | null;
  /** What a reader must know before using the numbers. */
  readonly notes: readonly Message[];
}
