import type { ErrorsInput } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import { studentTQuantile } from '../stats/index.js';
import { clusterTerms, degreesOfFreedom } from './clusterCovariance.js';
import type { EstimateWithLimits } from './errorModel.js';
import type { FormEstimate } from './estimate.js';
import { type FitComponent, FORM_CURVES } from './forms.js';
import { type FitWithoutGroup, fitWithoutEach } from './leaveOut.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import type { FitData } from './prepareErrors.js';
import { referenceData } from './reference/referenceData.js';

/** How the ppm changes when a day is left out. */
export interface DayInfluence {
  readonly day: string;
  readonly ppmWithout: number;
  /** The ppm without the day over the ppm of all days. */
  readonly ratio: number;
}

/** The delete-one-day jackknife of the ppm, beside the interval of the fit as a check. */
export interface Jackknife {
  readonly component: FitComponent;
  /** The ppm with the jackknife interval; null limits, with a note, where the jackknife cannot give one. */
  readonly ppm: EstimateWithLimits;
  /** Standard error of log b; null without an interval. */
  readonly standardErrorOfLog: number | null;
  /** Days whose loss still allows a ppm, the most influential one first. */
  readonly influence: readonly DayInfluence[];
  readonly notes: readonly Message[];
}

/**
 * Leaves out each day in turn and gives the interval of the ppm on the log scale from the spread of what remains, with
 * Student t at the Satterthwaite degrees of freedom (Efron & Tibshirani 1993, from memory). Where a day alone makes the
 * distance term positive there is no interval.
 * @throws InputError as fitErrorModel
 */
export function jackknifeByDay<C extends FitComponent>(
  errors: ErrorsInput,
  options: FitOptions<C>,
): Jackknife {
  const { component, form, reference, confidence, weights } = resolveFitOptions(options);
  const { data } = referenceData(errors, { component, reference, weights: weights ?? undefined });
  const { whole, fits } = fitWithoutEach(data, data.day, form);
  const { sigma } = FORM_CURVES[form];
  const all = whole?.converged ? sigma(whole.displayQ) : null;
  const influence = all === null || all === 0 ? [] : influences(fits, sigma, all);
  const why = whyNoInterval(whole, fits);
  if (why !== null || whole === null) {
    const notes = [
      message(
        'info',
        'no-jackknife-interval',
        `The jackknife gives no interval of the ppm: ${why}. Add days with both near and far shots.`,
      ),
    ];
    return {
      component,
      ppm: { estimate: all, low: null, high: null },
      standardErrorOfLog: null,
      influence,
      notes,
    };
  }
  const standardErrorOfLog = jackknifeError(fits.map(({ fitted }) => Math.log(sigma(fitted!.q))));
  const t = studentTQuantile((1 + confidence) / 2, satterthwaite(data, whole));
  const factor = Math.exp(t * standardErrorOfLog);
  const estimate = sigma(whole.q);
  return {
    component,
    ppm: { estimate, low: estimate / factor, high: estimate * factor },
    standardErrorOfLog,
    influence,
    notes: [],
  };
}

function influences(
  fits: readonly FitWithoutGroup[],
  sigma: (parameter: number) => number,
  all: number,
): DayInfluence[] {
  const change = ({ ratio }: DayInfluence): number => Math.abs(ratio - 1);
  return fits
    .flatMap(({ group, fitted }): DayInfluence[] => {
      if (fitted === null) return [];
      const ppmWithout = sigma(fitted.displayQ);
      return [{ day: group.name, ppmWithout, ratio: ppmWithout / all }];
    })
    .sort((a, b) => change(b) - change(a) || (a.day < b.day ? -1 : 1));
}

function whyNoInterval(whole: FormEstimate | null, fits: readonly FitWithoutGroup[]): string | null {
  if (whole === null) return 'the distances are too alike';
  if (!whole.converged) return 'the fit did not converge';
  if (fits.length < 4) return 'there are fewer than 4 days';
  if (whole.q <= 0) return 'the distance term is not positive';
  const lone = fits.find(({ fitted }) => fitted === null || fitted.q <= 0);
  return lone === undefined ? null : `without day ${lone.group.name} no positive distance term is left`;
}

/** √((G - 1)/G Σ (θ_d - θ̄)²). */
function jackknifeError(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return Math.sqrt(((values.length - 1) / values.length) * squares);
}

const satterthwaite = (data: FitData, { form, p, q }: FormEstimate): number =>
  degreesOfFreedom(clusterTerms(data, data.day, p, q, form), [0, 1]);
