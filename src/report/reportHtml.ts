import type { Results } from '../study/index.js';
import { accountSection, messagesSection } from './accountSection.js';
import { blundersSection } from './blundersSection.js';
import { commonSection } from './commonSection.js';
import { fitSection } from './fitSection.js';
import { plural } from './format.js';
import { date, type Html, html, trusted } from './html.js';
import { marksSection } from './marksSection.js';
import { ruleSection } from './ruleSection.js';
import { REPORT_STYLE } from './style.js';
import { CAUTIONS, GLOSSARY, LIMITS } from './words.js';

/** A drawn chart: an SVG picture and what it shows, in words. */
export interface ReportPicture {
  readonly svg: string;
  readonly description: string;
}

/** Pictures of the report; null where there was nothing to draw. */
export interface ReportPictures {
  readonly horizontal: ReportPicture | null;
  readonly vertical: ReportPicture | null;
  /** One for each base. */
  readonly maps: readonly ReportPicture[];
  readonly markMeans: ReportPicture | null;
}

/** The report as one self-contained page: the rule first, then why to believe it, then the data, then the cautions. */
export function reportHtml(results: Results, pictures: ReportPictures): string {
  const { study, period, days, occupations } = results;
  const figure = (picture: ReportPicture | null): Html | null => picture && pictureHtml(picture);
  const lead =
    period === null
      ? html`No occupation could be used.`
      : html`RTK check shots from ${date(period.from)} to ${date(period.to)}: ${plural(occupations.used, 'occupation')} of known marks on ${plural(days, 'day')}.`;
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${study.title} — own error and maximum baseline</title>
<style>${trusted(REPORT_STYLE)}</style>
</head>
<body>
<main>
<h1>${study.title}</h1>
<p class="lead">${lead}</p>
${ruleSection(results)}
${fitSection(results, { horizontal: figure(pictures.horizontal), vertical: figure(pictures.vertical) })}
${commonSection(results)}
${marksSection(results, { map: pictures.maps.map(pictureHtml), means: figure(pictures.markMeans) })}
${accountSection(results)}
${blundersSection(results)}${messagesSection(results)}
${METHOD}
<section id="glossary"><h2>Words</h2><dl>${GLOSSARY.map(([word, meaning]) => html`<dt>${word}</dt><dd>${meaning}</dd>\n`)}</dl></section>
<section id="cautions"><h2>Cautions</h2><div class="cautions">${[...CAUTIONS, ...LIMITS].map((caution) => html`<p>${caution}</p>`)}</div></section>
</main>
</body>
</html>
`.text;
}

function pictureHtml({ svg, description }: ReportPicture): Html {
  const source = `data:image/svg+xml;base64,${Buffer.from(svg, 'utf8').toString('base64')}`;
  return html`<figure><img src="${source}" alt="${description}"></figure>\n`;
}

const METHOD = html`<section id="method"><h2>How the numbers are made</h2>
<p>The fixed positions of a visit are averaged to one occupation. Its error is measured minus known, in east, north and up
at the mark. A model with a constant and a part that grows with distance is fitted to the squares of the errors by
maximum likelihood, so that near and far shots each count by what they tell.</p>
<p>Shots of one day share their sky, their crew and their base, so they are not independent. The intervals therefore count
days: a cluster-robust variance by day (CR3) with Satterthwaite degrees of freedom. A rule takes the upper limit of the
spread, not its estimate, and stops where the data stop.</p>
</section>
`;
