import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import type { Cell, ReportTable } from './tables.js';

/** More rows than these are no page any more: the others stand in the table itself. */
const MOST_ROWS = 200;

/** The occupations behind the fits, those set aside, and visits without a fix, each with file and row. */
export function annexOccupations(page: Page, tables: readonly ReportTable[]): Html {
  const of = (name: string): ReportTable => tables.find((each) => each.name === name)!;
  return html`<section id="occupations"><h2>Occupations</h2>
<p>Each line can be traced to a line of a log. The whole tables, with more columns, are those named below.</p>
${occupationTable(page, of('errors'), 'Occupations used')}
${of('set-aside-occupations').rows.length === 0 ? html`<p>No occupation was set aside.</p>` : occupationTable(page, of('set-aside-occupations'), 'Occupations set aside')}
${visitTable(page, of('visits-without-fix'))}
</section>
`;
}

type Row = readonly Cell[];

function occupationTable(page: Page, from: ReportTable, title: string): Html {
  const { error, distance } = page.units;
  const column = reader(from);
  const number = (head: string, name: string, kind: 'signed error' | 'distance') => ({
    head,
    cell: (row: Row, k: number) => page.cell(from.name, k, name, column(row, name) as number | null, kind),
  });
  const text = (name: string) => (row: Row) => String(column(row, name) ?? '');
  const set = from.header.includes('reason');
  return table<Row>(
    `${title}, errors in ${error.name}`,
    from.rows,
    [
      { head: 'Day', cell: (row) => date(text('day')(row)), text: true },
      { head: 'Mark', cell: (row) => page.name(text('mark')(row)), text: true },
      { head: 'Base', cell: (row) => page.name(text('base')(row)), text: true },
      number(`Distance, ${distance.name}`, 'baselineKm', 'distance'),
      number('East', 'eastMm', 'signed error'),
      number('North', 'northMm', 'signed error'),
      number('Up', 'upMm', 'signed error'),
      ...(set
        ? [
            {
              head: 'Why',
              cell: (row: Row) => page.text(`${text('reason')(row)}: ${text('detail')(row)}`),
              text: true,
            },
          ]
        : []),
      { head: 'File', cell: (row) => page.name(text('file')(row)), text: true },
      {
        head: 'Line',
        cell: (row, k) => page.cell(from.name, k, 'row', column(row, 'row') as number, 'plain'),
      },
    ],
    cutWords(from),
  );
}

function visitTable(page: Page, from: ReportTable): Html {
  if (from.rows.length === 0) return html`<p>Every visit got a fix.</p>\n`;
  const column = reader(from);
  const text = (name: string) => (row: Row) => String(column(row, name) ?? '');
  return table<Row>(
    'Visits that never got a fix',
    from.rows,
    [
      { head: 'Day', cell: (row) => date(text('day')(row)), text: true },
      { head: 'Began', cell: (row) => text('start')(row).slice(11, 16) || 'not known', text: true },
      { head: 'Mark', cell: (row) => page.name(text('mark')(row)), text: true },
      { head: 'Base', cell: (row) => page.name(text('base')(row)), text: true },
      { head: 'Rover', cell: (row) => page.name(text('rover')(row)), text: true },
      {
        head: 'Rows',
        cell: (row, k) => page.cell(from.name, k, 'rows', column(row, 'rows') as number, 'count'),
      },
    ],
    cutWords(from),
  );
}

const cutWords = ({ name, rows }: ReportTable) => ({
  most: MOST_ROWS,
  words: html`Shown are the first <data value="${MOST_ROWS}" data-cut="${name}">${MOST_ROWS}</data> of
<data value="${rows.length}" data-rows="${name}">${rows.length}</data>; all of them stand in tables/${name}.csv.`,
});

const reader =
  ({ header }: ReportTable) =>
  (row: Row, name: string): Cell =>
    row[header.indexOf(name)] ?? null;
