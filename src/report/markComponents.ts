import type { MarkComponentResult } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** How large the errors of the marks' own coordinates are. */
export function markComponents(page: Page): Html {
  const { markComponents: found } = page.results;
  if (found.length === 0) {
    return html`<p>How large the errors of the marks’ own coordinates are could not be told: that takes marks visited on several days.</p>\n`;
  }
  return table<MarkComponentResult>('Errors of the coordinates of the marks', found, [
    { head: 'Component', cell: ({ component }) => component, text: true },
    { head: 'Marks', cell: (row) => page.number(row, 'marks', 'count') },
    { head: 'Standing', cell: ({ standing }) => standing, text: true },
    {
      head: `Spread per axis, ${page.units.error.name}`,
      cell: ({ sigmaMm }) => page.limits(sigmaMm, 'error'),
    },
    {
      head: 'Chance that marks differ so by days alone',
      cell: (row) => page.number(row, 'differPValue', 'chance'),
    },
    {
      head: 'Signed ppm of their means',
      cell: ({ signedPpm }) =>
        signedPpm === null
          ? '—'
          : html`${page.number(signedPpm, 'ppm', 'signed ppm')} (${page.number(signedPpm, 'low', 'signed ppm')} to ${page.number(signedPpm, 'high', 'signed ppm')})`,
    },
  ]);
}
