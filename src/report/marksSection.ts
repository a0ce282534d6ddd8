import type { MarkMean } from '../split/index.js';
import type { Results } from '../study/index.js';
import { count, km, mm, NOT_GIVEN } from './format.js';
import { type Html, html } from './html.js';
import { table } from './table.js';

/** Where the marks are and what their mean errors are. */
export function marksSection(
  { marks }: Results,
  charts: { readonly map: readonly Html[]; readonly means: Html | null },
): Html {
  if (marks.length === 0) return html``;
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
  { head: 'Mark', cell: ({ mark }) => mark, text: true },
  { head: 'Base', cell: ({ base }) => base, text: true },
  { head: 'Distance, km', cell: ({ baselineKm }) => km(baselineKm) },
  { head: 'Occupations', cell: ({ occupations }) => count(occupations) },
  { head: 'Days', cell: ({ days }) => count(days) },
  { head: 'East', cell: mean('east') },
  { head: 'North', cell: mean('north') },
  { head: 'Up', cell: mean('up') },
])}
</section>
`;
}
