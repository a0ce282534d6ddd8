import type { DailyFactorResult, Results, TimeOfDayResult, WrongFixResult } from '../study/index.js';
import { who } from './blundersSection.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { figure, type ReportPicture, type ReportPictures } from './pictures.js';
import { table } from './table.js';

/** Days, hours, setups and suspected wrong fixes. */
export function annexDays(page: Page, pictures: Pick<ReportPictures, 'days' | 'hours' | 'wrongFixes'>): Html {
  const { dayModels, timeOfDay, setups, fits } = page.results;
  if (fits.length === 0) return html``;
  return html`<section id="days"><h2>Days, hours and setups</h2>
${dayModels.length === 0 ? html`<p>Single days could not be judged: that takes more days with near and far marks.</p>` : dayModelTable(page)}
${pictures.days.map(figure)}${dailyTable(page)}
${degradedWords(page)}${eventWords(page)}${pictures.hours.map(figure)}${timeOfDay.map((one) => hourTable(page, one))}
${setups.length === 0 ? null : setupTable(page)}
</section>
${wrongFixes(page, pictures.wrongFixes)}
`;
}

const dayModelTable = (page: Page): Html =>
  table('How the ppm differs from day to day', page.results.dayModels, [
    { head: 'Component', cell: ({ component }) => component, text: true },
    { head: 'ppm of the median day', cell: ({ medianDayPpm }) => page.limits(medianDayPpm, 'ppm') },
    { head: 'ppm over days to come', cell: ({ longRunPpm }) => page.limits(longRunPpm, 'ppm') },
    { head: 'Spread of the log of daily factors', cell: ({ spread }) => page.limits(spread, 'ratio') },
    { head: 'A shot is worth', cell: (model) => page.number(model, 'effectiveShare', 'ratio') },
    {
      head: 'Correlation of days in a row',
      cell: (model) => page.number(model, 'lagOneCorrelation', 'signed ppm'),
    },
    { head: 'Clustered by', cell: ({ clusteredBy }) => clusteredBy, text: true },
  ]);

/** What is known of each degraded day, in sentences. */
function degradedWords(page: Page): Html {
  const { degradedDays } = page.results;
  if (degradedDays.length === 0) return html`<p>No day stands out as degraded.</p>\n`;
  return html`<p>Degraded days:</p>
<ul>${degradedDays.map(({ text }) => html`<li>${page.text(text)}</li>\n`)}</ul>\n`;
}

/** Degraded days in a row, which likely have one cause. */
function eventWords(page: Page): Html[] {
  return page.results.dayModels.flatMap(({ component, events }) =>
    events
      .filter(({ days }) => days.length > 1)
      .map(
        ({ from, to, days }) =>
          html`<p>Degraded in a row, ${component}: ${page.lengthOf(days, 'day')} of work from ${date(from)} to ${date(to)}. Look for one cause.</p>\n`,
      ),
  );
}

const dailyTable = (page: Page): Html =>
  table<DailyFactorResult>('Every day: its ppm over that of the median day', page.results.dailyFactors, [
    { head: 'Day', cell: ({ day }) => date(day), text: true },
    { head: 'Component', cell: ({ component }) => component, text: true },
    { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
    {
      head: 'Daily factor',
      cell: (row) =>
        html`${page.number(row, 'factor', 'ratio')} (${page.number(row, 'low', 'ratio')} to ${page.number(row, 'high', 'ratio')})`,
    },
    {
      head: 'Probability that it is degraded',
      cell: (row) => page.number(row, 'probabilityDegraded', 'ratio'),
    },
    {
      head: 'Degraded',
      cell: ({ degraded }) => yesOrNo(degraded),
      text: true,
    },
    {
      head: 'A second test agrees',
      cell: ({ degraded, secondOpinion }) => (degraded === true ? yesOrNo(secondOpinion) : '—'),
      text: true,
    },
  ]);

const yesOrNo = (answer: boolean | null): string => (answer === null ? 'not judged' : answer ? 'yes' : 'no');

function hourTable(page: Page, one: TimeOfDayResult): Html {
  const { component, pValue, hours } = one;
  if (hours.length === 0) return html`<p>Hours of the ${component} component could not be judged.</p>\n`;
  const chance =
    pValue === null
      ? html`no test below 15 days`
      : html`chance of such differences among equal hours ${page.number(one, 'pValue', 'chance')}`;
  return table(html`Hours, ${component}: ${chance}`, hours, [
    {
      head: 'Solar time',
      cell: (hour) => html`${page.number(hour, 'from', 'hour')} to ${page.number(hour, 'to', 'hour')}`,
      text: true,
    },
    { head: 'ppm', cell: ({ ppm }) => page.limits(ppm, 'ppm') },
    { head: 'Occupations', cell: (hour) => page.number(hour, 'occupations', 'count') },
    { head: 'Days', cell: (hour) => page.number(hour, 'days', 'count') },
  ]);
}

type Setup = Results['setups'][number];

function setupTable(page: Page): Html {
  const offset = (axis: 'east' | 'north' | 'up') => (row: Setup) =>
    row[axis] === null
      ? '—'
      : html`${page.number(row, axis, 'signed error')}${row.se[axis] === null ? null : html` ± ${page.number(row.se, axis, 'error')}`}`;
  return table<Setup>(
    `Common offset of each setup of a base ± its standard error, ${page.units.error.name}`,
    page.results.setups,
    [
      { head: 'Setup', cell: ({ setup }) => page.name(setup), text: true },
      { head: 'Visits', cell: (row) => page.number(row, 'visits', 'count') },
      { head: 'East', cell: offset('east') },
      { head: 'North', cell: offset('north') },
      { head: `Up (${page.results.heights})`, cell: offset('up') },
      {
        head: 'Told from the marks’ errors',
        cell: ({ separable, reason }) => (separable ? 'yes' : `no: ${page.text(reason ?? '')}`),
        text: true,
      },
    ],
  );
}

function wrongFixes(page: Page, pictures: readonly ReportPicture[]): Html {
  const { wrongFixes: found } = page.results;
  if (found.length === 0) return html``;
  const { error, distance } = page.units;
  const axis = (key: 'east' | 'north' | 'up') => (row: WrongFixResult) =>
    page.number(row, key, 'signed error');
  return html`<section id="wrong-fixes"><h2>Suspected wrong fixes</h2>
<p>${page.lengthOf(found, 'occupation looks', 'occupations look')} like a wrong fix. Look each of them up in the field book.</p>
${pictures.map(figure)}${table<WrongFixResult>(`Suspected wrong fixes, errors in ${error.name}`, found, [
  { head: 'Day', cell: ({ day }) => date(day), text: true },
  { head: 'Mark', cell: ({ mark }) => page.name(mark), text: true },
  { head: 'Crew, rover', cell: ({ crew, rover }) => who(page.crew(crew), rover), text: true },
  { head: `Distance, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance') },
  { head: 'East', cell: axis('east') },
  { head: 'North', cell: axis('north') },
  { head: 'Up', cell: axis('up') },
  { head: 'Probability', cell: (row) => page.number(row, 'probability', 'ratio') },
  {
    head: 'Place',
    cell: (row) => html`${page.name(row.file)}, line ${page.number(row, 'row', 'plain')}`,
    text: true,
  },
])}
</section>
`;
}
