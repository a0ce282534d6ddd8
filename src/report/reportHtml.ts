import type { Results } from '../study/index.js';
import { accountSection } from './accountSection.js';
import { CAUTIONS, limitsOfStudy } from './cautions.js';
import { daysSection } from './daysSection.js';
import { fitSection } from './fitSection.js';
import { GLOSSARY } from './glossary.js';
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
import { figure, type ReportPictures } from './pictures.js';
import { proofSection } from './proofSection.js';
import { ruleSection } from './ruleSection.js';
import { ruleTableSection } from './ruleTableSection.js';
import { standardsSection } from './standardsSection.js';

/**
 * The report as one self-contained page that reads like a letter: the rule first, then why to believe it, then the data,
 * then the cautions. What only a geodesist asks for stands in the annex.
 */
export function reportHtml(results: Results, pictures: ReportPictures): string {
  const page = new Page(results);
  const body = html`${letterHead(page)}
${inShort(page)}
${ruleSection(page)}
${proofSection(page, pictures.proof)}
${movesSection(page, figure(pictures.moves))}
${jobsSection(page, pictures.jobs)}
${fitSection(page)}
${daysSection(page)}
${leftOutSection(page)}
${ruleTableSection(page)}
${standardsSection(page)}
${accountSection(page)}
${messagesSection(page)}
${METHOD}
${glossary()}
${cautions(page)}
${signature(page)}`;
  return htmlPage({ title: `${results.study.title} — how far from the base`, kind: 'report', body });
}

const glossary = (): Html =>
  html`<section id="glossary"><h2>Words</h2><dl>${GLOSSARY.map(([word, meaning]) => html`<dt>${word}</dt><dd>${meaning}</dd>\n`)}</dl></section>`;

const cautions = (page: Page): Html =>
  html`<section id="cautions"><h2>Cautions</h2><div class="cautions">${[...CAUTIONS, ...limitsOfStudy(page)].map((caution) => html`<p>${page.text(caution)}</p>`)}</div></section>`;
