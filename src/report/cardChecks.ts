import type { CheckShotLimit, CheckShotLimits } from '../rule/index.js';
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
  return html`<section id="checks"><h2>Check-in: something is wrong beyond</h2>
${limitTable(page, given)}
${why}<p class="small">Two visits: to one mark on different days, from one base. Two bases: on one day from two bases, both about as far away. About ${page.number(given[0]!, 'falseAlarmsPerYear', 'plain')} false alarm in ${page.number(given[0]!, 'checksPerYear', 'plain')} checks.</p></section>`;
}

/** One row a distance; plan and height side by side. */
function limitTable(page: Page, given: readonly CheckShotLimits[]): Html {
  const { error, distance } = page.units;
  const kinds = [
    ['knownMarkMm', 'known mark'],
    ['otherDayMm', 'two visits'],
    ['twoBasesMm', 'two bases'],
  ] as const;
  const columns = given.flatMap(({ component, limits }) =>
    kinds.map(
      ([key, words]): Column<CheckShotLimit> => ({
        head: `${component === 'horizontal' ? 'Plan' : 'Height'}, ${words}`,
        cell: (_, k) => page.number(limits[k]!, key, 'error on a card'),
      }),
    ),
  );
  return table<CheckShotLimit>(`Differences in ${error.name}`, given[0]!.limits, [
    { head: `Distance, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance') },
    ...columns,
  ]);
}
