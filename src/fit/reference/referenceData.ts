import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import type { Message } from '../../logs/index.js';
import type { Reference } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import { type FitData, pickEntries, prepareErrors } from '../prepareErrors.js';
import { relativeNotes, repeatabilityNotes } from './referenceNotes.js';
import { relative, type SetupSeparation } from './relative.js';
import { type Repeatability, repeatability } from './repeatability.js';

/** What the errors of a component are when they are counted from a reference. */
export interface ReferencedData {
  readonly reference: Reference;
  /** Squared residuals, scaled to the variance of one occupation, and the signed residuals on the same scale. */
  readonly data: FitData;
  /** The errors themselves, against the published coordinates, of the same occupations. */
  readonly absolute: FitData;
  readonly repeatability: Repeatability | null;
  readonly setups: SetupSeparation | null;
  /** What was set aside for the reference. */
  readonly notes: readonly Message[];
}

export interface ReferenceOptions {
  readonly component: FitComponent;
  readonly reference: Reference;
  /** In [0, 1], one for each row of the errors; default 1. */
  readonly weights?: Float64Array | undefined;
}

/**
 * The errors of one component counted from a reference: `absolute` the published coordinates, `repeatability` the mean
 * of each mark's other days, `relative` each setup's common offset (and, where marks repeat, their own means too).
 * @throws InputError when a column is missing, or the data do not allow the reference
 */
export function referenceData(
  errors: ErrorsInput,
  { component, reference, weights }: ReferenceOptions,
): ReferencedData {
  const absolute = prepareErrors(errors, component, weights);
  const none = { reference, repeatability: null, setups: null, notes: [] };
  if (reference === 'absolute') return { ...none, data: absolute, absolute };
  const columns = errorColumns(errors);
  const neededFor = `reference "${reference}"`;
  const texts = (name: string): string[] => {
    const values = columns.texts(name, neededFor);
    return Array.from(absolute.rows, (row) => values[row]!);
  };
  const numbers = (name: string): Float64Array => {
    const values = columns.numbers(name, neededFor);
    return Float64Array.from(absolute.rows, (row) => values[row]!);
  };
  const mark = texts('mark');
  const base = columns.has('base') ? texts('base') : null;
  if (reference === 'repeatability') {
    const azimuthDeg = columns.has('azimuthDeg') ? numbers('azimuthDeg') : null;
    const found = repeatability(absolute, mark, { base, azimuthDeg });
    return {
      ...none,
      data: found.data,
      absolute: sameRows(absolute, found.data),
      repeatability: found,
      notes: repeatabilityNotes(found),
    };
  }
  const found = relative(absolute, {
    mark,
    base,
    setup: texts('setup'),
    startMs: numbers('startMs'),
    azimuthDeg: numbers('azimuthDeg'),
    rover: columns.has('rover') ? texts('rover') : null,
  });
  return {
    ...none,
    data: found.data,
    absolute: sameRows(absolute, found.data),
    setups: found,
    notes: relativeNotes(found),
  };
}

/** The entries of `data` that stand in the same rows as those of `part`; both are in the same order. */
function sameRows(data: FitData, part: FitData): FitData {
  const rows = new Set(part.rows);
  return pickEntries(
    data,
    Array.from(data.rows.keys()).filter((i) => rows.has(data.rows[i]!)),
  );
}
