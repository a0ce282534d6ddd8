import type { Rule } from '../rule/index.js';
import type { Results } from '../study/index.js';
import { km, kmDown, NOT_GIVEN, plural } from './format.js';
import { date, type Html, html, trusted } from './html.js';
import { capital, ruleParts } from './words.js';

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
  const { head, body } = ruleParts(rule);
  const best = rule.bestEstimateKm
    ? html`<span class="small">Best estimate without its uncertainty: ${kmDown(rule.bestEstimateKm)} km. Two marks and enough days support lengths up to ${km(rule.longestSupportedKm)} km.</span>`
    : null;
  return html`<li${rule.maximumBaselineKm ? null : trusted(' class="none"')}><strong>${head}</strong>
<span>${capital(body)}</span>${best}</li>
`;
}

function conditions({ conditions: c }: Rule): Html {
  const bases = c.bases.length === 0 ? NOT_GIVEN : c.bases.join(', ');
  return html`<p>These rules rest on ${plural(c.occupations, 'occupation')} of ${plural(c.marks.length, 'mark')} on
${plural(c.days, 'day')} from ${date(c.from)} to ${date(c.to)}, measured from ${c.bases.length === 1 ? 'base' : 'bases'} ${bases}.</p>`;
}
