import { table, toArrowIPC } from 'arquero';
import type { Cell, ReportTable } from './tables.js';

/**
 * A table as an Arrow IPC file, which R, Python and others read with types: numbers as 64-bit floats, texts, truths; what
 * is not known is null.
 */
export function arrowBytes({ header, rows }: ReportTable): Uint8Array {
  const columns = header.map((name, k): [string, Cell[]] => [name, rows.map((row) => missing(row[k]!))]);
  return toArrowIPC(table(columns), { format: 'file' });
}

const missing = (cell: Cell): Cell => (typeof cell === 'number' && Number.isNaN(cell) ? null : cell);
