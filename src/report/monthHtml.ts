import type { WatchRun } from '../study/index.js';
import { date, type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { messagesSection } from './messagesSection.js';
import { markShiftSection, markShiftTable, nextMarkSection } from './monthMarks.js';
import { newlySetAside } from './monthSetAside.js';
import { Page } from './page.js';
import { table } from './table.js';
import { capital } from './words.js';

/** What watching found, as `watch.json` holds it: every number of the page comes from there. */
export type WatchFound = Pick<WatchRun, 'watches' | 'unwatched' | 'month' | 'messages'>;

export const watchFound = ({ watches, unwatched, month, messages }: WatchRun): WatchFound => ({
  watches,
  unwatched,
  month,
  messages,
});

/**
 * The page of a month: whether the model may stay, who shot how much, what was set aside, which marks may have moved and
 * which to visit next.
 * @param earlierCrews crews of the earlier run, so that they keep their numbers
 */
export function monthHtml(run: WatchRun, earlierCrews: readonly string[] = []): string {
  const found = watchFound(run);
  const { study, crews } = run.results;
  const numbered = [...earlierCrews, ...crews.filter((crew) => !earlierCrews.includes(crew))];
  const page = new Page({ ...run.results, crews: numbered, messages: run.messages }, found);
  const body = html`<header><h1>New days: ${page.name(study.title)}</h1>
<p class="lead">${lead(page, found)}</p>${late(page, found)}</header>
${verdict(page, found)}
${crewSection(page, found)}
${newlySetAside(page, found.month)}
${markShiftSection(page, found.month)}
${nextMarkSection(page, found.month)}
${markShiftTable(page, found.month)}
${dayTables(page, found)}
${messagesSection(page)}
${
  found.month.messagesToldBefore === 0
    ? null
    : html`<p class="small">${page.counted(found.month, 'messagesToldBefore', 'message')} of the earlier run ${found.month.messagesToldBefore === 1 ? 'is' : 'are'} not told again.</p>`
}
<p class="small">${page.units.words} The model is that of the earlier run; every number stands in watch.json.</p>`;
  return htmlPage({ title: `${study.title} — new days`, kind: 'report', body });
}

function lead(page: Page, { month }: WatchFound): Html {
  const { after, from, to } = month;
  const since = after === null ? html`` : html` after ${date(after)}, the last day of the earlier run`;
  if (from === null || to === null)
    return html`No visit lies on a day${since}. Put the new logs into the study file.`;
  return html`${page.counted(month, 'days', 'new day')} from ${date(from)} to ${date(to)}${since}.`;
}

/** Logs of days that the earlier run covers. */
function late(page: Page, { month: { late: came } }: WatchFound): Html | null {
  if (came.occupations === 0) return null;
  return html`\n<p class="first">${page.counted(came, 'occupations', 'occupation')} on ${page.lengthOf(came.days, 'earlier day')} came too late for the earlier run and are not counted below. Run the whole study again.</p>`;
}

function verdict(page: Page, { watches, unwatched, month }: WatchFound): Html {
  const words = watches.map(({ component, fitAgain, reasons, days }, k) => {
    const outside = days.filter((day) => day.outside);
    const head = component === 'horizontal' ? 'In plan' : 'In height';
    const told =
      days.length === 0
        ? html`<strong>${head}: no new day could be judged.</strong>`
        : fitAgain
          ? html`<strong>${head}: fit again.</strong> ${reasons.map((reason) => html`${capital(page.text(reason))}. `)}`
          : html`<strong>${head}: the model may stay.</strong>`;
    const named =
      outside.length === 0
        ? html` No day alone lies outside.`
        : html` Outside what one day in a thousand is: ${outside.slice(-MOST_DAYS).map(({ day }, n) => html`${n === 0 ? '' : ', '}${date(day)}`)}${outside.length > MOST_DAYS ? ' and earlier ones' : ''}.`;
    const left =
      watches[k]!.leftOut === 0
        ? null
        : html` ${page.counted(watches[k]!, 'leftOut', 'occupation')} on marks that the model does not know took no part.`;
    return html`<p>${told}${days.length === 0 ? null : named}${left}</p>\n`;
  });
  const not = unwatched.map(
    ({ component, reason }) => html`<p>${capital(component)}: not watched, since ${page.text(reason)}.</p>\n`,
  );
  const none =
    watches.length + unwatched.length > 0
      ? null
      : html`<p>There is nothing to watch by: the earlier run has no fit.</p>\n`;
  const worth = [...new Set(watches.map(({ sentence }) => sentence))];
  const moved = month.markShifts.some(({ verdict: found }) => found === 'moved')
    ? html`<p><strong>A mark may have moved;</strong> see below before anything is rested on it.</p>\n`
    : null;
  return html`<section id="verdict"><h2>May the model stay?</h2>
${words}${not}${none}${moved}${worth.map((sentence) => html`<p class="small">${page.text(sentence)}</p>\n`)}</section>`;
}

/** So many of the latest days outside are named. */
const MOST_DAYS = 10;

function crewSection(page: Page, { month }: WatchFound): Html {
  const { crews, visits } = month;
  if (crews.length === 0) return html``;
  const before =
    month.earlierShareWithoutFix === null
      ? null
      : html`; in the earlier run ${page.number(month, 'earlierShareWithoutFix', 'share')}`;
  return html`<section id="crews"><h2>Shots by crew</h2>
${table('New days, by crew', crews, [
  { head: 'Crew', cell: ({ crew }) => (crew === '' ? 'not named' : page.crew(crew)), text: true },
  { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
  { head: 'Visits', cell: (row) => page.number(row, 'visits', 'count') },
  { head: 'Without a fix', cell: (row) => page.number(row, 'visitsWithoutFix', 'count') },
  { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
])}
<p>Visits without a fix: ${page.number(visits, 'withoutFix', 'count')}, which is ${page.number(visits, 'shareWithoutFix', 'share')} of the new visits${before}.</p>
</section>`;
}

function dayTables(page: Page, { watches }: WatchFound): Html {
  const told = watches.filter(({ days }) => days.length > 0);
  if (told.length === 0) return html``;
  return html`<section id="new-days"><h2>Day by day</h2>
<p>A ratio is the mean square of a day’s errors over that of the model, where distance matters (ppm) and where it does not
(constant). The sums gather what is too large day after day; beyond 8 they ask for a new fit.</p>
${told.map(({ component, days }) =>
  table(`New days, ${component}`, days, [
    { head: 'Day', cell: ({ day }) => date(day), text: true },
    { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
    { head: 'Ratio, ppm', cell: ({ ppm }) => (ppm === null ? '—' : page.number(ppm, 'ratio', 'ratio')) },
    { head: 'Sum, ppm', cell: (row) => page.number(row, 'ppmSum', 'ratio') },
    {
      head: 'Ratio, constant',
      cell: ({ constant }) => (constant === null ? '—' : page.number(constant, 'ratio', 'ratio')),
    },
    { head: 'Sum, constant', cell: (row) => page.number(row, 'constantSum', 'ratio') },
    { head: 'Outside', cell: ({ outside }) => (outside ? 'yes' : 'no'), text: true },
  ]),
)}
</section>`;
}
