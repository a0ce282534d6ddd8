import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { figure, type ReportPicture } from './pictures.js';
import { table } from './table.js';
import type { Cell, ReportTable } from './tables.js';

/** A split with more groups than these is cut on the page. */
const MOST_ROWS = 60;

interface Group {
  /** Row of the whole table. */
  readonly at: number;
  readonly row: readonly Cell[];
}

/** The errors split by everything that is known of them. */
export function annexSplits(
  page: Page,
  splits: ReportTable,
  hourDays: readonly ReportPicture[],
  charts: readonly ReportPicture[],
): Html {
  if (splits.rows.length === 0) return html``;
  const tables = new Map<string, Group[]>();
  splits.rows.forEach((row, at) => {
    const by = String(row[0]);
    // Lengths stand among the fits, in the units of the reader.
    if (by.startsWith('baseline length')) return;
    tables.set(by, [...(tables.get(by) ?? []), { at, row }]);
  });
  return html`<section id="splits"><h2>The errors split</h2>
<p>What was measured, all distances together: classes may differ because their distances do. Suspected wrong fixes are left
out. With a star: fewer than 10 occupations, or, where the classes are not days or setups themselves, 3 days; they describe these occupations and nothing more.</p>
${[...hourDays, ...charts].map(figure)}
${[...tables].map(([by, groups]) => splitTable(page, splits, by, groups))}
</section>
`;
}

function splitTable(page: Page, { name, header }: ReportTable, by: string, groups: readonly Group[]): Html {
  const { error, distance } = page.units;
  const column = (title: string): number => header.indexOf(title);
  const cell = ({ at, row }: Group, title: string, kind: Parameters<Page['number']>[2]): Html =>
    page.cell(name, at, title, row[column(title)] as number | null, kind);
  const rms = (group: Group, of: 'radial' | 'vertical'): Html =>
    group.row[column(`${of}RmsMm`)] === null
      ? html`—`
      : html`${cell(group, `${of}RmsMm`, 'error')}${
          group.row[column(`${of}RmsLowMm`)] === null
            ? null
            : html` (${cell(group, `${of}RmsLowMm`, 'error')} to ${cell(group, `${of}RmsHighMm`, 'error')})`
        }${group.row[column('tooFew')] === true ? ' *' : ''}`;
  return table<Group>(
    html`Split by ${page.text(by)}`,
    groups,
    [
      { head: 'Class', cell: ({ row }) => groupName(page, by, String(row[1])), text: true },
      { head: 'Occupations', cell: (group) => cell(group, 'occupations', 'count') },
      { head: 'Days', cell: (group) => cell(group, 'days', 'count') },
      { head: `Distance, ${distance.name}`, cell: (group) => cell(group, 'baselineKm', 'distance') },
      { head: `Radial RMS, ${error.name}`, cell: (group) => rms(group, 'radial') },
      { head: `Vertical RMS, ${error.name}`, cell: (group) => rms(group, 'vertical') },
      { head: 'Without a fix', cell: (group) => cell(group, 'shareWithoutFix', 'share') },
    ],
    {
      most: MOST_ROWS,
      words: html`Shown are the first <data value="${MOST_ROWS}" data-cut="${name}">${MOST_ROWS}</data> classes; all of them stand in tables/${name}.csv.`,
    },
  );
}

function groupName(page: Page, by: string, group: string): string | Html {
  if (by === 'crew') return page.crew(group);
  return by === 'day' || by === 'month' ? date(group) : page.name(group);
}
