import type { ErrorColumns } from '../../errors/index.js';
import {
  type ErrorModel,
  estimateForm,
  type FitData,
  type Form,
  type FormEstimate,
  referenceData,
} from '../../fit/index.js';
import { inputError } from '../../logs/index.js';
import { RankDeficientError } from '../../stats/index.js';
import { type FrozenMark, meansOf, type NewErrors, newErrors } from '../frozenMarks.js';

/** The errors that a back-test divides into those learnt from and those judged. */
export interface BackTestData {
  readonly records: readonly object[];
  readonly columns: ErrorColumns;
  readonly days: readonly string[];
  /** Weights in [0, 1] of the fit; below one half a shot is suspected. */
  readonly weights: Float64Array | null;
  readonly model: ErrorModel;
}

/** A point fit to some of the rows, with the marks' means that they give. */
export interface Trained {
  readonly fitted: FormEstimate;
  readonly marks: readonly FrozenMark[] | null;
}

/** @throws InputError for a reference whose errors need the judged day itself */
export function refuseRelative({ reference }: ErrorModel): void {
  if (reference !== 'relative') return;
  throw inputError(
    'bad-option',
    'Expected a model of reference "absolute" or "repeatability" for a back-test, came "relative": the offset of a setup cannot be known before its day. Hand in another model.',
  );
}

/**
 * Fits the rows given, and nothing of the others enters.
 * @throws InputError when they cannot be fitted
 */
export function train({ records, weights, model }: BackTestData, rows: readonly number[]): Trained {
  const { component, reference, form } = model;
  const referenced = referenceData(
    rows.map((row) => records[row]!),
    {
      component,
      reference,
      weights: weights === null ? undefined : Float64Array.from(rows, (row) => weights[row]!),
    },
  );
  const { repeatability } = referenced;
  return {
    fitted: estimated(referenced.data, form),
    marks: repeatability && meansOf(repeatability.markDays, repeatability.rho),
  };
}

/** Without the judged day all lengths may be the same. */
function estimated(data: FitData, form: Form): FormEstimate {
  try {
    return estimateForm(data, form);
  } catch (error) {
    if (!(error instanceof RankDeficientError)) throw error;
    throw inputError(
      'lengths-too-alike',
      'Expected near and far shots on the other days too, came baselines of one length. Add days with other distances.',
    );
  }
}

/** The errors of other rows as the trained marks count them. */
export const judged = (
  { columns, model }: BackTestData,
  { marks }: Trained,
  rows: readonly number[],
): NewErrors => newErrors(columns, model.component, marks, rows);
