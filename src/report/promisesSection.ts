import type { Results } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { componentTitle } from './words.js';

type Promised = Results['promises'][number];

/** What can be promised at a distance that a job demands. */
export function promisesTables(page: Page): Html {
  const { promises } = page.results;
  if (promises.length === 0) return html``;
  return html`<p>The other way round, for a distance that the job sets: what can be promised there, in ${page.units.error.name}.</p>
${(['horizontal', 'vertical'] as const).map((component) => oneTable(page, component))}`;
}

/** One row a distance, the shares side by side. */
function oneTable(page: Page, component: Promised['component']): Html | null {
  const rows = page.results.promises.filter((row) => row.component === component);
  const first = rows[0];
  if (first === undefined) return null;
  const shares = rows.filter(({ baselineKm }) => baselineKm === first.baselineKm);
  const lengths = rows.filter(({ share }) => share === first.share);
  const caption = html`${componentTitle(component, page.results.heights)}: on ${page.number(first, 'dayShare', 'share')} of days, with ${page.number(first, 'confidence', 'share')} confidence`;
  return table<Promised>(caption, lengths, [
    {
      head: `At, ${page.units.distance.name}`,
      cell: (row) => page.number(row, 'baselineKm', 'distance, rounded down'),
      text: true,
    },
    ...shares.map((column) => ({
      head: html`${page.number(column, 'share', 'share')} within, ${page.units.error.name}`,
      cell: (row: Promised) => {
        const found = rows.find(
          ({ baselineKm, share }) => baselineKm === row.baselineKm && share === column.share,
        );
        if (found === undefined) return '—';
        return found.limitMm === null ? 'nothing' : page.number(found, 'limitMm', 'error rounded up');
      },
    })),
  ]);
}
