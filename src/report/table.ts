import { type Html, html, plainText, trusted } from './html.js';

/** A column of a table in the report: heading, how a cell is written, and whether it is a number. */
export interface Column<Row> {
  readonly head: string | Html;
  readonly cell: (row: Row, index: number) => string | Html;
  readonly text?: boolean;
}

/** What is said below a table of which only the first rows stand on a page. */
export interface Cut {
  readonly most: number;
  /** `Shown are … of …`. */
  readonly words: Html;
}

export function table<Row>(
  caption: string | Html,
  rows: readonly Row[],
  columns: readonly Column<Row>[],
  cut?: Cut,
): Html {
  const kind = ({ text }: Column<Row>): Html => trusted(text ? '' : ' class="number"');
  const heads = columns.map((column) => html`<th scope="col"${kind(column)}>${column.head}</th>`);
  const shown = cut === undefined ? rows : rows.slice(0, cut.most);
  const lines = shown.map(
    (row, k) => html`<tr>${columns.map((column, c) => cellHtml(column.cell(row, k), column, c))}</tr>\n`,
  );
  return html`<div class="scroll" tabindex="0" role="region" aria-label="${typeof caption === 'string' ? caption : plainText(caption)}"><table${trusted(shown.length > 12 ? ' class="long"' : '')}><caption>${caption}</caption>
<thead><tr>${heads}</tr></thead>
<tbody>
${lines}</tbody></table></div>
${shown.length < rows.length ? html`<p class="small">${cut!.words}</p>\n` : null}`;

  /** The first column names the row. */
  function cellHtml(content: string | Html, column: Column<Row>, index: number): Html {
    const empty = rows.length > 0 && content === '';
    const written = empty ? '—' : content;
    return index === 0 && column.text
      ? html`<th scope="row">${written}</th>`
      : html`<td${kind(column)}>${written}</td>`;
  }
}
