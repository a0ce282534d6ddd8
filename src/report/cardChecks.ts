import type { CheckShotLimit, CheckShotLimits } from '../rule/index.js';
import { withinReach } from './cardReach.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { type Column, table } from './table.js';

/** How far a check on a known mark, and two visits from each other, may lie apart. */
export function checkShots(page: Page): Html {
  const { checkShotLimits: limits } = page.results;
  const given = limits.filter((each) => each.limits.length > 0);
  const missing = limits.filter((each) => each.limits.length === 0);
  const why = missing.map(
    ({ component, reason }) =>
      html`<p class="small">No limit ${component === 'horizontal' ? 'in plan' : 'in height'}: ${page.text(reason ?? '')}. Use the limit of the office.</p>`,
  );
  if (given.length === 0) {
    return html`<section id="checks"><h2>Check-in on a known mark</h2>
${why.length === 0 ? html`<p>No limits can be given: no fit was possible. Use the limits of the office.</p>` : why}</section>`;
  }
  return html`<section id="checks"><h2>Something is wrong beyond</h2>
<div class="pair">${given.map((one) => limitTable(page, one))}</div>
${why}<p class="small">Known mark: the check-in, measured minus known. Another day: two visits to one point on different days, from one base. Another base: on one day from two bases, both about as far away. About ${page.number(given[0]!, 'falseAlarmsPerYear', 'plain')} false alarm in ${page.number(given[0]!, 'checksPerYear', 'plain')} checks.</p></section>`;
}

const KINDS = [
  ['knownMarkMm', 'Known mark'],
  ['otherDayMm', 'Another day'],
  ['twoBasesMm', 'Another base'],
] as const;

/** One row a distance. */
function limitTable(page: Page, { component, limits }: CheckShotLimits): Html {
  const { error, distance } = page.units;
  return table<CheckShotLimit>(
    `${component === 'horizontal' ? 'Plan' : 'Height'}: differences, ${error.name}`,
    withinReach(page.results, limits),
    [
      {
        head: `At, ${distance.name}`,
        cell: (row) => page.number(row, 'baselineKm', 'distance, rounded down'),
        text: true,
      },
      ...KINDS.map(
        ([key, head]): Column<CheckShotLimit> => ({
          head,
          cell: (row) => page.number(row, key, 'error on a card'),
        }),
      ),
    ],
  );
}
