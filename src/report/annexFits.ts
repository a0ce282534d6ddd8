import type { SpecSheetRatio, SpecSheetTest } from '../rule/index.js';
import type { ComparisonResult, FitResult } from '../study/index.js';
import { lengthTable } from './fitSection.js';
import { COUNTED_FROM, fitTable } from './fitTable.js';
import { percent } from './format.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { componentTitle } from './words.js';

/** Every fit, which form predicts better, and what else is known of the fits behind the rules. */
export function annexFits(page: Page, charts: readonly (Html | null)[]): Html {
  const { fits } = page.results;
  if (fits.length === 0) return html`<section id="fits"><h2>Fits</h2><p>No fit was possible.</p></section>\n`;
  const basis = fits.filter(({ basisOfRule }) => basisOfRule);
  return html`<section id="fits"><h2>Fits</h2>
${charts}
${fitTable(page, `All fits, with ${percent(fits[0]!.confidence)} intervals`, fits, [
  { head: 'Form', cell: ({ form, composed }) => `${form}${composed ? ', composed' : ''}`, text: true },
  { head: 'Screened', cell: ({ screened }) => (screened ? 'yes' : 'no'), text: true },
  { head: 'Behind the rules', cell: ({ basisOfRule }) => (basisOfRule ? 'yes' : 'no'), text: true },
])}
<p class="small">Composed: the constant is put together from repeatability and the errors of the marks. Screened: suspected wrong
fixes count less. </p>
${comparisons(page)}
${basis.map((fit) => remarks(page, fit))}
${wrongFixShares(page, basis)}
${lengthTable(page)}
${page.results.specSheetTest.map((test) => sheetTable(page, test))}
</section>
`;
}

function comparisons(page: Page): Html {
  return table<ComparisonResult>('Which form predicts unseen days better', page.results.comparison, [
    { head: 'Component', cell: ({ component }) => component, text: true },
    { head: 'Against', cell: ({ against }) => against, text: true },
    {
      head: 'Gain of root-sum-square per shot (log score)',
      cell: (row) => page.number(row, 'gain', 'plain'),
    },
    { head: 'Standard error', cell: (row) => page.number(row, 'se', 'plain') },
    { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
    { head: 'Verdict', cell: ({ verdict }) => verdict, text: true },
  ]);
}

function remarks(page: Page, fit: FitResult): Html {
  const { ppmIfIndependent, mostInfluentialDay, notes } = fit;
  const independent =
    ppmIfIndependent.low === null || ppmIfIndependent.high === null
      ? null
      : html` If every shot were independent the ppm would seem to lie between ${page.number(ppmIfIndependent, 'low', 'ppm')} and ${page.number(ppmIfIndependent, 'high', 'ppm')}: shots of one day are alike, so days are counted instead.`;
  const influential =
    mostInfluentialDay === null
      ? null
      : html` The day that moves the ppm most is ${date(mostInfluentialDay.day)}: without it the ppm is ${page.number(mostInfluentialDay, 'ppmWithout', 'ppm')}.`;
  const { distance } = page.units;
  return html`<p>${componentTitle(fit.component, page.results.heights)}, counted from ${COUNTED_FROM[fit.reference]}: ${marksWords(page, fit)} from
${page.number(fit, 'shortestKm', 'distance')} to ${page.number(fit, 'longestKm', 'distance')} ${distance.name}; interval by ${fit.interval};
information number ${page.number(fit, 'informationNumber', 'count')}, about the number of shots that speak of distance.${independent}${influential} ${page.text(notes.join(' '))}</p>
`;
}

/** The own spread over that of the spec sheet at some distances. */
function sheetTable(page: Page, { component, ratios, sentence }: SpecSheetTest): Html {
  if (ratios.length === 0)
    return html`<p>${componentTitle(component, page.results.heights)}: ${page.text(sentence)}</p>\n`;
  return table<SpecSheetRatio>(`Own spread over that of the spec sheet, ${component}`, ratios, [
    {
      head: `Distance, ${page.units.distance.name}`,
      cell: (row) => page.number(row, 'baselineKm', 'distance'),
      text: true,
    },
    { head: 'Own over spec sheet', cell: (row) => page.number(row, 'ratio', 'ratio') },
    { head: 'From', cell: (row) => page.number(row, 'low', 'ratio') },
    { head: 'To', cell: (row) => page.number(row, 'high', 'ratio') },
    { head: 'Verdict', cell: ({ verdict }) => verdict, text: true },
  ]);
}

const marksWords = (page: Page, fit: FitResult): Html =>
  fit.marks === null
    ? html`marks`
    : html`${page.number(fit, 'marks', 'count')} ${fit.marks === 1 ? 'mark' : 'marks'}`;

function wrongFixShares(page: Page, basis: readonly FitResult[]): Html {
  const share = basis.find(({ wrongFixShare }) => wrongFixShare !== null)?.wrongFixShare ?? null;
  if (share === null) return html`<p>Wrong fixes were not looked for.</p>\n`;
  return html`<p>Wrong fixes: ${page.number(share, 'events', 'count')} events, ${page.number(share, 'estimate', 'share')} of the occupations
(${page.number(share, 'low', 'share')} to ${page.number(share, 'high', 'share')}).</p>
${
  share.atKm.length === 0
    ? null
    : table('Share of wrong fixes by distance', share.atKm, [
        {
          head: `Distance, ${page.units.distance.name}`,
          cell: (row) => page.number(row, 'baselineKm', 'distance'),
          text: true,
        },
        { head: 'Estimate', cell: (row) => page.number(row, 'estimate', 'share') },
        { head: 'Upper limit', cell: (row) => page.number(row, 'high', 'share') },
      ])
}`;
}
