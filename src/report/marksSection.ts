import type { MarkMean } from '../split/index.js';
import type { Results } from '../study/index.js';
import { controlTable } from './controlTable.js';
import { count, km, mm, NOT_GIVEN } from './format.js';
import { type Html, html } from './html.js';
import { table } from './table.js';

/** Where the marks are and what their mean errors are. */
export function marksSection(
  results: Results,
  charts: { readonly map: readonly Html[]; readonly means: Html | null },
): Html {
  const { marks, heights, siteMarks } = results;
  if (marks.length === 0) return html``;
  const residuals = new Set(siteMarks);
  const mean =
    (component: 'east' | 'north' | 'up') =>
    (row: MarkMean): string => {
      const [value, se] = [row[component], row.se[component]];
      return value === null ? NOT_GIVEN : `${mm(value)}${se === null ? '' : ` ± ${mm(se)}`}`;
    };
  return html`<section id="marks"><h2>The marks</h2>
<p>The mean error of a mark holds what is the same on every day: errors of its coordinates and of the base's. A mean that
is large beside its standard error asks for a look at the coordinates.</p>
${charts.map}${charts.means}
${table('Mean error of each mark ± its day-clustered standard error, mm', marks, [
  { head: 'Mark', cell: ({ mark }) => (residuals.has(mark) ? `${mark} (residual)` : mark), text: true },
  { head: 'Base', cell: ({ base }) => base, text: true },
  { head: 'Distance, km', cell: ({ baselineKm }) => km(baselineKm) },
  { head: 'Occupations', cell: ({ occupations }) => count(occupations) },
  { head: 'Days', cell: ({ days }) => count(days) },
  { head: 'East', cell: mean('east') },
  { head: 'North', cell: mean('north') },
  { head: `Up (${heights})`, cell: mean('up') },
])}
${residualWords(marks.some(({ mark }) => residuals.has(mark)))}${controlTable(results)}</section>
`;
}

const residualWords = (any: boolean): Html | null =>
  any
    ? html`<p class="small">Residual: the job was fitted to this mark, so that what stands there is what that fit left over and no check. It
takes part in the fits all the same and makes errors look smaller than they are.</p>
`
    : null;
