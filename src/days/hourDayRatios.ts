import { type ErrorsInput, errorColumns } from '../errors/index.js';
import type { ErrorModel } from '../fit/index.js';
import { fittedData, varianceOf } from './fittedSpread.js';

/** How large the errors of one hour of one day are against the model. */
export interface HourDayCell {
  readonly day: string;
  /** Solar hours, from (included) to (excluded). */
  readonly fromHour: number;
  readonly toHour: number;
  readonly occupations: number;
  /** Root-mean-square of error over the model's spread at the same length: 1 is as the model says. */
  readonly ratio: number;
}

export interface HourDayOptions {
  /** Weights with which the model was fitted. */
  readonly weights?: Float64Array | undefined;
  /** Whole hours of a cell; default 1. */
  readonly hours?: number | undefined;
}

/**
 * Errors by hour and day, each against what the model gives for its length, so that far and near shots compare. Shots
 * without a time of day, or of weight 0, take no part.
 * @param errors those of the model, with `solarHour`
 * @returns cells with shots, by day and within it by hour
 * @throws InputError when a column or the weights are missing; RangeError for hours that do not divide the day
 */
export function hourDayRatios(
  errors: ErrorsInput,
  model: ErrorModel,
  { weights, hours = 1 }: HourDayOptions = {},
): HourDayCell[] {
  if (!(Number.isInteger(hours) && hours >= 1 && 24 % hours === 0))
    throw new RangeError(`hours: expected a whole number that divides 24, received ${hours}`);
  const solarHour = errorColumns(errors).numbers('solarHour', 'errors by hour and day');
  const { displayA, displayB } = varianceOf(model);
  const { y, l, w, day, rows } = fittedData(errors, model, weights);
  const cells = new Map<string, { day: string; slot: number; count: number; top: number; weight: number }>();
  for (let i = 0; i < y.length; i++) {
    const hour = solarHour[rows[i]!]!;
    if (Number.isNaN(hour) || !(w[i]! > 0)) continue;
    const slot = Math.floor(hour / hours);
    const key = `${day[i]} ${slot}`;
    const cell = cells.get(key) ?? { day: day[i]!, slot, count: 0, top: 0, weight: 0 };
    cells.set(key, cell);
    cell.count += 1;
    cell.top += (w[i]! * y[i]!) / (displayA + displayB * l[i]!);
    cell.weight += w[i]!;
  }
  return [...cells.values()]
    .sort((a, b) => (a.day < b.day ? -1 : a.day > b.day ? 1 : a.slot - b.slot))
    .map(({ day: name, slot, count, top, weight }) => ({
      day: name,
      fromHour: slot * hours,
      toHour: (slot + 1) * hours,
      occupations: count,
      ratio: Math.sqrt(top / weight),
    }));
}
