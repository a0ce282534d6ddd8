import type { ErrorsInput } from '../errors/index.js';
import { estimateVariance } from './estimate.js';
import { tooAlike } from './fitErrorModel.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import { prepareErrors } from './prepareErrors.js';

/** The fit without one day; null where the other days cannot tell mm and ppm apart. */
export interface FitWithoutDay {
  readonly day: string;
  readonly constantMm: number | null;
  readonly ppm: number | null;
}

/**
 * The point estimate with each day left out in turn (delete-one-day jackknife): shows which days carry the result.
 * @throws InputError as fitErrorModel
 */
export function fitWithoutEachDay(errors: ErrorsInput, options: FitOptions): FitWithoutDay[] {
  const data = prepareErrors(errors, resolveFitOptions(options).component);
  const whole = tooAlike(data.l) ? undefined : estimateVariance(data);
  return [...new Set(data.day)].map((day) => {
    const keep = data.day.flatMap((other, i) => (other === day ? [] : [i]));
    const pick = (column: Float64Array): Float64Array => Float64Array.from(keep, (i) => column[i]!);
    const [y, l, w] = [pick(data.y), pick(data.l), pick(data.w)];
    const none = { day, constantMm: null, ppm: null };
    if (l.length === 0 || tooAlike(l)) return none;
    const { displayA, displayB, converged } = estimateVariance({ y, l, w }, whole);
    return converged ? { day, constantMm: Math.sqrt(displayA), ppm: Math.sqrt(displayB) } : none;
  });
}
