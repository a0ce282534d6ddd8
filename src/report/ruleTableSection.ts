import type { RuleTableRow } from '../rule/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { promisesTables } from './promisesSection.js';
import { endsWithData } from './ruleSection.js';
import { table } from './table.js';
import { componentTitle } from './words.js';

/** Maximum baselines for many limits, the shares side by side. */
export function ruleTableSection(page: Page): Html {
  const { ruleTable } = page.results;
  if (ruleTable.length === 0) return html``;
  return html`<section id="other-limits"><h2>Other limits</h2>
<p>Should a client ask for another limit: up to which distance it holds, in ${page.units.distance.name}. Where there is no rule, the annex says why.</p>
${(['horizontal', 'vertical'] as const).map((component) => oneTable(page, component))}
${promisesTables(page)}
</section>
`;
}

function oneTable(page: Page, component: RuleTableRow['component']): Html | null {
  const rows = page.results.ruleTable.filter((row) => row.component === component);
  if (rows.length === 0) return null;
  const shares = rows.filter(({ limitMm }) => limitMm === rows[0]!.limitMm);
  const limits = rows.filter(({ share }) => share === rows[0]!.share);
  const first = rows[0]!;
  const caption = html`${componentTitle(component, page.results.heights)}: on ${page.number(first, 'dayShare', 'share')} of days, with ${page.number(first, 'confidence', 'share')} confidence`;
  return html`${table<RuleTableRow>(caption, limits, [
    { head: `Within, ${page.units.error.name}`, cell: (row) => page.number(row, 'limitMm', 'limit') },
    ...shares.map((column) => ({
      head: html`${page.number(column, 'share', 'share')} of positions`,
      cell: (row: RuleTableRow) => {
        const found = rows.find(({ limitMm, share }) => limitMm === row.limitMm && share === column.share);
        if (found === undefined) return '—';
        if (found.maximumBaselineKm === null) return 'no rule';
        return html`${page.number(found, 'maximumBaselineKm', 'distance, rounded down')}${found.method === 'pooled' ? ' *' : ''}`;
      },
    })),
  ])}${endOfData(page, rows)}`;
}

/** What cells mean that hold the last length of which the data tell. */
function endOfData(page: Page, rows: readonly RuleTableRow[]): Html | null {
  const rule = page.results.rules.find(({ component }) => component === rows[0]!.component);
  if (rule === undefined || !rows.some((row) => endsWithData(rule, row.maximumBaselineKm))) return null;
  return html`<p class="small">${page.number(rule, 'longestSupportedKm', 'distance, rounded down')} ${page.units.distance.name} is as far as the data reach: such a limit may hold farther, which is not known.</p>
`;
}

/** Why there is no rule, for the annex; said once for each reason. */
export function ruleTableReasons(page: Page): Html {
  const without = page.results.ruleTable.filter(
    ({ maximumBaselineKm, reason }) => !maximumBaselineKm && reason !== null,
  );
  const reasons = [...new Set(without.map(({ component, reason }) => `${component}: ${reason}`))];
  if (reasons.length === 0) return html``;
  return html`<p>Why some limits hold at no distance or have no rule:</p><ul>${reasons.map((reason) => html`<li>${page.text(reason)}.</li>\n`)}</ul>`;
}
