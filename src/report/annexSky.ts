import type { Sky, SkyAssociation, SkyDay, SkyThreshold } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { figure, type ReportPicture } from './pictures.js';
import { type Column, table } from './table.js';

/** The sky of the days, and what went with it. */
export function annexSky(page: Page, pictures: readonly ReportPicture[]): Html {
  const { sky, fits } = page.results;
  if (sky === null) {
    return fits.length === 0
      ? html``
      : html`<section id="sky"><h2>The sky of the days</h2>
<p>The days were not compared with geomagnetic activity or the ionosphere: no file that tells of them could be used. Name such files under indices and maps.</p></section>\n`;
  }
  return html`<section id="sky"><h2>The sky of the days</h2>
<p>Read from ${sky.files.map((file, k) => html`${k === 0 ? '' : ', '}${page.name(file)}`)}; electron content over base ${page.name(sky.site.base)}.
What goes together over days need not be its cause.</p>
${pictures.map(figure)}${associationTable(page, sky.associations)}
${sky.thresholds.map((one) => thresholdTable(page, one))}
${dayTable(page, sky)}
</section>
`;
}

/** Below this chance, with all comparisons counted, two things are said to go together. */
const LEVEL = 0.05;

function associationTable(page: Page, associations: Sky['associations']): Html {
  if (associations.length === 0) return html`<p>Too few days are known to compare them with the sky.</p>`;
  const told = associations.filter(({ adjustedPValue }) => adjustedPValue !== null && adjustedPValue < LEVEL);
  const words =
    told.length === 0
      ? html`<p>With all comparisons counted none can be told from chance. That does not show that there is none: the limits say what the days leave open.</p>\n`
      : html`<ul>${told.map((one) => html`<li>${one.outcome} and ${one.measure}: ${page.text(one.statement)}</li>\n`)}</ul>\n`;
  return html`${words}${table<SkyAssociation>(
    'What goes with what over the days (Spearman’s rank correlation)',
    associations,
    [
      { head: 'Of the days', cell: ({ outcome }) => outcome, text: true },
      { head: 'Of the sky', cell: ({ measure }) => measure, text: true },
      { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
      {
        head: 'Correlation',
        cell: (row) =>
          row.spearman === null
            ? '—'
            : html`${page.number(row, 'spearman', 'signed ppm')} (${page.number(row, 'low', 'signed ppm')} to ${page.number(row, 'high', 'signed ppm')})`,
      },
      { head: 'Chance', cell: (row) => page.number(row, 'pValue', 'chance') },
      { head: 'Chance, for all comparisons', cell: (row) => page.number(row, 'adjustedPValue', 'chance') },
    ],
  )}`;
}

function thresholdTable(page: Page, one: SkyThreshold): Html {
  const { component, thresholds, statement, best } = one;
  const words = html`<p>No work from a certain Kp on, ${component}: ${page.text(statement)}</p>\n`;
  if (thresholds.length === 0) return words;
  return html`${words}${table(`No work from this Kp on: what it would have done, ${component}`, thresholds, [
    {
      head: 'Kp from',
      cell: (row) =>
        html`${page.number(row, 'kpFrom', 'ratio')}${row.kpFrom === best?.kpFrom ? ' (best)' : ''}`,
    },
    { head: 'Days flagged', cell: (row) => page.number(row, 'flaggedDays', 'count') },
    {
      head: 'Degraded days caught',
      cell: ({ caught }) =>
        html`${page.number(caught, 'count', 'count')} of ${page.number(caught, 'of', 'count')} ${page.limits(caught, 'share')}`,
    },
    {
      head: 'Other days flagged',
      cell: ({ falseAlarms }) =>
        html`${page.number(falseAlarms, 'count', 'count')} of ${page.number(falseAlarms, 'of', 'count')} ${page.limits(falseAlarms, 'share')}`,
    },
    { head: 'Caught less false (shares)', cell: (row) => page.number(row, 'youden', 'signed ppm') },
  ])}`;
}

/** Every day of the study; columns of which no file tells are left out. */
function dayTable(page: Page, { days }: Sky): Html {
  const kinds = [
    ['ap', 'Mean ap', 'ratio'],
    ['kpMax', 'Greatest Kp', 'ratio'],
    ['hpMax', 'Greatest Hp', 'ratio'],
    ['f107', 'F10.7, sfu', 'ratio'],
    ['dstMin', 'Least Dst, nT', 'signed ppm'],
    ['tecMean', 'TEC, TECU', 'ratio'],
    ['tecMax', 'Greatest TEC, TECU', 'ratio'],
    ['gradientMean', 'Gradient, TECU per 100 km', 'ratio'],
    ['tecChange', 'Change of TEC, TECU', 'signed ppm'],
    ['shorteningPpm', 'Shortening on L1, ppm', 'ratio'],
    ['shareWithoutFix', 'Visits without a fix', 'share'],
  ] as const;
  const known = kinds.filter(([key]) => days.some((day) => day[key] !== null));
  return table<SkyDay>('The sky day by day', days, [
    { head: 'Day', cell: ({ day }) => date(day), text: true },
    ...known.map(
      ([key, head, kind]): Column<SkyDay> => ({ head, cell: (day) => page.number(day, key, kind) }),
    ),
  ]);
}
