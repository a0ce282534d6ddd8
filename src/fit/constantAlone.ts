import { type Message, message } from '../logs/index.js';
import { clusteredMean } from '../split/index.js';
import { meanAlone } from './axisFits.js';
import type { ErrorModel } from './errorModel.js';
import type { Form } from './forms.js';
import { varianceLimits } from './intervals.js';
import type { FitData } from './prepareErrors.js';

/** The farthest shot must be this many times as far as the nearest for mm and ppm to be told apart. */
const LEAST_LENGTH_RATIO = 3;

const UNKNOWN = { estimate: null, low: null, high: null };

/** @param l squared lengths */
export function tooAlike(l: Float64Array, w?: Float64Array): boolean {
  let [shortest, longest] = [Number.POSITIVE_INFINITY, 0];
  for (let i = 0; i < l.length; i++) {
    if (w !== undefined && !(w[i]! > 0)) continue;
    shortest = Math.min(shortest, l[i]!);
    longest = Math.max(longest, l[i]!);
  }
  return longest < LEAST_LENGTH_RATIO ** 2 * shortest;
}

/** One RMS for all lengths: what remains when the distances are too alike to separate mm and ppm. */
export function constantAlone(
  data: FitData,
  form: Form,
  confidence: number,
  withInterval: boolean,
): Pick<
  ErrorModel,
  'fitted' | 'informationNumber' | 'uncertainty' | 'constantMm' | 'ppm' | 'ppmIfIndependent' | 'interval'
> {
  const { mean, standardError, days } = clusteredMean(data.y, data.day, data.w);
  const error = standardError * Math.sqrt(sharedFactor(data));
  const limits = withInterval
    ? varianceLimits({ value: mean, standardError: error, degreesOfFreedom: days - 1 }, confidence)
    : null;
  return {
    fitted: meanAlone(data.y, data.w, form),
    informationNumber: 0,
    uncertainty: null,
    constantMm: {
      estimate: Math.sqrt(mean),
      low: limits && Math.sqrt(limits[0]),
      high: limits && Math.sqrt(limits[1]),
    },
    ppm: UNKNOWN,
    ppmIfIndependent: UNKNOWN,
    interval: limits === null ? 'none' : 'mean square with day clusters',
  };
}

/** Factor on the variance of the mean square for means that days share; 1 where they share none. */
function sharedFactor({ sharing, w }: FitData): number {
  if (sharing === undefined) return 1;
  let [top, bottom] = [0, 0];
  for (let i = 0; i < w.length; i++) {
    top += w[i]! * sharing[i]!;
    bottom += w[i]!;
  }
  return top / bottom;
}

export const tooAlikeNote = (): Message =>
  message(
    'warning',
    'distances-too-alike',
    'The distances are too alike to separate mm and ppm: the value shown is one RMS for all of them. Take shots on marks at least three times as far as the nearest one.',
  );
