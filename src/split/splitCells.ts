import { type ErrorColumns, type ErrorsInput, errorColumns } from '../errors/index.js';
import { type CellSummary, cellSummary, errorValues, FEWEST_DAYS } from './cellSummary.js';
import { withDerived } from './derivedColumns.js';
import { columnOf, type Group, groupComparison, groupsOf, type SplitBy } from './groups.js';
import { cellKey, countVisits, type VisitCounts, visitCounts } from './visitCounts.js';

/** One cell by its groups, one for each column. */
export interface SplitCell {
  readonly groups: readonly Group[];
  readonly cell: CellSummary & VisitCounts;
}

/** Columns whose groups are single days, or may be. */
const SINGLE_DAYS: readonly string[] = ['day', 'setup'];

/**
 * Splits by all columns at once. Cells with neither occupations nor visits are left out.
 * @throws InputError when a column is missing
 */
export function splitCells(
  errors: ErrorsInput | ErrorColumns,
  by: readonly SplitBy[],
  {
    confidence = 0.95,
    visits,
  }: { confidence?: number | undefined; visits?: ErrorsInput | ErrorColumns | undefined },
): SplitCell[] {
  const columns = withDerived(errorColumns(errors));
  const values = errorValues(columns, 'summary tables');
  const groups = by.map((each) => groupsOf(columns, each));
  const cells = new Map<string, { groups: readonly Group[]; members: number[] }>();
  for (let row = 0; row < columns.length; row++) {
    const own = groups.map((each) => each[row]!);
    const key = cellKey(own);
    const known = cells.get(key);
    if (known === undefined) cells.set(key, { groups: own, members: [row] });
    else known.members.push(row);
  }
  const counted = visits === undefined ? null : countVisits(visits, by);
  for (const [key, cell] of counted ?? []) {
    if (!cells.has(key)) cells.set(key, { groups: cell.groups, members: [] });
  }
  const fewestDays = by.some((each) => SINGLE_DAYS.includes(columnOf(each))) ? 1 : FEWEST_DAYS;
  const comparisons = by.map(groupComparison);
  return [...cells]
    .map(([key, { groups: own, members }]) => ({
      groups: own,
      cell: {
        ...cellSummary(values, members, confidence, fewestDays),
        ...visitCounts(counted === null ? null : counted.get(key)),
      },
    }))
    .sort((a, b) =>
      comparisons.reduce(
        (found, compare, k) => (found === 0 ? compare(a.groups[k]!, b.groups[k]!) : found),
        0,
      ),
    );
}
