import type { ErrorsInput } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import { clusterTerms, covariance } from './clusterCovariance.js';
import { constantAlone, tooAlikeNote } from './constantAlone.js';
import type { ErrorModel } from './errorModel.js';
import { estimateVariance } from './estimate.js';
import { distanceInformation } from './information.js';
import { modelLimits } from './modelLimits.js';
import { axisNote, dataNotes } from './notes.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import { type FitData, prepareErrors } from './prepareErrors.js';

/** From 4 days on there is an interval at all. */
const FEWEST_DAYS = 4;
/** The farthest shot must be this many times as far as the nearest for mm and ppm to be told apart. */
export const LEAST_LENGTH_RATIO = 3;

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
  const tooAlike = longestKm < LEAST_LENGTH_RATIO * shortestKm;
  const withInterval = days >= FEWEST_DAYS;
  const core = tooAlike
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
  const information = distanceInformation(data, variance.displayA, variance.displayB);
  if (!withInterval || !variance.converged) {
    const point = (value: number) => ({ estimate: Math.sqrt(value), low: null, high: null });
    return {
      variance,
      information,
      uncertainty: null,
      constantMm: point(variance.displayA),
      ppm: point(variance.displayB),
      ppmIfIndependent: { estimate: null, low: null, high: null },
      interval: 'none',
      notes: variance.converged ? [] : [notConverged()],
    };
  }
  const terms = clusterTerms(data, data.day, variance.A, variance.B);
  return {
    variance,
    information,
    uncertainty: { terms, covariance: covariance(terms, 'CR3') },
    ...modelLimits(data, variance, terms, information.number, confidence),
  };
}

const notConverged = (): Message =>
  message(
    'warning',
    'not-converged',
    'The fit did not converge; its numbers are the last step and have no intervals. Look at the chart for errors of another kind than the rest.',
  );
