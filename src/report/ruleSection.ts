import type { Rule } from '../rule/index.js';
import type { Results } from '../study/index.js';
import { km, kmDown, NOT_GIVEN, plural } from './format.js';
import { date, type Html, html, trusted } from './html.js';
import { capital, type HeightKind, ruleParts, spoiling, unseenDays, whyNoRule } from './words.js';

/** The rules, before everything else. */
export function ruleSection(results: Results): Html {
  const { rules } = results;
  if (rules.length === 0) {
    return html`<section id="rule"><h2>How far from the base</h2><p>There is no rule: ${whyNoRule(results)}.</p></section>\n`;
  }
  return html`<section id="rule"><h2>How far from the base</h2>
${spoiling(results.messages).map(({ text }) => html`<p class="first">${text}</p>`)}
<ul class="rules">
${rules.map((rule) => ruleItem(rule, results.heights))}</ul>
${conditionsOfComponents(rules)}
<p class="small">The distance is a lower limit, found from the days observed and rounded down. It holds over all days together,
so on a worse day fewer positions are within the limit. ${rules[0]!.conditions.days > 0 ? unseenDays(rules[0]!.conditions.days) : null}</p>
</section>
`;
}

function ruleItem(rule: Rule, heights: HeightKind): Html {
  const { head, body } = ruleParts(rule, heights);
  // Where the data end the limit, an estimate cut there too would say nothing.
  const best =
    rule.bestEstimateKm && rule.reason === null
      ? html`<span class="small">Best estimate without its uncertainty: ${kmDown(rule.bestEstimateKm)} km. Two marks and enough days support lengths up to ${km(rule.longestSupportedKm)} km.</span>`
      : null;
  return html`<li${rule.maximumBaselineKm ? null : trusted(' class="none"')}><strong>${head}</strong>
<span>${capital(body)}</span>${best}</li>
`;
}

/** What the rules rest on; said once where both components rest on the same. */
function conditionsOfComponents(rules: readonly Rule[]): Html[] {
  const first = rules.filter(
    (rule, k) => rules.findIndex(({ component }) => component === rule.component) === k,
  );
  const alike = first.every(
    ({ conditions: c }) => JSON.stringify(c) === JSON.stringify(first[0]!.conditions),
  );
  return alike
    ? [conditions(first[0]!, 'These rules')]
    : first.map((rule) => conditions(rule, `The ${rule.component} rules`));
}

function conditions({ conditions: c }: Rule, what: string): Html {
  if (c.occupations === 0) return html`<p>${what} rest on no occupation.</p>`;
  const bases = c.bases.length === 0 ? NOT_GIVEN : c.bases.join(', ');
  return html`<p>${what} rest on ${plural(c.occupations, 'occupation')} of ${plural(c.marks.length, 'mark')} on
${plural(c.days, 'day')} from ${date(c.from)} to ${date(c.to)}, measured from ${c.bases.length === 1 ? 'base' : 'bases'} ${bases}.</p>`;
}
