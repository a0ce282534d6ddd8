import { type ErrorColumns, type ErrorsInput, errorColumns } from '../errors/index.js';
import { withDerived } from './derivedColumns.js';
import { columnOf, type Group, groupsOf, type SplitBy } from './groups.js';

/** Visits of one cell. Null where visits cannot be told apart so: a visit without a fix has no PDOP. */
export interface VisitCounts {
  readonly visits: number | null;
  readonly visitsWithoutFix: number | null;
  /** Null also without visits. */
  readonly shareWithoutFix: number | null;
}

/** What is counted while visits are gone through. */
export interface CountedVisits {
  readonly groups: readonly Group[];
  visits: number;
  visitsWithoutFix: number;
}

/** Key of a cell by the names of its groups. */
export const cellKey = (groups: readonly Group[]): string => groups.map(({ group }) => group).join('\u0000');

/**
 * Counts visits by one or more columns.
 * @param visits with `fixedRows`
 * @returns cells by their key; null when the visits lack one of the columns
 */
export function countVisits(
  visits: ErrorsInput | ErrorColumns,
  by: readonly SplitBy[],
): ReadonlyMap<string, CountedVisits> | null {
  const columns = withDerived(errorColumns(visits), true);
  if (!by.every((each) => columns.has(columnOf(each)))) return null;
  const fixedRows = columns.numbers('fixedRows', 'the share of visits without a fix');
  const groups = by.map((each) => groupsOf(columns, each));
  const cells = new Map<string, CountedVisits>();
  fixedRows.forEach((fixed, row) => {
    const own = groups.map((each) => each[row]!);
    const key = cellKey(own);
    const cell = cells.get(key) ?? { groups: own, visits: 0, visitsWithoutFix: 0 };
    cells.set(key, cell);
    cell.visits += 1;
    if (fixed === 0) cell.visitsWithoutFix += 1;
  });
  return cells;
}

/** @param counted null where visits cannot be told apart so; absent for a cell without visits */
export function visitCounts(counted: CountedVisits | null | undefined): VisitCounts {
  if (counted === null) return { visits: null, visitsWithoutFix: null, shareWithoutFix: null };
  const { visits, visitsWithoutFix } = counted ?? { visits: 0, visitsWithoutFix: 0 };
  return { visits, visitsWithoutFix, shareWithoutFix: visits === 0 ? null : visitsWithoutFix / visits };
}
