import { type Message, message } from '../logs/index.js';
import { clusteredMean } from '../split/index.js';
import type { ErrorModel } from './errorModel.js';
import { varianceLimits } from './intervals.js';
import type { FitData } from './prepareErrors.js';

const UNKNOWN = { estimate: null, low: null, high: null };

/** One RMS for all lengths: what remains when the distances are too alike to separate mm and ppm. */
export function constantAlone(
  data: FitData,
  confidence: number,
  withInterval: boolean,
): Pick<
  ErrorModel,
  'variance' | 'informationNumber' | 'uncertainty' | 'constantMm' | 'ppm' | 'ppmIfIndependent' | 'interval'
> {
  const { mean, standardError, days } = clusteredMean(data.y, data.day);
  const limits = withInterval
    ? varianceLimits({ value: mean, standardError, degreesOfFreedom: days - 1 }, confidence)
    : null;
  return {
    variance: {
      A: mean,
      B: 0,
      displayA: mean,
      displayB: 0,
      constantAtFloor: false,
      converged: true,
      iterations: 0,
    },
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

export const tooAlikeNote = (): Message =>
  message(
    'warning',
    'distances-too-alike',
    'The distances are too alike to separate mm and ppm: the value shown is one RMS for all of them. Take shots on marks at least three times as far as the nearest one.',
  );
