import type {
  Component,
  DistanceCompanion,
  EstimateWithLimits,
  InformationBy,
  InformationShare,
  RmsRatio,
  TermEstimate,
} from '../fit/index.js';

/** Constant and ppm beside further terms. */
export interface TermsResult {
  readonly component: Component;
  readonly terms: readonly TermEstimate[];
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  /** The constant without centring and the marks' own errors. */
  readonly ownConstantMm: EstimateWithLimits;
  readonly knownMm: number;
  readonly occupations: number;
  readonly days: number;
  readonly converged: boolean;
}

/** On what a fit rests. */
export interface EvidenceResult {
  readonly component: Component;
  /** Largest shares of the information on the ppm, by mark, day, direction and crew. */
  readonly shares: readonly {
    readonly by: InformationBy;
    readonly largest: readonly InformationShare[];
    readonly groups: number;
  }[];
  /** What goes with distance, so that the two can hardly be told apart. */
  readonly companions: readonly DistanceCompanion[];
  /** Near shots on days with and without far shots. */
  readonly daysWithFarShots: {
    readonly farKm: number;
    readonly daysWithFar: number;
    readonly daysWithoutFar: number;
    readonly near: RmsRatio | null;
  } | null;
  /** The first occupation of a visit beside its last. */
  readonly firstAndLast: { readonly visits: number; readonly days: number; readonly first: RmsRatio | null };
}
