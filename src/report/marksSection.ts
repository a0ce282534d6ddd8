import type { MarkResult } from '../study/index.js';
import { controlTable } from './controlTable.js';
import { NOT_GIVEN } from './format.js';
import { type Html, html } from './html.js';
import { markComponents } from './markComponents.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** Where the marks are and what their mean errors are. */
export function marksSection(
  page: Page,
  charts: { readonly map: readonly Html[]; readonly means: Html | null },
): Html {
  const { marks, heights, siteMarks } = page.results;
  const { error, distance } = page.units;
  if (marks.length === 0) return html``;
  const residuals = new Set(siteMarks);
  const mean =
    (component: 'east' | 'north' | 'up') =>
    (row: MarkResult): Html => {
      if (row[component] === null) return html`${NOT_GIVEN}`;
      const se = row.se[component] === null ? null : html` ± ${page.number(row.se, component, 'error')}`;
      return html`${page.number(row, component, 'signed error')}${se}`;
    };
  return html`<section id="marks"><h2>The marks</h2>
<p>The mean error of a mark holds what is the same on every day: errors of its coordinates and of the base's. A mean that
is large beside its standard error asks for a look at the coordinates.</p>
${charts.map}${charts.means}
${table(`Mean error of each mark ± its standard error, which counts days, ${error.name}`, marks, [
  {
    head: 'Mark',
    cell: ({ mark }) => html`${page.name(mark)}${residuals.has(mark) ? ' (residual)' : ''}`,
    text: true,
  },
  { head: 'Base', cell: ({ base }) => page.name(base), text: true },
  { head: `Distance, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance') },
  { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
  { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
  { head: 'East', cell: mean('east') },
  { head: 'North', cell: mean('north') },
  { head: `Up (${heights})`, cell: mean('up') },
  { head: 'Stands out', cell: ({ standsOut }) => outWords(standsOut), text: true },
])}
${markComponents(page)}
${residualWords(marks.some(({ mark }) => residuals.has(mark)))}${controlTable(page)}</section>
`;
}

const outWords = ({ horizontal, vertical }: MarkResult['standsOut']): string =>
  [...(horizontal ? ['in plan'] : []), ...(vertical ? ['in height'] : [])].join(' and ') || 'no';

const residualWords = (any: boolean): Html | null =>
  any
    ? html`<p class="small">Residual: the job was fitted to this mark, so that what stands there is what that fit left over and no check. It
takes part in the fits all the same and makes errors look smaller than they are.</p>
`
    : null;
