import type { Cell } from './tables.js';

/** Rows as comma-separated text with the quoting of RFC 4180 and LF line ends; what is not known is a blank cell. */
export function csvText(header: readonly string[], rows: Iterable<readonly Cell[]>): string {
  const lines = [header.map(csvCell).join(',')];
  for (const row of rows) lines.push(row.map(csvCell).join(','));
  return `${lines.join('\n')}\n`;
}

/** One line of a CSV file. */
export const csvLine = (row: readonly Cell[]): string => `${row.map(csvCell).join(',')}\n`;

function csvCell(cell: Cell): string {
  if (cell === null || (typeof cell === 'number' && Number.isNaN(cell))) return '';
  // Six decimals hold every figure here to its last useful digit, and not the noise of the arithmetic.
  const text = String(typeof cell === 'number' ? Number(cell.toFixed(6)) : cell);
  return /[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
