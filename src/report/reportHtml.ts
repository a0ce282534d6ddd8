import type { Results } from '../study/index.js';
import { accountSection } from './accountSection.js';
import { CAUTIONS, limitsOfStudy } from './cautions.js';
import { daysSection } from './daysSection.js';
import { fitSection } from './fitSection.js';
import { wordsUsed } from './glossary.js';
import { type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { inShort } from './inShort.js';
import { jobsSection } from './jobsSection.js';
import { leftOutSection } from './leftOutSection.js';
import { letterHead, signature } from './letterHead.js';
import { messagesSection } from './messagesSection.js';
import { METHOD } from './method.js';
import { movesSection } from './movesSection.js';
import { Page } from './page.js';
import { withinBudget } from './pictureBudget.js';
import { figure, type ReportPictures } from './pictures.js';
import { proofSection } from './proofSection.js';
import { ruleSection } from './ruleSection.js';
import { ruleTableSection } from './ruleTableSection.js';
import { standardsSection } from './standardsSection.js';

/** With its tables the page stays under 3 MB. */
const MOST_PICTURE_BYTES = 2_000_000;

/**
 * The report as one self-contained page that reads like a letter: the rule first, then why to believe it, then the data,
 * then the cautions. What only a geodesist asks for stands in the annex.
 */
export function reportHtml(results: Results, drawn: ReportPictures): string {
  const page = new Page(results);
  const pictures = withinBudget(ofReport(drawn), MOST_PICTURE_BYTES);
  const letter = html`${letterHead(page)}
${inShort(page)}
${ruleSection(page)}
${proofSection(page, pictures.proof)}
${movesSection(page, figure(pictures.moves))}
${jobsSection(page, pictures.jobs)}
${fitSection(page, [pictures.horizontal, pictures.vertical].map(figure))}
${daysSection(page)}
${leftOutSection(page)}
${ruleTableSection(page)}
${standardsSection(page)}
${accountSection(page)}
${messagesSection(page)}
${METHOD}`;
  const end = html`${cautions(page)}
${signature(page)}`;
  const body = html`${letter}
${glossary(letter, end)}
${end}`;
  return htmlPage({ title: `${results.study.title} — how far from the base`, kind: 'report', body });
}

/** What the report shows; the others stand in the annex. */
const ofReport = (pictures: ReportPictures): ReportPictures => ({
  ...pictures,
  maps: [],
  markMeans: null,
  days: [],
  hours: [],
  hourDays: [],
  splits: [],
  sky: [],
  wrongFixes: [],
});

/** Only words that the page uses. */
const glossary = (...parts: readonly Html[]): Html =>
  html`<section id="glossary"><h2>Words</h2><dl>${wordsUsed(parts).map(([word, meaning]) => html`<dt>${word}</dt><dd>${meaning}</dd>\n`)}</dl></section>`;

const cautions = (page: Page): Html =>
  html`<section id="cautions"><h2>Cautions</h2><div class="cautions">${[...CAUTIONS, ...limitsOfStudy(page)].map((caution) => html`<p>${page.text(caution)}</p>`)}</div></section>`;
