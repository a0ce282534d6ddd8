import type { ErrorsInput } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import { clusterTerms, covariance } from './clusterCovariance.js';
import { constantAlone, tooAlikeNote } from './constantAlone.js';
import type { ErrorModel } from './errorModel.js';
import { estimateVariance } from './estimate.js';
import { informationNumber } from './information.js';
import { constantNote, modelLimits, tellsPpm } from './modelLimits.js';
import { axisNote, dataNotes } from './notes.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import { type FitData, prepareErrors } from './prepareErrors.js';

/** From 4 days on there is an interval at all. */
const FEWEST_DAYS = 4;
/** The farthest shot must be this many times as far as the nearest for mm and ppm to be told apart. */
const LEAST_LENGTH_RATIO = 3;

/** @param l squared lengths */
export function tooAlike(l: Float64Array): boolean {
  const shortest = l.reduce((a, b) => Math.min(a, b));
  const longest = l.reduce((a, b) => Math.max(a, b));
  return longest < LEAST_LENGTH_RATIO ** 2 * shortest;
}

/**
 * Fits σ² = a² + b² L² to the errors of occupations and gives a and b with intervals that count days, not shots.
 *
 * Point estimate: gamma quasi-likelihood with identity link ({@link estimateVariance}). Intervals: cluster-robust
 * covariance CR3 by day with Satterthwaite degrees of freedom, on the log scale beyond two standard errors; for data
 * with little information on distance the inverted day score. The horizontal component is radial: σ is the
 * root-mean-square of √(E² + N²).
 *
 * @param errors table or records with `day`, `baselineKm` (km) and `east`, `north` or `up` (mm); `mark` and `setup`
 *   sharpen the notes
 * @throws InputError when an option or a column is missing or unknown, or no occupation has the component
 */
export function fitErrorModel(errors: ErrorsInput, options: FitOptions): ErrorModel {
  const { component, form, reference, confidence } = resolveFitOptions(options);
  const data = prepareErrors(errors, component);
  const days = new Set(data.day).size;
  const lengths = data.l.map(Math.sqrt);
  const notes = [...dataNotes(data, component), ...axisNote(data)];
  const shortestKm = lengths.reduce((a, b) => Math.min(a, b));
  const longestKm = lengths.reduce((a, b) => Math.max(a, b));
  const alike = tooAlike(data.l);
  const withInterval = days >= FEWEST_DAYS;
  const core = alike
    ? { ...constantAlone(data, confidence, withInterval), notes: [tooAlikeNote()] }
    : distanceModel(data, confidence, withInterval);
  return {
    component,
    reference,
    form,
    screened: false,
    basis: component === 'horizontal' ? 'radial RMS' : 'vertical RMS',
    confidence,
    occupations: data.y.length,
    days,
    marks: data.mark === null ? null : new Set(data.mark).size,
    shortestKm,
    longestKm,
    ...core,
    notes: [...notes, ...core.notes],
  };
}

function distanceModel(data: FitData, confidence: number, withInterval: boolean) {
  const variance = estimateVariance(data);
  const number = informationNumber(data, variance.displayA, variance.displayB);
  if (!withInterval || !variance.converged) {
    const point = (value: number) => ({ estimate: Math.sqrt(value), low: null, high: null });
    const { constantAtFloor, converged } = variance;
    return {
      variance,
      informationNumber: number,
      uncertainty: null,
      constantMm: point(variance.displayA),
      ppm: tellsPpm(number) ? point(variance.displayB) : { estimate: null, low: null, high: null },
      ppmIfIndependent: { estimate: null, low: null, high: null },
      interval: 'none',
      notes: [
        ...(converged ? [] : [notConverged()]),
        ...(constantAtFloor ? [constantNote()] : []),
        ...(tellsPpm(number) ? [] : [ppmUnknown()]),
      ],
    };
  }
  const terms = clusterTerms(data, data.day, variance.A, variance.B);
  return {
    variance,
    informationNumber: number,
    uncertainty: { terms, covariance: covariance(terms, 'CR3') },
    ...modelLimits(data, variance, terms, number, confidence),
  };
}

const notConverged = (): Message =>
  message(
    'warning',
    'not-converged',
    'The fit did not converge; its numbers are the last step and have no intervals. Look at the chart for errors of another kind than the rest.',
  );

const ppmUnknown = (): Message =>
  message(
    'warning',
    'ppm-unknown',
    'The shots say too little of distance for a ppm. Add days, and shots farther from the base.',
  );
