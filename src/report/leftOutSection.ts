import type { Results } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** What leaving out days changed: fits and rules with them, beside those without. */
export function leftOutSection(page: Page): Html {
  const { leftOut, rules, fits } = page.results;
  if (leftOut === null) return html``;
  const { error, distance } = page.units;
  const without = (component: Results['fits'][number]['component']) =>
    fits.find((fit) => fit.component === component && fit.basisOfRule);
  return html`<section id="left-out"><h2>Days left out</h2>
<p>The study file leaves out ${page.lengthOf(leftOut.days, 'day')} (${leftOut.days.map((day, k) => html`${k === 0 ? '' : ', '}${date(day)}`)}) with ${page.counted(leftOut, 'occupations', 'occupation')}.
With them the numbers would be these. Days are left out for a cause that is known, not because their errors are large.</p>
${
  leftOut.fits.length === 0
    ? null
    : table('Fits with and without the days', leftOut.fits, [
        { head: 'Component', cell: ({ component }) => component, text: true },
        { head: `Constant with, ${error.name}`, cell: ({ constantMm }) => page.limits(constantMm, 'error') },
        {
          head: `Constant without, ${error.name}`,
          cell: ({ component }) => {
            const fit = without(component);
            return fit === undefined ? '—' : page.limits(fit.constantMm, 'error');
          },
        },
        { head: 'ppm with', cell: ({ ppm }) => page.limits(ppm, 'ppm') },
        {
          head: 'ppm without',
          cell: ({ component }) => {
            const fit = without(component);
            return fit === undefined ? '—' : page.limits(fit.ppm, 'ppm');
          },
        },
        { head: 'Days with', cell: (row) => page.number(row, 'days', 'count') },
        { head: 'Occupations with', cell: (row) => page.number(row, 'occupations', 'count') },
      ])
}
${
  leftOut.rules.length === 0
    ? null
    : table(`Rules with and without the days: up to, ${distance.name}`, leftOut.rules, [
        {
          head: 'Positions',
          cell: ({ component }) => component,
          text: true,
        },
        { head: `Within, ${error.name}`, cell: (row) => page.number(row, 'limitMm', 'limit') },
        { head: 'With', cell: (row) => page.number(row, 'maximumBaselineKm', 'distance, rounded down') },
        {
          head: 'Without',
          cell: (_, k) =>
            rules[k] === undefined
              ? '—'
              : page.number(rules[k], 'maximumBaselineKm', 'distance, rounded down'),
        },
        { head: 'Why there is no rule with them', cell: ({ reason }) => page.text(reason ?? ''), text: true },
      ])
}
</section>
`;
}
