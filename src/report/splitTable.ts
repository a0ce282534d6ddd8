import { placeVisits } from '../errors/index.js';
import { type SplitTable, type SummaryRow, standardSplits } from '../split/index.js';
import type { StudyRun } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

const COLUMNS: readonly [head: string, cell: (row: SummaryRow) => number | boolean | null][] = [
  ['occupations', (row) => row.occupations],
  ['days', (row) => row.days],
  ['baselineKm', (row) => row.baselineKm],
  ['radialRmsMm', (row) => row.horizontalRms?.estimate ?? null],
  ['radialRmsLowMm', (row) => row.horizontalRms?.low ?? null],
  ['radialRmsHighMm', (row) => row.horizontalRms?.high ?? null],
  ['radial68Mm', (row) => row.horizontal68],
  ['radial95Mm', (row) => row.horizontal95],
  ['verticalRmsMm', (row) => row.verticalRms?.estimate ?? null],
  ['verticalRmsLowMm', (row) => row.verticalRms?.low ?? null],
  ['verticalRmsHighMm', (row) => row.verticalRms?.high ?? null],
  ['vertical68Mm', (row) => row.vertical68],
  ['vertical95Mm', (row) => row.vertical95],
  ['meanEastMm', (row) => row.meanEast],
  ['meanNorthMm', (row) => row.meanNorth],
  ['meanUpMm', (row) => row.meanUp],
  ['visitsWithoutFix', (row) => row.visitsWithoutFix],
  ['shareWithoutFix', (row) => row.shareWithoutFix],
  ['tooFew', (row) => row.tooFew],
];

/** Splits take long for long studies, and table, annex and charts show the same ones. */
const known = new WeakMap<StudyRun, readonly SplitTable[]>();

/** The errors of a run split by everything that is known of them; suspected wrong fixes are left out. */
export function splitsOf(run: StudyRun): readonly SplitTable[] {
  const found = known.get(run);
  if (found !== undefined) return found;
  const { errors, weights, visits, control, results } = run;
  const used = errors.filter((_, i) => weights[i]! >= 0.5);
  const { confidence } = results.fits[0] ?? { confidence: 0.95 };
  const splits = standardSplits(used, placeVisits(visits, control), { confidence });
  known.set(run, splits);
  return splits;
}

/** All splits in one table, one row a group. */
export function splitTable(run: StudyRun): ReportTable {
  const value = (cell: number | boolean | null): Cell =>
    typeof cell === 'number' ? (Number.isFinite(cell) ? Number(cell.toPrecision(6)) : null) : cell;
  return {
    name: 'splits',
    header: ['by', 'group', ...COLUMNS.map(([head]) => head)],
    rows: splitsOf(run).flatMap(({ title, rows }) =>
      rows.map((row): Cell[] => [title, row.group, ...COLUMNS.map(([, cell]) => value(cell(row)))]),
    ),
  };
}
