import type { TextTable } from './tableCells.js';

/** A table in columns of plain text: numbers to the right, two blanks between columns. */
export function tableText({ columns, rows, moreRows }: TextTable): string {
  const widths = columns.map(({ name }, k) =>
    Math.max(...[name, ...rows.map((row) => row[k]!)].map(textLength)),
  );
  const line = (cells: readonly string[]): string =>
    cells
      .map((text, k) => {
        const blanks = ' '.repeat(widths[k]! - textLength(text));
        return columns[k]!.numeric ? blanks + text : text + blanks;
      })
      .join('  ')
      .trimEnd();
  const more = moreRowsWords(rows.length, moreRows);
  return [
    ...(columns.length === 0 ? [] : [line(columns.map(({ name }) => name))]),
    ...rows.map(line),
    ...(more === null ? [] : [more]),
  ].join('\n');
}

const textLength = (text: string): number => [...text].length;

/** What is said below the rows; null when all are there. */
export function moreRowsWords(shown: number, moreRows: number): string | null {
  if (shown === 0) return 'no rows';
  return moreRows === 0 ? null : `… ${moreRows} more ${moreRows === 1 ? 'row' : 'rows'}`;
}
