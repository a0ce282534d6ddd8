import { axesOf, type Component, contrastEstimate, type ErrorModel } from '../../fit/index.js';
import { inputError } from '../../logs/index.js';
import { studentTQuantile } from '../../stats/index.js';
import { FROM_MEMORY, type StandardHead } from './condition.js';

/** One source of uncertainty. */
export interface BudgetEntry {
  readonly source: string;
  /** Standard uncertainty, mm. */
  readonly standardMm: number;
  /** Infinity for what was not estimated from these data. */
  readonly degreesOfFreedom: number;
}

export interface CombinedUncertainty {
  readonly combinedMm: number;
  /** Welch-Satterthwaite. */
  readonly degreesOfFreedom: number;
  readonly coverageFactor: number;
  /** Expanded uncertainty at the level, mm. */
  readonly expandedMm: number;
}

/** Root of the sum of squares, effective degrees of freedom and expanded uncertainty (JCGM 100, G.4; from memory). */
export function combineUncertainties(entries: readonly BudgetEntry[], level = 0.95): CombinedUncertainty {
  const variance = entries.reduce((sum, { standardMm }) => sum + standardMm ** 2, 0);
  const fourth = entries.reduce(
    (sum, { standardMm, degreesOfFreedom }) => sum + standardMm ** 4 / degreesOfFreedom,
    0,
  );
  const degreesOfFreedom = fourth > 0 ? variance ** 2 / fourth : Number.POSITIVE_INFINITY;
  // The guide cuts to the next smaller whole number.
  const whole = Number.isFinite(degreesOfFreedom)
    ? Math.max(1, Math.floor(degreesOfFreedom))
    : degreesOfFreedom;
  const coverageFactor = studentTQuantile((1 + level) / 2, whole);
  const combinedMm = Math.sqrt(variance);
  return { combinedMm, degreesOfFreedom, coverageFactor, expandedMm: coverageFactor * combinedMm };
}

export interface BudgetOptions {
  /** Standard deviations per axis, mm; default 0. */
  readonly baseSigmaMm?: number | undefined;
  readonly centringSigmaMm?: number | undefined;
  readonly markSigmaMm?: number | undefined;
  /** Step in which positions are written, mm; default 0. */
  readonly resolutionStepMm?: number | undefined;
  /** Default 0.95. */
  readonly level?: number | undefined;
}

/** Uncertainty of one position at a length, per axis, by its sources. */
export interface UncertaintyBudget extends StandardHead, CombinedUncertainty {
  readonly component: Component;
  readonly baselineKm: number;
  readonly entries: readonly BudgetEntry[];
}

/**
 * Budget of a single position per axis: what centring, marks and rounding put into the fitted constant is shown apart and
 * taken out of it; the base's coordinates come on top in a fit of repeatability and are part of one against published
 * coordinates.
 * @throws InputError for a fit without a variance model or without uncertainty
 */
export function uncertaintyBudget(
  model: ErrorModel,
  baselineKm: number,
  {
    baseSigmaMm = 0,
    centringSigmaMm = 0,
    markSigmaMm = 0,
    resolutionStepMm = 0,
    level = 0.95,
  }: BudgetOptions = {},
): UncertaintyBudget {
  const { component, variance, uncertainty, fitted, reference } = model;
  if (variance === null || uncertainty === null) {
    throw inputError(
      'bad-model',
      'Expected a fit of the form "root-sum-square" with intervals, came one without. Fit that form to days with near and far shots.',
    );
  }
  const axes = axesOf(component);
  const resolutionMm = resolutionStepMm / Math.sqrt(12);
  const inConstant = reference === 'repeatability' ? 0 : markSigmaMm ** 2 + baseSigmaMm ** 2;
  const own = Math.max(0, variance.displayA / axes - centringSigmaMm ** 2 - resolutionMm ** 2 - inConstant);
  const { terms, covariance } = uncertainty;
  // A variance v with standard error s has 2 (v/s)² degrees of freedom.
  const degrees = (value: number, contrast: readonly [number, number]): number => {
    const { standardError } = contrastEstimate(fitted.p, fitted.q, terms, covariance, contrast);
    return Math.max(1, 2 * (value / standardError) ** 2);
  };
  const known = Number.POSITIVE_INFINITY;
  const entries: BudgetEntry[] = [
    {
      source: 'constant without what is listed apart',
      standardMm: Math.sqrt(own),
      degreesOfFreedom: degrees(variance.displayA, [1, 0]),
    },
    {
      source: 'distance, ppm times length',
      standardMm: baselineKm * Math.sqrt(variance.displayB / axes),
      degreesOfFreedom: degrees(variance.displayB, [0, 1]),
    },
    { source: 'centring', standardMm: centringSigmaMm, degreesOfFreedom: known },
    { source: 'resolution of the log', standardMm: resolutionMm, degreesOfFreedom: known },
    { source: "base's coordinates", standardMm: baseSigmaMm, degreesOfFreedom: known },
  ];
  return {
    standard: 'JCGM 100 (GUM)',
    definition:
      'standard uncertainty of one position per axis, its sources in quadrature; the marks are no part of it',
    conditions: [
      { text: 'no correlation between the sources', met: null },
      { text: 'the constant is larger than what is taken out of it', met: own > 0 },
    ],
    caution: FROM_MEMORY,
    component,
    baselineKm,
    entries,
    ...combineUncertainties(entries, level),
  };
}
