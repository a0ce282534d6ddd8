import { placeVisits } from '../errors/index.js';
import { type SummaryRow, standardSplits } from '../split/index.js';
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

/** The errors split by everything that is known of them, one row a group; suspected wrong fixes are left out. */
export function splitTable({ errors, weights, visits, control, results }: StudyRun): ReportTable {
  const used = errors.filter((_, i) => weights[i]! >= 0.5);
  const { confidence } = results.fits[0] ?? { confidence: 0.95 };
  const tables = standardSplits(used, placeVisits(visits, control), { confidence });
  const value = (cell: number | boolean | null): Cell =>
    typeof cell === 'number' ? (Number.isFinite(cell) ? Number(cell.toPrecision(6)) : null) : cell;
  return {
    name: 'splits',
    header: ['by', 'group', ...COLUMNS.map(([head]) => head)],
    rows: tables.flatMap(({ title, rows }) =>
      rows.map((row): Cell[] => [title, row.group, ...COLUMNS.map(([, cell]) => value(cell(row)))]),
    ),
  };
}
