import type { StudyRun } from '../study/index.js';
import { annexDays } from './annexDays.js';
import { annexEvidence } from './annexEvidence.js';
import { filesSection, settingsSection } from './annexFiles.js';
import { annexFits } from './annexFits.js';
import { annexGroups } from './annexGroups.js';
import { annexOccupations } from './annexOccupations.js';
import { annexRules } from './annexRules.js';
import { annexSky } from './annexSky.js';
import { annexSplits } from './annexSplits.js';
import { annexWatch } from './annexWatch.js';
import { blundersSection } from './blundersSection.js';
import { commonSection } from './commonSection.js';
import { type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { annexJobs } from './jobsSection.js';
import { marksSection } from './marksSection.js';
import { messagesSection } from './messagesSection.js';
import { Page } from './page.js';
import { withinBudget } from './pictureBudget.js';
import { figure, type ReportPictures } from './pictures.js';
import { annexStandards } from './standardsSection.js';
import { type ReportTable, reportTables } from './tables.js';
import { annexVisits } from './visitsSection.js';

/** With the tables of a long study beside them a page stays under 3 MB. */
const MOST_PICTURE_BYTES = 1_100_000;

const CONTENTS: readonly (readonly [id: string, words: string])[] = [
  ['settings', 'Settings and version'],
  ['files', 'Files'],
  ['fits', 'Fits'],
  ['evidence', 'What the ppm rests on'],
  ['groups', 'Further terms; crews, receivers and bases apart'],
  ['rules', 'Rules and back-test'],
  ['visits', 'Checks, second visits and long occupations'],
  ['standards', 'Standards'],
  ['jobs', 'The points of jobs from every base'],
  ['common', 'What all positions have in common'],
  ['marks', 'Marks'],
  ['days', 'Days, hours and setups'],
  ['sky', 'The sky of the days'],
  ['wrong-fixes', 'Suspected wrong fixes'],
  ['blunders', 'Suspected blunders'],
  ['splits', 'The errors split'],
  ['occupations', 'Occupations'],
  ['watch', 'What new days are held against'],
  ['messages', 'Messages'],
];

/**
 * The technical annex: all that a geodesist needs to follow a number of the report back to file and row.
 * @param tables those of the run, where they are known already
 */
export function annexHtml(
  run: StudyRun,
  drawn: ReportPictures,
  tables: readonly ReportTable[] = reportTables(run),
): string {
  const page = new Page(run.results);
  const pictures = withinBudget(drawn, MOST_PICTURE_BYTES);
  const { study } = run.results;
  const sections = html`${settingsSection(page)}
${filesSection(page)}
${annexFits(page, [figure(pictures.horizontal), figure(pictures.vertical)])}
${annexEvidence(page)}
${annexGroups(page)}
${annexRules(page)}
${annexVisits(page)}
${annexStandards(page)}
${annexJobs(page, pictures.jobs)}
${commonSection(page)}
${marksSection(page, { map: pictures.maps.map((map) => figure(map)!), means: figure(pictures.markMeans) })}
${annexDays(page, pictures)}
${annexSky(page, pictures.sky)}
${blundersSection(page)}
${annexSplits(page, tables.find(({ name }) => name === 'splits')!, pictures.hourDays, pictures.splits)}
${annexOccupations(page, tables)}
${annexWatch(page)}
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
