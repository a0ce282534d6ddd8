import type { ErrorsInput } from '../errors/index.js';
import type { Component, ErrorModel, EstimateWithLimits, FitData } from '../fit/index.js';
import type { Message } from '../logs/index.js';
import { comboFit } from './comboFit.js';
import { type DayEstimate, dayEstimates } from './dayEstimates.js';
import { comboQuantiles, comboRms, DAY_COMBOS } from './dayGrid.js';
import { type DayCells, dayCells, dayLogLikelihood, relativeLikelihood } from './dayLikelihood.js';
import { dayNotes, daysNotJudged, namesDays } from './dayNotes.js';
import { type DegradedEvent, degradedDays, degradedEvents } from './degradedDays.js';
import { effectiveShare } from './effectiveShare.js';
import { type FittedSpread, fittedData, fittedSpread } from './fittedSpread.js';
import { weightedQuantiles } from './weightedQuantile.js';

/** What a rule needs of the day model: how days may differ, with what probability. */
export interface DayPosterior {
  /** The constant, mm², and the slope to which day factors refer, ppm². */
  readonly A: number;
  readonly B: number;
  readonly standardErrorA: number;
  readonly effectiveShare: number;
  /** The rows of the fit, and the same by day and length. */
  readonly data: FitData;
  readonly cells: DayCells;
  /** Probability of each of DAY_COMBOS. */
  readonly comboWeights: Float64Array;
}

/** How the ppm differs from day to day. */
export interface DayModel {
  readonly component: Component;
  readonly days: number;
  readonly occupations: number;
  /** What a shot is worth against an independent one. */
  readonly effectiveShare: number;
  /** Ppm of the median day, of which half of the days are worse. */
  readonly medianDayPpm: EstimateWithLimits;
  /** Root-mean-square ppm over days to come; its upper limit rests on how bad a day the model allows. */
  readonly longRunPpm: EstimateWithLimits;
  /** Spread of the log of the day factors: 0.3 means that two thirds of the days lie within a factor of 1.35. */
  readonly tau: EstimateWithLimits;
  /** In order of days; empty when days cannot be judged. */
  readonly dayEstimates: readonly DayEstimate[];
  /** Names of degraded days; null when they cannot be named. */
  readonly degradedDays: readonly string[] | null;
  readonly events: readonly DegradedEvent[];
  readonly posterior: DayPosterior | null;
  readonly notes: readonly Message[];
}

/** Level of the limits. */
const LEVELS = [0.025, 0.5, 0.975];
const NONE: EstimateWithLimits = { estimate: null, low: null, high: null };

/**
 * How the ppm differs from day to day, which days are degraded, and what the median day is like.
 * @param model a fit to these errors
 * @param weights with which the model was fitted
 * @throws InputError when a column is missing (`startMs` gives the order of shots)
 */
export function dayModel(errors: ErrorsInput, model: ErrorModel, weights?: Float64Array): DayModel {
  return dayModelOf(fittedData(errors, model, weights), fittedSpread(model));
}

/**
 * Hierarchical model of the days: σ² = A + b_d² L², log b_d = log b + θ_d, θ_d from a normal or t4 law of median m and
 * spread τ; A and b fixed at the fit, m, τ and the law on a grid with flat priors, shots tempered by what they are worth
 * (Chandler & Bate 2007; Holmes & Walker 2017; Gelman 2006 for the flat prior on a scale; from memory).
 * @param spread null when the fit has no distance term
 */
export function dayModelOf(data: FitData, spread: FittedSpread | null): DayModel {
  const cells = dayCells(data);
  const component: Component = data.components.length === 2 ? 'horizontal' : 'vertical';
  const common = { component, days: cells.days.length, occupations: data.y.length };
  const share = spread === null || !(spread.B > 0) ? 1 : effectiveShare(data, spread.A, spread.B).share;
  if (spread === null || !judgeable(spread, share)) {
    return {
      ...common,
      effectiveShare: share,
      medianDayPpm: NONE,
      longRunPpm: NONE,
      tau: NONE,
      dayEstimates: [],
      degradedDays: null,
      events: [],
      posterior: null,
      notes: [daysNotJudged()],
    };
  }
  const { A, B, standardErrorA } = spread;
  const likelihood = relativeLikelihood(dayLogLikelihood(cells, A, B, share));
  const fit = comboFit(likelihood);
  const ppm = Math.sqrt(B);
  const limits = (values: Float64Array, of: (value: number) => number): EstimateWithLimits => {
    const [low, estimate, high] = weightedQuantiles(values, fit.weights, LEVELS).map(of);
    return { estimate: estimate!, low: low!, high: high! };
  };
  const asPpm = (log: number): number => ppm * Math.exp(log);
  const estimates = dayEstimates(cells, likelihood, fit, ppm);
  const named = namesDays(cells.occupations) ? degradedDays(estimates) : null;
  const events = degradedEvents(cells.days, named ?? []);
  const tau = limits(
    Float64Array.from(DAY_COMBOS, (combo) => combo.spread),
    (value) => value,
  );
  return {
    ...common,
    effectiveShare: share,
    medianDayPpm: limits(comboQuantiles(0.5), asPpm),
    longRunPpm: limits(comboRms(), asPpm),
    tau,
    dayEstimates: estimates,
    degradedDays: named,
    events,
    posterior: { A, B, standardErrorA, effectiveShare: share, data, cells, comboWeights: fit.weights },
    notes: dayNotes({
      component,
      occupations: cells.occupations,
      daysWithoutFar: daysWithout(cells, A / B),
      farFromKm: Math.sqrt(A / B),
      tau: tau.estimate!,
      estimates,
      events,
    }),
  };
}

/** Days without a length beyond one, given squared. */
const daysWithout = ({ days, starts, l }: DayCells, beyond: number): number =>
  days.filter((_, d) => !l.subarray(starts[d], starts[d + 1]).some((value) => value > beyond)).length;

/**
 * Whether the ppm is clear enough of zero for its days to be compared. The second condition lets a study pass whose
 * day-clustered error is blown up by the very day that is sought.
 */
function judgeable({ B, standardErrorB, independentErrorB }: FittedSpread, share: number): boolean {
  return B > 0 && (B > 2 * standardErrorB || B > (3 * independentErrorB) / Math.sqrt(share));
}
