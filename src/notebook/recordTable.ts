import { type TextTable, textTable } from './tableCells.js';

/** A single result, such as a promise or the test of a spec sheet, as a table of its keys and values. */
export function recordTable(record: object): TextTable {
  return {
    columns: [
      { name: '', numeric: false },
      { name: 'value', numeric: false },
    ],
    rows: Object.entries(record).flatMap(([name, value]) => keyRows(name, value)),
    moreRows: 0,
  };
}

function keyRows(name: string, value: unknown): string[][] {
  if (typeof value === 'function') return [];
  const entries = entriesOf(value);
  if (entries !== null) return [[name, `${entries} ${entries === 1 ? 'entry' : 'entries'}`]];
  // a nested record becomes rows of its own, as it becomes columns in a table
  const { columns, rows } = textTable([{ [name]: value }], 1);
  return columns.map((column, k) => [column.name, rows[0]![k]!]);
}

/** How many entries a list of records, a map or an array of numbers has; null for what fits into a cell. */
function entriesOf(value: unknown): number | null {
  if (value instanceof Map || value instanceof Set) return value.size;
  if (ArrayBuffer.isView(value)) return (value as Float64Array).length;
  if (!Array.isArray(value) || value.length === 0) return null;
  return typeof value[0] === 'object' || value.length > MOST_IN_CELL ? value.length : null;
}

const MOST_IN_CELL = 20;
