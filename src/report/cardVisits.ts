import type { Results } from '../study/index.js';
import { withinReach } from './cardReach.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Visits = Results['secondVisits'][number];
type Visit = Visits['visits'][number];

/** A second visit is worth its way where it leaves this share of the error or less; 0.71 is the least. */
const WORTH = 0.8;

/** A new point shot twice on one day: how long to wait, and how far both may lie apart. */
export function secondVisit(page: Page): Html {
  const given = page.results.secondVisits
    .map((one) => ({ ...one, visits: withinReach(page.results, one.visits) }))
    .filter(({ visits }) => visits.some(({ differenceLimitMm }) => differenceLimitMm !== null));
  if (given.length === 0) {
    return html`<section id="twice"><h2>A new point, twice</h2>
<p>What a second visit on the same day gains could not be found. Visit again on another day, or from another base.</p></section>`;
  }
  const { minutes, worth } = gapOf(given);
  const { distance, error } = page.units;
  const lengths = given
    .flatMap(({ visits }) => visits.filter((visit) => visit.minutes === minutes))
    .filter(({ baselineKm }, k, all) => all.findIndex((other) => other.baselineKm === baselineKm) === k)
    .sort((a, b) => a.baselineKm - b.baselineKm);
  const advice = worth
    ? html`Come back after <strong>${page.number(lengths[0]!, 'minutes', 'count')} minutes</strong> or more, with a new fix. Take the mean.`
    : html`No gap up to <strong>${page.number(lengths[0]!, 'minutes', 'count')} minutes</strong> makes the mean of both much better: come back on another day where it matters.`;
  return html`<section id="twice"><h2>A new point, twice on one day</h2>
<p>${advice} Something is wrong beyond:</p>
${table<Visit>(`Difference of both visits, ${error.name}; error left in the mean, % of one shot’s`, lengths, [
  {
    head: `At, ${distance.name}`,
    cell: (row) => page.number(row, 'baselineKm', 'distance, rounded down'),
    text: true,
  },
  ...given.map(({ component, visits }) => ({
    head: nameOf(component),
    cell: ({ baselineKm }: Visit) => {
      const widest = widestFrom(visits, baselineKm, minutes);
      return widest === null ? '—' : page.number(widest, 'differenceLimitMm', 'error on a card');
    },
  })),
  ...given.map(({ component, visits }) => ({
    head: `${nameOf(component)}: left, %`,
    cell: ({ baselineKm }: Visit) => {
      const own = visits.find((visit) => visit.minutes === minutes && visit.baselineKm === baselineKm);
      return own === undefined ? '—' : page.number(own.factor, 'estimate', 'whole share');
    },
  })),
])}</section>`;
}

const nameOf = (component: Visits['component']): string => (component === 'horizontal' ? 'Plan' : 'Height');

/** Visits farther apart in time are less alike: the limit for a gap "or more" is the widest of these. */
function widestFrom(visits: readonly Visit[], baselineKm: number, minutes: number): Visit | null {
  return visits
    .filter((visit) => visit.baselineKm === baselineKm && visit.minutes >= minutes)
    .filter(({ differenceLimitMm }) => differenceLimitMm !== null)
    .reduce<Visit | null>(
      (widest, visit) =>
        widest === null || visit.differenceLimitMm! > widest.differenceLimitMm! ? visit : widest,
      null,
    );
}

/** The shortest gap that is worth its way at all distances, else the longest. */
function gapOf(given: readonly Visits[]): { readonly minutes: number; readonly worth: boolean } {
  const all = given.flatMap(({ visits }) => visits);
  const gaps = [...new Set(all.map(({ minutes }) => minutes))].sort((a, b) => a - b);
  const isWorth = (gap: number): boolean =>
    all.every(({ minutes, factor }) => minutes !== gap || (factor.estimate ?? 1) <= WORTH);
  const found = gaps.find(isWorth);
  return { minutes: found ?? gaps.at(-1)!, worth: found !== undefined };
}
