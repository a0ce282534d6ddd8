import { escapeHtml } from '../report/index.js';
import type { TextTable } from './tableCells.js';
import { moreRowsWords } from './tableText.js';

const alignment = (numeric: boolean): string => (numeric ? 'right' : 'left');

/** A table as HTML that needs no style sheet: numbers to the right, every text escaped. */
export function tableHtml({ columns, rows, moreRows }: TextTable): string {
  const cell = (tag: 'th' | 'td', text: string, k: number): string =>
    `<${tag} style="text-align: ${alignment(columns[k]!.numeric)}; padding: 2px 10px; white-space: nowrap">${escapeHtml(text)}</${tag}>`;
  const head = columns.map(({ name }, k) => cell('th', name, k)).join('');
  const body = rows.map((row) => `<tr>${row.map((text, k) => cell('td', text, k)).join('')}</tr>`).join('\n');
  const more = moreRowsWords(rows.length, moreRows);
  return [
    '<table style="border-collapse: collapse; font-variant-numeric: tabular-nums">',
    `<thead style="border-bottom: 1px solid"><tr>${head}</tr></thead>`,
    `<tbody>\n${body}\n</tbody>`,
    '</table>',
    more === null ? '' : `<p>${escapeHtml(more)}</p>`,
  ]
    .filter((line) => line !== '')
    .join('\n');
}
