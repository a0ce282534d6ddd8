import type { Results } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Visits = Results['secondVisits'][number];
type Visit = Visits['visits'][number];

/** A second visit is worth its way where it leaves this share of the error or less; 0.71 is the least. */
const WORTH = 0.8;

/** A new point shot twice on one day: how long to wait, and how far both may lie apart. */
export function secondVisit(page: Page): Html {
  const given = page.results.secondVisits.filter(({ visits }) =>
    visits.some(({ differenceLimitMm }) => differenceLimitMm !== null),
  );
  if (given.length === 0) {
    return html`<section id="twice"><h2>A new point, twice</h2>
<p>What a second visit on the same day gains could not be found. Visit again on another day, or from another base.</p></section>`;
  }
  const minutes = gapOf(given);
  const { distance, error } = page.units;
  const rows = given[0]!.visits.filter((visit) => visit.minutes === minutes);
  return html`<section id="twice"><h2>A new point, twice on one day</h2>
<p>Come back after <strong>${page.number(rows[0]!, 'minutes', 'count')} minutes</strong> or more, with a new fix. Take the mean. Something is wrong beyond:</p>
${table<Visit>(`Difference of both visits, ${error.name}`, rows, [
  { head: `At, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance'), text: true },
  ...given.map(({ component, visits }) => ({
    head: component === 'horizontal' ? 'Plan' : 'Height',
    cell: ({ baselineKm }: Visit) => {
      const own = visits.find((visit) => visit.minutes === minutes && visit.baselineKm === baselineKm);
      return own === undefined ? '—' : page.number(own, 'differenceLimitMm', 'error on a card');
    },
  })),
  {
    head: 'Error left in the mean',
    cell: ({ factor }) => page.number(factor, 'estimate', 'share'),
  },
])}</section>`;
}

/** The shortest gap that is worth its way at all distances, else the longest. */
function gapOf(given: readonly Visits[]): number {
  const all = given.flatMap(({ visits }) => visits);
  const gaps = [...new Set(all.map(({ minutes }) => minutes))].sort((a, b) => a - b);
  const worth = (gap: number): boolean =>
    all.every(({ minutes, factor }) => minutes !== gap || (factor.estimate ?? 1) <= WORTH);
  return gaps.find(worth) ?? gaps.at(-1)!;
}
