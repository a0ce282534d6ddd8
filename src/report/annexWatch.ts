import type { FrozenMark, WatchBasis } from '../rule/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** By what new days are watched: the frozen model, and the means of the marks. */
export function annexWatch(page: Page): Html {
  const { watch } = page.results;
  if (watch.length === 0) return html``;
  return html`<section id="watch"><h2>What new days are held against</h2>
<p>The command watch holds the days of a later study against these numbers. It asks for a new fit when errors have grown, when
the day of review has passed, or when most new shots lie on marks that are not known here.</p>
${watch.map(({ component, basis, reason }) =>
  basis === null
    ? html`<p>The ${component} model cannot be watched by: ${page.text(reason)}.</p>\n`
    : basisWords(page, basis),
)}
</section>
`;
}

function basisWords(page: Page, basis: WatchBasis): Html {
  const { component, lastDay, reviewBy, marks } = basis;
  const review = reviewBy === null ? null : html`; to be looked at again by ${date(reviewBy)}`;
  const words = html`<p>The ${component} model: ${page.counted(basis, 'days', 'day')}, the last of them ${date(lastDay)}${review}. A shot
is worth ${page.number(basis, 'effectiveShare', 'ratio')} of an independent one.</p>\n`;
  if (marks === null) return words;
  const { error } = page.units;
  const heads = component === 'horizontal' ? ['East', 'North'] : ['Up'];
  return html`${words}${table<FrozenMark>(
    `Means of the marks that new ${component} errors are counted from, ${error.name}`,
    marks,
    [
      { head: 'Mark', cell: ({ mark }) => page.name(mark), text: true },
      ...heads.map((head, axis) => ({
        head,
        cell: ({ meanMm }: FrozenMark) => page.number(meanMm as unknown as number[], axis, 'signed error'),
      })),
      { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
    ],
  )}`;
}
