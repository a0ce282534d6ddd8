import type { ReportTable } from './tables.js';
import type { HeightKind } from './words.js';

/** Columns of heights or of their errors. */
const VERTICAL = /^(up|vertical)|Up[A-Z]/;

/** A table that holds anything vertical says of which kind the heights are, in a last column. */
export function withHeightsColumn(table: ReportTable, heights: HeightKind): ReportTable {
  const { header, rows } = table;
  const component = header.indexOf('component');
  if (header.includes('heights') || !(component >= 0 || header.some((head) => VERTICAL.test(head)))) {
    return table;
  }
  return {
    ...table,
    header: [...header, 'heights'],
    rows: rows.map((row) => [...row, component < 0 || row[component] === 'vertical' ? heights : null]),
  };
}
