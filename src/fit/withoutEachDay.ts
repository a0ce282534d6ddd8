import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { type FitComponent, FORM_CURVES } from './forms.js';
import { fitWithoutEach } from './leaveOut.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import { referenceData } from './reference/referenceData.js';

/** The fit without one day; null where the other days cannot tell mm and ppm apart. */
export interface FitWithoutDay {
  readonly day: string;
  readonly constantMm: number | null;
  readonly ppm: number | null;
}

/** The fit without one mark; null where the other marks cannot tell mm and ppm apart. */
export interface FitWithoutMark {
  readonly mark: string;
  readonly constantMm: number | null;
  readonly ppm: number | null;
}

/**
 * The point estimate with each day left out in turn (delete-one-day jackknife): shows which days carry the result.
 * Weights and the means that a reference takes out are kept; nothing is screened again.
 * @throws InputError as fitErrorModel
 */
export function fitWithoutEachDay(errors: ErrorsInput, options: FitOptions<FitComponent>): FitWithoutDay[] {
  return leftOut(errors, options, 'day').map(({ name, ...fit }) => ({ day: name, ...fit }));
}

/**
 * The point estimate with each mark left out in turn: shows whether the ppm rests on the error of one mark.
 * @throws InputError as fitErrorModel, and when the column `mark` is missing
 */
export function fitWithoutEachMark(errors: ErrorsInput, options: FitOptions<FitComponent>): FitWithoutMark[] {
  return leftOut(errors, options, 'mark').map(({ name, ...fit }) => ({ mark: name, ...fit }));
}

function leftOut(errors: ErrorsInput, options: FitOptions<FitComponent>, column: 'day' | 'mark') {
  const { component, form, reference, weights } = resolveFitOptions(options);
  const names = errorColumns(errors).texts(column, `fits without each ${column}`);
  const { data } = referenceData(errors, { component, reference, weights: weights ?? undefined });
  const keys = Array.from(data.rows, (row) => names[row]!);
  const { sigma } = FORM_CURVES[form];
  return fitWithoutEach(data, keys, form).fits.map(({ group: { name }, fitted }) => ({
    name,
    constantMm: fitted && sigma(fitted.displayP),
    ppm: fitted && sigma(fitted.displayQ),
  }));
}
