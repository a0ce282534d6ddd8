import { date, type Html, html } from './html.js';
import type { Page } from './page.js';

/** Title, what the letter is about, and who answers for it. */
export function letterHead(page: Page): Html {
  const { study, period, occupations, bases } = page.results;
  const lead =
    period === null
      ? html`No occupation could be used.`
      : html`RTK check shots from ${date(period.from)} to ${date(period.to)}: ${page.counted(occupations, 'used', 'occupation')}
${marksOf(page)}on ${page.counted(page.results, 'days', 'day')}, from ${page.lengthOf(bases, 'base')}.`;
  return html`<header><h1>${page.name(study.title)}</h1>
<p class="lead">${lead}</p>
<p class="small">${answers(page)}</p></header>`;
}

/** A mark measured from two bases is one mark. */
function marksOf(page: Page): Html {
  const fit = page.results.fits.find(({ basisOfRule, marks }) => basisOfRule && marks !== null);
  return fit === undefined
    ? html``
    : html`of ${page.number(fit, 'marks', 'count')} ${fit.marks === 1 ? 'mark' : 'marks'} `;
}

function answers({ results: { study }, units }: Page): Html {
  const who = study.surveyor === null ? html`` : html`Responsible surveyor: <bdi>${study.surveyor}</bdi>. `;
  const when = study.reportDate === null ? html`` : html`Date of this report: ${date(study.reportDate)}. `;
  return html`${who}${when}${units.words}`;
}

/** Where the surveyor signs; what the study file does not name is left to be filled in by hand. */
export function signature({ results: { study, software } }: Page): Html {
  const line = html`<span class="blank"></span>`;
  return html`<section id="signature"><h2>Signature</h2>
<dl class="signature"><dt>Responsible surveyor</dt><dd>${study.surveyor === null ? line : html`<bdi>${study.surveyor}</bdi>`}</dd>
<dt>Date</dt><dd>${study.reportDate === null ? line : date(study.reportDate)}</dd>
<dt>Signature</dt><dd>${line}</dd></dl>
<p class="small">Numbers by ppmwise ${software}; each stands in results.json. Fits, days, marks and settings stand in the
technical annex, annex.html.</p></section>`;
}
