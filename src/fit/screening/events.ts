import type { ErrorColumns } from '../../errors/index.js';

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
  const list = Array.from(rows);
  if (!columns.has('startMs')) return list.filter(suspected).map(() => 1);
  const days = columns.texts('day', 'runs of wrong fixes');
  const rovers = columns.has('rover') ? columns.texts('rover', 'runs of wrong fixes') : null;
  const starts = columns.numbers('startMs', 'runs of wrong fixes');
  const same = (i: number, j: number): boolean =>
    days[i] === days[j] && (rovers === null || rovers[i] === rovers[j]);
  // Only days with suspects matter. Occupations that start together: the suspected one first, whatever the order of rows.
  const daysWithSuspects = new Set(list.filter(suspected).map((i) => days[i]!));
  const order = list
    .filter((i) => daysWithSuspects.has(days[i]!))
    .sort(
      (i, j) =>
        compare(days[i]!, days[j]!) ||
        (rovers === null ? 0 : compare(rovers[i]!, rovers[j]!)) ||
        compare(starts[i]!, starts[j]!) ||
        Number(suspected(j)) - Number(suspected(i)),
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

const compare = <T>(a: T, b: T): number => (a < b ? -1 : a > b ? 1 : 0);
