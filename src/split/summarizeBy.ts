import type { ErrorsInput } from '../errors/index.js';
import type { CellSummary } from './cellSummary.js';
import type { Group, SplitBy } from './groups.js';
import { splitCells } from './splitCells.js';
import type { VisitCounts } from './visitCounts.js';

/** One cell of a split. Lengths in km, errors in mm. */
export interface SummaryRow extends Group, CellSummary, VisitCounts {}

/** One cell of a split by two columns at once. */
export interface TwoWayRow extends CellSummary, VisitCounts {
  readonly first: Group;
  readonly second: Group;
}

export interface SummarizeOptions {
  /** Level of the intervals; default 0.95. */
  readonly confidence?: number | undefined;
  /** Visits with and without a fix, for the share without one; a column that they lack leaves it null. */
  readonly visits?: ErrorsInput | undefined;
}

/** Classes of baseline length for tables and charts, km. */
export const LENGTH_EDGES_KM: readonly number[] = [
  0, 1, 2, 3, 5, 7.5, 10, 15, 20, 30, 40, 60, 80, 100, 150, 250, 500, 1000,
];

/**
 * Splits errors into groups and states count, days, RMS, bias and quantiles of each. Groups without occupations and
 * visits are left out; the groups are disjoint and together hold every occupation (a value outside all edges forms the
 * group `outside`, one that is not given the group `not known`).
 * @throws InputError when a column is missing
 */
export function summarizeBy(errors: ErrorsInput, by: SplitBy, options: SummarizeOptions = {}): SummaryRow[] {
  return splitCells(errors, [by], options).map(({ groups, cell }) => ({ ...groups[0]!, ...cell }));
}

/**
 * The same for two columns at once, the groups of the first in order, within them those of the second.
 * @throws InputError when a column is missing
 */
export function summarizeByTwo(
  errors: ErrorsInput,
  first: SplitBy,
  second: SplitBy,
  options: SummarizeOptions = {},
): TwoWayRow[] {
  return splitCells(errors, [first, second], options).map(({ groups, cell }) => ({
    first: groups[0]!,
    second: groups[1]!,
    ...cell,
  }));
}
