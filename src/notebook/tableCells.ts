import type { ColumnTable } from 'arquero';

/** A table ready to be written: every cell a text. */
export interface TextTable {
  readonly columns: readonly { readonly name: string; readonly numeric: boolean }[];
  readonly rows: readonly (readonly string[])[];
  /** Rows that are not among `rows`. */
  readonly moreRows: number;
}

type Row = Readonly<Record<string, unknown>>;

/** What stands for a value that is not there. */
const MISSING = '–';

/**
 * The first rows of a table or of records as texts. Numbers of a column share their decimals; an estimate with limits
 * becomes one cell; other nested records become columns of their own (`se.east`).
 */
export function textTable(table: ColumnTable | readonly object[], mostRows: number): TextTable {
  const [shown, total] = isColumnTable(table)
    ? [table.objects({ limit: mostRows }) as Row[], table.numRows()]
    : [table.slice(0, mostRows) as Row[], table.length];
  const rows = shown.map(flattened);
  const names = [...new Set(rows.flatMap((row) => Object.keys(row)))];
  const columns = names.map((name) => columnTexts(rows.map((row) => row[name])));
  return {
    columns: names.map((name, k) => ({ name, numeric: columns[k]!.numeric })),
    rows: rows.map((_, i) => columns.map(({ texts }) => texts[i]!)),
    moreRows: total - rows.length,
  };
}

/** Whether a value is an arquero table. */
export const isColumnTable = (value: unknown): value is ColumnTable =>
  typeof value === 'object' && value !== null && 'numRows' in value && typeof value.numRows === 'function';

function flattened(row: Row): Row {
  return Object.fromEntries(
    Object.entries(row).flatMap(([name, value]) =>
      isPlainRecord(value) && !isEstimate(value)
        ? Object.entries(value).map(([inner, part]) => [`${name}.${inner}`, part])
        : [[name, value]],
    ),
  );
}

const isPlainRecord = (value: unknown): value is Row =>
  typeof value === 'object' && value !== null && Object.getPrototypeOf(value) === Object.prototype;

interface Estimate {
  readonly estimate: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

const isEstimate = (value: unknown): value is Estimate =>
  isPlainRecord(value) && ['estimate', 'low', 'high'].every((key) => key in value);

function columnTexts(values: readonly unknown[]): { readonly texts: string[]; readonly numeric: boolean } {
  const numbers = values
    .flatMap((value) => (isEstimate(value) ? Object.values(value) : [value]))
    .filter(isFiniteNumber);
  const decimals = decimalsFor(numbers);
  const known = values.filter((value) => value !== null && value !== undefined);
  return {
    texts: values.map((value) => cellText(value, decimals)),
    numeric: known.length > 0 && known.every((value) => typeof value === 'number' || isEstimate(value)),
  };
}

const isFiniteNumber = (value: unknown): value is number =>
  typeof value === 'number' && Number.isFinite(value);

/** Decimals that show about four digits of the largest number, and no zeros that all numbers end with. */
function decimalsFor(numbers: readonly number[]): number {
  const largest = numbers.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const most = largest >= 100 ? 1 : largest >= 10 ? 2 : 3;
  const texts = numbers.map((value) => value.toFixed(most));
  const zeros = Math.min(...texts.map((text) => /0*$/.exec(text)![0].length));
  return texts.length === 0 ? 0 : Math.max(0, most - zeros);
}

function cellText(value: unknown, decimals: number): string {
  if (value === null || value === undefined) return MISSING;
  if (typeof value === 'number') return numberText(value, decimals);
  if (isEstimate(value)) {
    const [estimate, low, high] = [value.estimate, value.low, value.high].map((part) =>
      cellText(part, decimals),
    );
    return value.low === null && value.high === null ? estimate! : `${estimate} (${low} to ${high})`;
  }
  if (value instanceof Date) return value.toISOString();
  if (Array.isArray(value)) return value.map((part) => cellText(part, decimals)).join(', ');
  return typeof value === 'object' ? JSON.stringify(value) : String(value);
}

function numberText(value: number, decimals: number): string {
  if (Number.isNaN(value)) return MISSING;
  if (!Number.isFinite(value)) return value > 0 ? '∞' : '-∞';
  // small values, such as probabilities, must not be shown as 0
  const vanishes = value !== 0 && Math.abs(value) < 0.5 * 10 ** -decimals;
  return vanishes ? String(Number(value.toPrecision(2))) : value.toFixed(decimals);
}
