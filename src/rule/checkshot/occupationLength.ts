import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { type Component, type ErrorModel, referenceData, sigmaAtMm } from '../../fit/index.js';
import { type Interval, rootMeanSquare } from '../../split/index.js';

/** Errors of occupations of some length against what the model says at their distance. */
export interface OccupationLengthRow {
  readonly component: Component;
  /** Epochs averaged to an occupation, both included; null: and more. */
  readonly fromEpochs: number;
  readonly toEpochs: number | null;
  readonly occupations: number;
  readonly days: number;
  /** RMS of error over σ: below 1 where longer occupations are better than the usual one. Interval by days. */
  readonly ratio: Interval;
}

/** Ends of the classes. */
const ENDS = [1, 4, 9, 29, 59, 179, 599, Number.POSITIVE_INFINITY];

/**
 * Spread of errors by the number of epochs behind an occupation, each against the model at its own length. Errors of
 * one minute differ little from those of one epoch where they last for longer than that.
 * @param errors with `epochs`; none where the logs hold averages whose epochs are not told
 * @throws InputError when a column is missing
 */
export function errorByOccupationLength(
  errors: ErrorsInput,
  model: ErrorModel,
  weights?: Float64Array,
): OccupationLengthRow[] {
  const { component, reference, confidence } = model;
  const epochs = errorColumns(errors).numbers('epochs', 'the length of occupations');
  const { data } = referenceData(errors, { component, reference, weights });
  const ratios = Float64Array.from(data.y, (y, i) => y / sigmaAtMm(model, Math.sqrt(data.l[i]!)) ** 2);
  return ENDS.flatMap((end, k): OccupationLengthRow[] => {
    const from = k === 0 ? 1 : ENDS[k - 1]! + 1;
    const members = Array.from(data.y.keys()).filter((i) => {
      const count = epochs[data.rows[i]!]!;
      return data.w[i]! >= 0.5 && count >= from && count <= end;
    });
    const days = members.map((i) => data.day[i]!);
    const ratio = rootMeanSquare(
      members.map((i) => ratios[i]!),
      days,
      confidence,
    );
    if (ratio === null) return [];
    return [
      {
        component,
        fromEpochs: from,
        toEpochs: Number.isFinite(end) ? end : null,
        occupations: members.length,
        days: new Set(days).size,
        ratio,
      },
    ];
  });
}
