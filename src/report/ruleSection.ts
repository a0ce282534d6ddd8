import type { Rule } from '../rule/index.js';
import { spoiling } from './groupedMessages.js';
import { type Html, html, trusted } from './html.js';
import type { Page } from './page.js';
import { conditionsOfRules } from './ruleConditions.js';
import { table } from './table.js';
import { byDays, componentTitle, ruleParts, whyNoRule } from './words.js';

/** The rules, before everything else. */
export function ruleSection(page: Page): Html {
  const { rules, messages } = page.results;
  const first = spoiling(messages).map(({ text }) => html`<p class="first">${page.text(text)}</p>`);
  if (rules.length === 0) {
    return html`<section id="rule"><h2>How far from the base</h2>${first}<p>There is no rule: ${whyNoRule(page.results)}.</p></section>\n`;
  }
  return html`<section id="rule"><h2>How far from the base</h2>
${first}
<ul class="rules">
${rules.map((rule) => ruleItem(page, rule))}</ul>
${conditionsOfRules(page)}
${ruleTable(page)}
<p class="small">${howToRead(rules)}${rules.some(isOpen) ? ' “Or more”: so far the data reach, and what lies beyond is not known.' : ''}</p>
</section>
`;
}

function howToRead(rules: readonly Rule[]): string {
  const cut = 'A distance is a lower limit, found from the days observed and rounded down.';
  return rules.some(byDays)
    ? `${cut} “All days together” counts the positions of all days as one: on a worse day fewer are within the limit. “By days alone” is the length on the day that bounds the share of days, without any model of how days differ.`
    : `${cut} It holds over all days together, so on a worse day fewer positions are within the limit.`;
}

/** Whether a length is the last of which the data tell. */
export const endsWithData = ({ longestSupportedKm }: Rule, km: number | null): boolean =>
  km !== null && km > 0 && km === longestSupportedKm;

const isOpen = (rule: Rule): boolean =>
  [rule.bestEstimateKm, rule.allDaysKm, rule.dayBound?.baselineKm ?? null].some((km) =>
    endsWithData(rule, km),
  );

function ruleItem(page: Page, rule: Rule): Html {
  const { head, body } = ruleParts(rule, {
    write: (owner, key, kind) => page.number(owner, key, kind),
    text: (sentence) => page.text(sentence),
    units: page.units,
    heights: page.results.heights,
  });
  return html`<li${rule.maximumBaselineKm ? null : trusted(' class="none"')}><strong>${head}</strong>
<span class="sentence">${body}</span></li>
`;
}

/** All rules side by side, with what stands behind the distance. */
function ruleTable(page: Page): Html {
  const unit = page.units.distance.name;
  const km = (rule: Rule, key: 'maximumBaselineKm' | 'bestEstimateKm' | 'allDaysKm' | 'longestSupportedKm') =>
    page.number(rule, key, 'distance, rounded down');
  const atLeast = (rule: Rule, key: 'bestEstimateKm' | 'allDaysKm') =>
    endsWithData(rule, rule[key]) ? html`${km(rule, key)} or more` : km(rule, key);
  return table('The rules in one table', page.results.rules, [
    {
      head: 'Positions',
      cell: ({ component }) => componentTitle(component, page.results.heights),
      text: true,
    },
    { head: `Within, ${page.units.error.name}`, cell: (rule) => page.number(rule, 'limitMm', 'limit') },
    { head: 'Share', cell: (rule) => page.number(rule, 'share', 'share') },
    ...(page.results.rules.some(byDays)
      ? [
          {
            head: 'Of days',
            cell: (rule: Rule) => (byDays(rule) ? page.number(rule, 'dayShare', 'share') : 'all together'),
          },
        ]
      : []),
    { head: 'Confidence', cell: (rule) => page.number(rule, 'confidence', 'share') },
    { head: `Up to, ${unit}`, cell: (rule) => km(rule, 'maximumBaselineKm') },
    { head: `Best estimate, ${unit}`, cell: (rule) => atLeast(rule, 'bestEstimateKm') },
    ...(page.results.rules.some(byDays)
      ? [{ head: `All days together, ${unit}`, cell: (rule: Rule) => atLeast(rule, 'allDaysKm') }]
      : []),
    ...(page.results.rules.some(({ dayBound }) => dayBound !== null)
      ? [
          {
            head: `By days alone, ${unit}`,
            cell: (rule: Rule) => {
              const { dayBound } = rule;
              if (dayBound === null) return '—';
              const bound = page.number(dayBound, 'baselineKm', 'distance, rounded down');
              return endsWithData(rule, dayBound.baselineKm) ? html`${bound} or more` : bound;
            },
          },
        ]
      : []),
    { head: `Data reach, ${unit}`, cell: (rule) => km(rule, 'longestSupportedKm') },
  ]);
}
