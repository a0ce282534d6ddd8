import type { Rule } from '../rule/index.js';
import type { Results } from '../study/index.js';
import { km, kmDown, NOT_GIVEN, percent, plural } from './format.js';
import { Html, html } from './html.js';
import { ruleSentence } from './words.js';

/** The rules, before everything else. */
export function ruleSection({ rules, fits }: Results): Html {
  if (rules.length === 0) {
    const why =
      fits.length === 0
        ? 'no fit was possible; the messages below say why'
        : 'the study file states no tolerance';
    return html`<section id="rule"><h2>How far from the base</h2><p>There is no rule: ${why}.</p></section>\n`;
  }
  return html`<section id="rule"><h2>How far from the base</h2>
<ul class="rules">
${rules.map(ruleItem)}</ul>
${conditions(rules[0]!)}
<p class="small">The distance is a lower limit: with the stated confidence the true one is at least as long. It is
rounded down. It holds over all days together, so on a worse day fewer positions are within the limit.</p>
</section>
`;
}

function ruleItem(rule: Rule): Html {
  const limit = rule.maximumBaselineKm;
  const head = limit === null ? 'No rule' : limit === 0 ? 'At no distance' : `Up to ${kmDown(limit)} km`;
  const best =
    rule.bestEstimateKm === null || rule.bestEstimateKm === 0
      ? null
      : html`<span class="small">Best estimate without its uncertainty: ${kmDown(rule.bestEstimateKm)} km. The data reach to ${km(rule.longestSupportedKm)} km.</span>`;
  return html`<li${limit === null || limit === 0 ? new Html(' class="none"') : null}><strong>${head}</strong>
<span>${ruleSentence(rule)}</span>${best}</li>
`;
}

function conditions({ conditions: c }: Rule): Html {
  const bases = c.bases.length === 0 ? NOT_GIVEN : c.bases.join(', ');
  return html`<p>These rules rest on ${plural(c.occupations, 'occupation')} of ${plural(c.marks.length, 'mark')} on
${plural(c.days, 'day')} from ${c.from} to ${c.to}, measured from ${c.bases.length === 1 ? 'base' : 'bases'} ${bases}.</p>`;
}

/** Tolerances as a table: for readers who compare. */
export const ruleRows = (rule: Rule): (string | number | null)[] => [
  rule.component,
  rule.limitMm,
  percent(rule.share),
  percent(rule.confidence),
  rule.maximumBaselineKm,
  rule.bestEstimateKm,
  rule.longestSupportedKm,
  rule.reason,
];
