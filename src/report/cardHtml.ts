import type { Results } from '../study/index.js';
import { checkShots } from './cardChecks.js';
import { cautionHours, rig, validUntil } from './cardConditions.js';
import { secondVisit } from './cardVisits.js';
import { type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { Page } from './page.js';
import { table } from './table.js';
import { byDays, whyNoRule } from './words.js';

/** The crew card: one page in black and white for the truck, in the units of the crew. */
export function cardHtml(results: Results): string {
  const page = new Page(results);
  const { study } = results;
  const body = html`<header><h1>How far from the base</h1>
<p class="lead">${page.name(study.title)}. ${validUntil(page)}</p></header>
<section id="distances"><h2>Greatest distance from the base</h2>
${distances(page)}</section>
${checkShots(page)}
<div class="pair">${secondVisit(page)}
<section id="fails"><h2>When a check fails</h2>
<ol>
<li>Do not move on. Look at the mark, the rod height, the bubble and the antenna first.</li>
<li>Let the receiver fix anew (new initialisation); then shoot the mark again.</li>
<li>Keep both shots. Delete nothing.</li>
<li>Fails again: stop, call the office, and say which points were shot since the last good check.</li>
</ol></section></div>
<div class="pair">${cautionHours(page)}
${rig(page)}</div>
<p class="small">Only for positions that the receiver calls fixed. No substitute for redundant checks or the surveyor’s judgement.
${page.units.words}</p>`;
  return htmlPage({ title: `${study.title} — crew card`, kind: 'card', body });
}

function distances(page: Page): Html {
  const { rules } = page.results;
  if (rules.length === 0) return html`<p>No distance can be given: ${whyNoRule(page.results)}.</p>`;
  const { error, distance } = page.units;
  // The same reason often holds for several limits.
  const why = new Set(
    rules
      .filter(({ maximumBaselineKm }) => !maximumBaselineKm)
      .map(({ component, reason }) => `${component === 'horizontal' ? 'Plan' : 'Height'}: ${reason}`),
  );
  return html`<div class="big">${table('To keep within the limit, stay within', rules, [
    {
      head: 'Limit for',
      cell: ({ component }) => (component === 'horizontal' ? 'plan' : 'height'),
      text: true,
    },
    { head: `Limit, ${error.name}`, cell: (rule) => page.number(rule, 'limitMm', 'limit') },
    {
      head: `Distance, ${distance.name}`,
      cell: (rule) =>
        rule.maximumBaselineKm === null
          ? 'no rule'
          : page.number(rule, 'maximumBaselineKm', 'distance, rounded down'),
    },
    {
      head: 'Holds for',
      cell: (rule) =>
        html`${page.number(rule, 'share', 'share')} of positions${byDays(rule) ? html`, on ${page.number(rule, 'dayShare', 'share')} of days` : ''}`,
      text: true,
    },
  ])}</div>
${[...why].map((reason) => html`<p class="small">${page.text(reason)}.</p>`)}`;
}
