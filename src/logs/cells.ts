import { parse } from 'csv-parse/sync';

/** Delimiters by the names used in a layout. */
export const DELIMITERS: Readonly<Record<string, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  pipe: '|',
};

/**
 * The cells of one line, trimmed; null when a quote opens and does not close. Lines without a quote are the rule
 * and are split here; quoted ones go through csv-parse (RFC 4180 quoting).
 */
export function splitCells(line: string, delimiter: string): string[] | null {
  if (!line.includes('"')) return line.split(delimiter).map((cell) => cell.trim());
  try {
    const [cells] = parse(line, { delimiter, relax_quotes: true, relax_column_count: true, trim: true });
    return cells as string[];
  } catch {
    return null;
  }
}
