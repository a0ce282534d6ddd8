import { type ErrorsInput, errorColumns, heldColumns } from '../errors/index.js';
import { withDerived } from './derivedColumns.js';
import { columnOf, type SplitBy } from './groups.js';
import { splitCells } from './splitCells.js';
import { LENGTH_EDGES_KM, type SummaryRow } from './summarizeBy.js';

/** One way of splitting a study, with its name on a page. */
export interface StandardSplit {
  /** `baseline length, km` */
  readonly title: string;
  readonly by: SplitBy;
}

/** A study split one way. */
export interface SplitTable extends StandardSplit {
  readonly rows: readonly SummaryRow[];
  /** Why there are no rows; null when there are. */
  readonly reason: string | null;
}

const classes = (column: string, ...edges: readonly number[]): SplitBy => ({ column, edges });

/** The splits of every report. The edges are rules of thumb. */
export const STANDARD_SPLITS: readonly StandardSplit[] = [
  { title: 'baseline length, km', by: { column: 'baselineKm', edges: LENGTH_EDGES_KM } },
  { title: 'solar hour', by: classes('solarHour', ...Array.from({ length: 25 }, (_, hour) => hour)) },
  { title: 'day', by: 'day' },
  { title: 'month', by: 'month' },
  { title: 'base', by: 'base' },
  { title: 'setup of the base', by: 'setup' },
  { title: 'mark', by: 'mark' },
  { title: 'crew', by: 'crew' },
  { title: 'rover', by: 'rover' },
  { title: 'direction from the base', by: 'direction' },
  { title: 'satellites', by: classes('satellites', 0, 6, 8, 10, 12, 15, 20, 25, 30, 40, 60) },
  { title: 'PDOP', by: classes('pdop', 0, 1, 1.5, 2, 2.5, 3, 4, 6, 10, 50) },
  { title: 'age of corrections, s', by: classes('ageSeconds', 0, 1, 2, 3, 5, 10, 20, 30, 60, 600) },
  {
    title: 'length of the occupation, s',
    by: classes('occupationSeconds', 0, 2, 5, 10, 30, 60, 120, 300, 600, 1800, 3600, 86_400),
  },
  {
    title: 'epochs of the occupation',
    by: classes('epochs', 1, 2, 3, 5, 10, 30, 60, 180, 600, 3600, 86_400),
  },
  { title: 'sky at the mark', by: 'sky' },
  { title: 'support of the rod', by: 'support' },
  { title: 'tilt of the rod, degrees', by: classes('tiltDeg', 0, 2, 5, 10, 15, 20, 30, 45, 60, 90) },
];

/**
 * Splits a study in every way that its columns allow. A split of which the study knows nothing has no rows and says so.
 * @param visits for the share without a fix; with the columns of `placeVisits` also by length, hour, direction and sky
 */
export function standardSplits(
  errors: ErrorsInput,
  visits?: ErrorsInput,
  options: { readonly confidence?: number | undefined } = {},
): SplitTable[] {
  const held = heldColumns(errorColumns(errors));
  const columns = withDerived(held);
  const own = { ...options, visits: visits === undefined ? undefined : heldColumns(errorColumns(visits)) };
  return STANDARD_SPLITS.map(({ title, by }): SplitTable => {
    const none = (reason: string): SplitTable => ({ title, by, rows: [], reason });
    if (columns.length === 0) return none('there are no occupations');
    if (!columns.has(columnOf(by))) return none('the errors have no such column');
    const rows = splitCells(held, [by], own).map(
      ({ groups, cell }): SummaryRow => ({ ...groups[0]!, ...cell }),
    );
    return rows.every(({ group }) => group === 'not known')
      ? none('it is known of no occupation')
      : { title, by, rows, reason: null };
  });
}
