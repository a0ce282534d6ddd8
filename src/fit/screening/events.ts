import type { ErrorColumns } from '../../errors/index.js';
import { orderRows, rankOf } from '../rowOrder.js';

/**
 * Lengths of runs of suspected occupations that follow one another on one day and rover, in time order. Without times no
 * run can be seen: each suspect is one.
 * @param rows that were screened
 * @param suspected whether each row of the errors is suspected
 */
export function suspectedRuns(
  columns: ErrorColumns,
  rows: ArrayLike<number>,
  suspected: (row: number) => boolean,
): number[] {
  const list = Int32Array.from(rows);
  if (!columns.has('startMs')) return Array.from(list.filter(suspected), () => 1);
  const days = columns.texts('day', 'runs of wrong fixes');
  const rovers = columns.has('rover') ? rankOf(columns.texts('rover', 'runs of wrong fixes')) : null;
  const starts = columns.numbers('startMs', 'runs of wrong fixes');
  const same = (i: number, j: number): boolean => days[i] === days[j] && rovers?.[i] === rovers?.[j];
  // Only days with suspects matter. Occupations that start together: the suspected one first, whatever the order of rows.
  const daysWithSuspects = new Set(Array.from(list.filter(suspected), (i) => days[i]!));
  const late = starts.map((_, row) => Number(!suspected(row)));
  const order = orderRows(
    list.filter((i) => daysWithSuspects.has(days[i]!)),
    days,
    [...(rovers === null ? [] : [rovers]), starts, late],
  );
  const runs: number[] = [];
  order.forEach((row, k) => {
    if (!suspected(row)) return;
    const before = k === 0 ? null : order[k - 1]!;
    if (before !== null && suspected(before) && same(before, row)) runs[runs.length - 1]! += 1;
    else runs.push(1);
  });
  return runs;
}
