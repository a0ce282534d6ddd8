import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { inputError } from '../logs/index.js';
import { COMPONENT_COLUMNS, type FitComponent } from './forms.js';
import { orderRows, rankOf } from './rowOrder.js';
import type { SquaredErrors } from './scoring.js';

/** The columns of one component, in an order that does not depend on the order of rows. */
export interface FitData extends SquaredErrors {
  readonly day: readonly string[];
  /** Signed components, mm: east and north, or up. */
  readonly components: readonly Float64Array[];
  readonly mark: readonly string[] | null;
  readonly setup: readonly string[] | null;
  /** Start of each occupation, UTC ms; null when the errors do not tell. */
  readonly startMs: Float64Array | null;
  /** Where each entry stands in the errors that came in. */
  readonly rows: Int32Array;
  /** Rows without a value of this component (marks known in plan only or height only). */
  readonly withoutValue: number;
  /** Rows on the base itself, or without a length, which take no part. */
  readonly withoutBaseline: number;
}

/**
 * @param weights in [0, 1], one for each row of the errors; default 1
 * @throws InputError when a column is missing, or no row has the component and a length above 0
 */
export function prepareErrors(errors: ErrorsInput, component: FitComponent, weights?: Float64Array): FitData {
  const columns = errorColumns(errors);
  const neededFor = `component "${component}"`;
  const values = COMPONENT_COLUMNS[component].map((name) => columns.numbers(name, neededFor));
  const lengths = columns.numbers('baselineKm', 'every fit');
  const days = columns.texts('day', 'every fit');
  const optional = (name: string): string[] | null =>
    columns.has(name) ? columns.texts(name, 'a note') : null;
  const marks = optional('mark');
  const setups = optional('setup');
  const starts = columns.has('startMs') ? columns.numbers('startMs', 'a note') : null;
  if (weights !== undefined && weights.length !== lengths.length) {
    throw inputError(
      'bad-option',
      `Expected one weight for each of ${lengths.length} rows, came ${weights.length}. Hand in weights of the same errors.`,
    );
  }
  const rows = Array.from(lengths.keys());
  const used = rows.filter((i) => values.every((column) => !Number.isNaN(column[i]!)));
  if (used.length === 0) {
    throw inputError(
      'no-errors',
      `Expected occupations with ${component} errors, came none of ${rows.length}. Check that marks have coordinates and rows are fixed.`,
    );
  }
  if (used.every((i) => values.every((column) => column[i] === 0))) {
    throw inputError(
      'no-errors',
      `Expected measured positions, came ${component} errors of exactly 0 in every occupation. The log repeats the known coordinates: export what was measured.`,
    );
  }
  // A shot on the base itself has no baseline: it tells of the constant only by a length that cannot be divided by.
  const measured = used.filter((i) => lengths[i]! > 0 && Number.isFinite(lengths[i]!));
  if (measured.length === 0) {
    throw inputError(
      'no-baseline',
      `Expected baseline lengths above 0 km, came none of ${used.length}. Take shots away from the base.`,
    );
  }
  const withoutBaseline = used.length - measured.length;
  if (weights !== undefined && measured.every((i) => weights[i] === 0)) {
    throw inputError(
      'no-errors',
      `Expected a weight above 0, came only 0 in all ${measured.length} occupations with ${component} errors. Check how they were screened.`,
    );
  }
  const squares = new Float64Array(lengths.length);
  for (const column of values) for (let i = 0; i < squares.length; i++) squares[i]! += column[i]! ** 2;
  const order = orderRows(Int32Array.from(measured), days, [
    lengths,
    squares,
    ...values,
    ...(starts === null ? [] : [starts]),
    ...(weights === undefined ? [] : [weights]),
    ...(marks === null ? [] : [rankOf(marks)]),
  ]);
  const pick = (list: readonly string[] | null): string[] | null => list && textsOf(order, list);
  return {
    y: numbersOf(order, (i) => squares[i]!),
    l: numbersOf(order, (i) => lengths[i]! ** 2),
    w: numbersOf(order, (i) => weights?.[i] ?? 1),
    day: textsOf(order, days),
    components: values.map((column) => numbersOf(order, (i) => column[i]!)),
    mark: pick(marks),
    setup: pick(setups),
    startMs: starts && numbersOf(order, (i) => starts[i]!),
    rows: order,
    withoutValue: rows.length - used.length,
    withoutBaseline,
  };
}

/** Numbers of rows in an order; a plain loop, since Float64Array.from takes many times as long. */
export function numbersOf(order: Int32Array, valueAt: (row: number) => number): Float64Array {
  const numbers = new Float64Array(order.length);
  for (let k = 0; k < numbers.length; k++) numbers[k] = valueAt(order[k]!);
  return numbers;
}

function textsOf(order: Int32Array, texts: readonly string[]): string[] {
  const picked: string[] = [];
  for (const row of order) picked.push(texts[row]!);
  return picked;
}

/** The same data with the given entries only, in their order. */
export function pickEntries(data: FitData, kept: readonly number[]): FitData {
  const pick = (list: readonly string[] | null): string[] | null => list && kept.map((i) => list[i]!);
  const numbers = (column: Float64Array): Float64Array => Float64Array.from(kept, (i) => column[i]!);
  return {
    ...data,
    y: numbers(data.y),
    l: numbers(data.l),
    w: numbers(data.w),
    day: kept.map((i) => data.day[i]!),
    components: data.components.map(numbers),
    mark: pick(data.mark),
    setup: pick(data.setup),
    startMs: data.startMs && numbers(data.startMs),
    rows: Int32Array.from(kept, (i) => data.rows[i]!),
    ...(data.sharing === undefined ? {} : { sharing: numbers(data.sharing) }),
  };
}
