import { type DayModel, predictiveWeights, THETAS } from '../../days/index.js';
import type { Component, ErrorModel, Reference } from '../../fit/index.js';
import { reviewBy } from '../conditions.js';
import { type FrozenMark, frozenMarks } from '../frozenMarks.js';

/** A fitted model frozen as plain numbers: all that new days are held against. It can be written and read as JSON. */
export interface WatchBasis {
  readonly component: Component;
  readonly reference: Reference;
  /** Days fitted, and the last of them. */
  readonly days: number;
  readonly lastDay: string;
  /** A new fit is due by this day whatever comes; null where days are no dates. */
  readonly reviewBy: string | null;
  /** Constant, mm², and slope to which days refer, ppm². */
  readonly A: number;
  readonly B: number;
  /** What a shot is worth against an independent one. */
  readonly effectiveShare: number;
  /** Days to come: logs of the factor on the root of B, and how probable each is. */
  readonly logFactors: readonly number[];
  readonly probabilities: readonly number[];
  /** Mean errors of the marks; null where errors count from published coordinates. */
  readonly marks: readonly FrozenMark[] | null;
}

/** The basis, or why a model is not fit to watch by. */
export type WatchStart =
  | { readonly basis: WatchBasis; readonly reason: null }
  | { readonly basis: null; readonly reason: string };

const FEWEST_DAYS = 30;
const LEAST_INFORMATION = 15;

/** Freezes a fit and its day model. */
export function watchBasis(model: ErrorModel, dayModel: DayModel | null): WatchStart {
  const { component, reference, days, informationNumber } = model;
  const none = (reason: string): WatchStart => ({ basis: null, reason });
  if (days < FEWEST_DAYS) {
    return none(
      `${days} ${days === 1 ? 'day was' : 'days were'} fitted, and watching needs ${FEWEST_DAYS}: add days first`,
    );
  }
  if (informationNumber < LEAST_INFORMATION) {
    return none(
      `the shots say too little of distance (information number ${informationNumber.toFixed(0)}, watching needs ${LEAST_INFORMATION}): add days with far shots first`,
    );
  }
  if (reference === 'relative') {
    return none(
      'errors counted from each setup cannot be watched: fit repeatability, or the published coordinates',
    );
  }
  const posterior = dayModel?.posterior ?? null;
  if (posterior === null) return none('how days differ could not be judged: add days with far shots first');
  const weights = predictiveWeights(posterior.comboWeights);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const lastDay = posterior.cells.days.at(-1)!;
  return {
    basis: {
      component,
      reference,
      days,
      lastDay,
      reviewBy: reviewBy(lastDay),
      A: posterior.A,
      B: posterior.B,
      effectiveShare: posterior.effectiveShare,
      logFactors: Array.from(THETAS),
      probabilities: Array.from(weights, (weight) => weight / total),
      marks: frozenMarks(model),
    },
    reason: null,
  };
}
