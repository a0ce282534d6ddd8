import type { CheckShotLimits, TwoBasesLimit } from '../rule/index.js';
import type { Results } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { capital } from './words.js';

type Visits = Results['secondVisits'][number];
type LengthRow = Results['errorByOccupationLength'][number];

/** What second visits and longer occupations gain, and how far shots from two bases may lie apart. */
export function annexVisits(page: Page): Html {
  const { secondVisits, errorByOccupationLength: lengths, checkShotLimits } = page.results;
  const limits = checkShotLimits.filter(({ twoBases }) => twoBases.length > 0);
  if (secondVisits.length + lengths.length + limits.length === 0) return html``;
  return html`<section id="visits"><h2>Checks, second visits and long occupations</h2>
${checkShotLimits.map((one) => html`<p>${capital(one.component)}: ${page.text(one.sentence)}</p>\n`)}
${limits.map((one) => twoBasesTable(page, one))}
${secondVisits.map((one) => visitTable(page, one))}
${lengths.length === 0 ? null : lengthTable(page, lengths)}
</section>
`;
}

function twoBasesTable(page: Page, { component, twoBases }: CheckShotLimits): Html {
  const { error, distance } = page.units;
  return table<TwoBasesLimit>(
    `One point on one day from two bases, ${component}: something is wrong beyond, ${error.name}`,
    twoBases,
    [
      {
        head: `From one base, ${distance.name}`,
        cell: (row) => page.number(row, 'firstKm', 'distance, rounded down'),
        text: true,
      },
      {
        head: `From the other, ${distance.name}`,
        cell: (row) => page.number(row, 'secondKm', 'distance, rounded down'),
      },
      { head: `Limit, ${error.name}`, cell: (row) => page.number(row, 'limitMm', 'error on a card') },
    ],
  );
}

function visitTable(page: Page, one: Visits): Html {
  const { error, distance } = page.units;
  const rests = html`<p>${capital(one.component)}: ${page.text(one.sentence)} From ${page.counted(one, 'pairs', 'pair')} of visits on ${page.counted(one, 'days', 'day')}.</p>\n`;
  if (one.visits.length === 0) return rests;
  return html`${rests}${table(`A second visit on the same day, ${one.component}`, one.visits, [
    {
      head: `Distance, ${distance.name}`,
      cell: (row) => page.number(row, 'baselineKm', 'distance, rounded down'),
      text: true,
    },
    { head: 'Minutes apart', cell: (row) => page.number(row, 'minutes', 'count') },
    { head: 'Error of the mean over that of one', cell: ({ factor }) => page.limits(factor, 'ratio') },
    {
      head: 'Error of the difference over that of one',
      cell: ({ differenceFactor }) => page.limits(differenceFactor, 'ratio'),
    },
    {
      head: `Something is wrong beyond, ${error.name}`,
      cell: (row) => page.number(row, 'differenceLimitMm', 'error on a card'),
    },
  ])}`;
}

const lengthTable = (page: Page, rows: readonly LengthRow[]): Html =>
  html`${table<LengthRow>('Error by the number of positions in an occupation', rows, [
    { head: 'Component', cell: ({ component }) => component, text: true },
    {
      head: 'Positions',
      cell: (row) =>
        html`${page.number(row, 'fromEpochs', 'count')} to ${page.number(row, 'toEpochs', 'count')}`,
      text: true,
    },
    { head: 'Error over the model', cell: ({ ratio }) => page.limits(ratio, 'ratio') },
    { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
    { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
  ])}
<p class="small">1: as large as the model says for the distance. Below 1: longer occupations are better by so much.</p>
`;
