import type { RuleCount } from '../rule/index.js';
import type { BackTestResult } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { figure, type ReportPicture } from './pictures.js';

/** Why to believe the rule: one picture, and what can be counted by hand. */
export function proofSection(page: Page, picture: ReportPicture | null): Html {
  const { backTest, rules } = page.results;
  if (rules.length + backTest.length === 0) return html``;
  if (backTest.length === 0) {
    return html`<section id="proof"><h2>Why to believe it</h2>
<p>The rules were not tried on days that they had not seen: that takes more days.</p></section>\n`;
  }
  const tests = backTest.map(
    (
      test,
    ) => html`<p>${test.component === 'horizontal' ? 'In plan' : 'In height'} ${page.number(test, 'observedShare', 'share')}${between(page, test)} of
${page.counted(test, 'occupations', 'occupation')} lay inside the limit that was to hold ${page.number(test, 'share', 'share')}${sheetWords(page, test)}.</p>
<ul>
${test.rules.map((count) => html`<li>${countWords(page, count)}</li>\n`)}</ul>\n`,
  );
  return html`<section id="proof"><h2>Why to believe it</h2>
<p>Each day was left out in turn, everything was found again from the other days, and the day left out was judged by it. So
the limits below had not seen the positions that are counted.</p>
${figure(picture)}${tests}
</section>
`;
}

const between = (page: Page, test: BackTestResult): Html | null =>
  test.low === null || test.high === null
    ? null
    : html` (${page.number(test, 'low', 'share')} to ${page.number(test, 'high', 'share')})`;

const sheetWords = (page: Page, { specSheet, share }: BackTestResult): Html | null =>
  specSheet === null
    ? null
    : html`; inside that of the spec sheet ${page.number(specSheet, 'observedShare', 'share')}${specSheet.observedShare < share ? ', fewer than it was to hold' : ''}`;

/** The plain count of a rule. */
export function countWords(page: Page, count: RuleCount, listed = 'in the annex'): Html {
  const { distance, error } = page.units;
  const limit = html`${page.number(count, 'limitMm', 'limit')} ${error.name}`;
  if (count.lengthKm === null || count.shots === 0)
    return html`${limit}: no occupation lies within the rule, so nothing can be counted.`;
  const { lengthKm, failures } = count;
  const km = (key: 'from' | 'to'): Html => page.number(lengthKm, key, 'distance, rounded down');
  const same = page.units.distance.perOurs * (lengthKm.to - lengthKm.from) < 0.05;
  const others =
    failures.length === 0
      ? 'none missed it'
      : html`${page.length(failures)} missed it and ${failures.length === 1 ? 'is' : 'are'} listed ${listed}`;
  return html`${limit}: of ${page.counted(count, 'shots', 'occupation')} within ${same ? km('from') : html`${km('from')} to ${km('to')}`} ${distance.name} of the base,
${page.number(count, 'held', 'count')} held it; ${others}. On ${page.number(count, 'goodDays', 'count')} of ${page.counted(count, 'days', 'day')} at least
${page.number(count, 'share', 'share')} held it${count.goodDayShareLow === null ? null : html`, which shows at least ${page.number(count, 'goodDayShareLow', 'share')} of such days without any model`}.`;
}
