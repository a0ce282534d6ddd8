import { type Html, html, trusted } from './html.js';

/** A column of a table in the report: heading, how a cell is written, and whether it is a number. */
export interface Column<Row> {
  readonly head: string;
  readonly cell: (row: Row) => string | Html;
  readonly text?: boolean;
}

export function table<Row>(caption: string, rows: readonly Row[], columns: readonly Column<Row>[]): Html {
  const kind = ({ text }: Column<Row>): Html => trusted(text ? '' : ' class="number"');
  const heads = columns.map((column) => html`<th scope="col"${kind(column)}>${column.head}</th>`);
  const lines = rows.map(
    (row) => html`<tr>${columns.map((column) => html`<td${kind(column)}>${column.cell(row)}</td>`)}</tr>\n`,
  );
  return html`<div class="scroll"><table><caption>${caption}</caption>
<thead><tr>${heads}</tr></thead>
<tbody>
${lines}</tbody></table></div>
`;
}
