import type { StudyRun } from '../study/index.js';
import { annexDays } from './annexDays.js';
import { filesSection, settingsSection } from './annexFiles.js';
import { annexFits } from './annexFits.js';
import { annexOccupations } from './annexOccupations.js';
import { annexRules } from './annexRules.js';
import { blundersSection } from './blundersSection.js';
import { commonSection } from './commonSection.js';
import { type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { marksSection } from './marksSection.js';
import { messagesSection } from './messagesSection.js';
import { Page } from './page.js';
import { figure, type ReportPictures } from './pictures.js';
import { reportTables } from './tables.js';

const CONTENTS: readonly (readonly [id: string, words: string])[] = [
  ['settings', 'Settings and version'],
  ['files', 'Files'],
  ['fits', 'Fits'],
  ['rules', 'Rules and back-test'],
  ['common', 'What all positions have in common'],
  ['marks', 'Marks'],
  ['days', 'Days, hours and setups'],
  ['wrong-fixes', 'Suspected wrong fixes'],
  ['blunders', 'Suspected blunders'],
  ['occupations', 'Occupations'],
  ['messages', 'Messages'],
];

/** The technical annex: all that a geodesist needs to follow a number of the report back to file and row. */
export function annexHtml(run: StudyRun, pictures: ReportPictures): string {
  const page = new Page(run.results);
  const { study } = run.results;
  const sections = html`${settingsSection(page)}
${filesSection(page)}
${annexFits(page, [figure(pictures.horizontal), figure(pictures.vertical)])}
${annexRules(page)}
${commonSection(page)}
${marksSection(page, { map: pictures.maps.map((map) => figure(map)!), means: figure(pictures.markMeans) })}
${annexDays(page)}
${blundersSection(page)}
${annexOccupations(page, reportTables(run))}
${messagesSection(page, true)}`;
  const body = html`<header><h1>Technical annex: ${page.name(study.title)}</h1>
<p class="lead">To the report, report.html. ${page.units.words}</p></header>
<nav aria-label="Contents"><ul>${contents(sections)}</ul></nav>
${sections}`;
  return htmlPage({ title: `${study.title} — technical annex`, kind: 'annex', body });
}

/** Links to the sections that are there. */
const contents = (sections: Html): Html[] =>
  CONTENTS.filter(([id]) => sections.text.includes(`id="${id}"`)).map(
    ([id, words]) => html`<li><a href="#${id}">${words}</a></li>\n`,
  );
