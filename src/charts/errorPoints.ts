import { type ErrorsInput, errorColumns } from '../errors/index.js';
import type { Component } from '../fit/index.js';

/** One error of an occupation as the chart shows it. */
export interface ErrorPoint {
  readonly baselineKm: number;
  /** √(E² + N²) or |up|, mm. */
  readonly errorMm: number;
}

/**
 * The radial or the vertical error of each occupation; occupations whose mark is not known in that component are
 * left out.
 * @throws InputError when a column is missing
 */
export function errorPoints(errors: ErrorsInput, component: Component): ErrorPoint[] {
  const columns = errorColumns(errors);
  const numbers = (name: string): Float64Array => columns.numbers(name, `the chart of ${component} errors`);
  const lengths = numbers('baselineKm');
  const size =
    component === 'horizontal' ? radial(numbers('east'), numbers('north')) : numbers('up').map(Math.abs);
  return Array.from(size, (errorMm, i) => ({ baselineKm: lengths[i]!, errorMm })).filter(
    ({ errorMm }) => !Number.isNaN(errorMm),
  );
}

const radial = (east: Float64Array, north: Float64Array): Float64Array =>
  east.map((value, i) => Math.hypot(value, north[i]!));
