import type { BackTestResult } from '../study/index.js';
import { failureTable } from './failureTable.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { countWords } from './proofSection.js';

/** How the model of the first half of the days did on the second half. */
export function forwardWords(page: Page, { component, forward }: BackTestResult): Html {
  const head = component === 'horizontal' ? 'In plan' : 'In height';
  const { own, reason, fittedTo, judgedFrom, judgedTo } = forward;
  if (own === null || fittedTo === null || judgedFrom === null || judgedTo === null) {
    return html`<p>${head} the later days could not be judged by the earlier ones: ${page.text(reason ?? 'there are too few days')}.</p>\n`;
  }
  return html`<p>${head}, forward in time: fitted to the first ${page.counted(forward, 'daysFitted', 'day')}, up to ${date(fittedTo)}, and
tried on the ${page.counted(own, 'days', 'day')} from ${date(judgedFrom)} to ${date(judgedTo)}: ${page.number(own, 'observedShare', 'share')}${
    own.low === null || own.high === null
      ? null
      : html` (${page.number(own, 'low', 'share')} to ${page.number(own, 'high', 'share')})`
  } of ${page.counted(own, 'occupations', 'occupation')} lay inside the limit that was to hold ${page.number(forward, 'share', 'share')}.${
    forward.onNewMarks === 0
      ? null
      : html` ${page.counted(forward, 'onNewMarks', 'occupation')} on marks that the first days do not know took no part.`
  }</p>
${forward.rules.length === 0 ? null : html`<ul>${forward.rules.map((count) => html`<li>${countWords(page, count, 'below')}</li>\n`)}</ul>\n`}${failureTable(page, `Occupations of the later days within a ${component} rule of the earlier ones that missed its limit`, forward.rules)}`;
}
