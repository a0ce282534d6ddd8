import type { Results, TermsResult } from '../study/index.js';
import { COUNTED_FROM } from './fitTable.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { capital } from './words.js';

/** Further terms beside constant and ppm, and crews, receivers and bases apart, where the study file asks for them. */
export function annexGroups(page: Page): Html {
  const { terms, groups, fits } = page.results;
  if (fits.length === 0) return html``;
  return html`<section id="groups"><h2>Further terms; crews, receivers and bases apart</h2>
${
  terms.length === 0
    ? html`<p>The study file asks for no further terms and states no centring, or the logs have no values for them. Terms are asked for with terms: [height-difference, pdop, reported-sigma].</p>\n`
    : terms.map((one) => termTable(page, one))
}
${
  groups.length === 0
    ? html`<p>Crews, receivers and bases are not compared: the study file does not ask for it with by: [crew, rover, base], or there is one of each.</p>\n`
    : groups.map((one) => groupTable(page, one))
}
</section>
`;
}

const TERM_WORDS = {
  'height-difference': 'Height difference between base and mark',
  pdop: 'PDOP',
  'reported-sigma': 'Precision that the receiver reports',
} as const;

function termTable(page: Page, one: TermsResult): Html {
  const { error } = page.units;
  type Row = {
    readonly name: string;
    readonly value: Html;
    readonly unit: string;
    readonly gain: Html;
    readonly verdict: string;
  };
  const rows: Row[] = [
    {
      name: 'Constant',
      value: page.limits(one.constantMm, 'error'),
      unit: error.name,
      gain: html`—`,
      verdict: '',
    },
    {
      name: 'Constant without centring and marks',
      value: page.limits(one.ownConstantMm, 'error'),
      unit: error.name,
      gain: html`—`,
      verdict: '',
    },
    { name: 'ppm', value: page.limits(one.ppm, 'ppm'), unit: 'ppm', gain: html`—`, verdict: '' },
    ...one.terms.map(
      (term): Row => ({
        name: TERM_WORDS[term.term],
        value: page.limits(term, 'ratio'),
        unit: term.unit === 'power' ? 'power of value over median' : term.unit,
        gain:
          term.gain === null
            ? html`—`
            : html`${page.number(term, 'gain', 'plain')} ± ${page.number(term, 'se', 'plain')}`,
        verdict: term.verdict,
      }),
    ),
  ];
  return html`${table(`Constant, ppm and further terms, ${one.component}`, rows, [
    { head: 'Part', cell: ({ name }) => name, text: true },
    { head: 'Estimate', cell: ({ value }) => value },
    { head: 'Unit', cell: ({ unit }) => unit, text: true },
    { head: 'Gain per shot on unseen days (log score)', cell: ({ gain }) => gain },
    { head: 'Verdict', cell: ({ verdict }) => verdict, text: true },
  ])}
<p class="small">From ${page.counted(one, 'occupations', 'occupation')} on ${page.counted(one, 'days', 'day')}; ${page.number(one, 'knownMm', 'error')} ${error.name} of the constant is known to be centring and marks.${one.converged ? '' : ' The fit did not settle: use none of these numbers.'}</p>
`;
}

type Comparison = Results['groups'][number];

function groupTable(page: Page, one: Comparison): Html {
  const { by, component, groups, verdict, pValue } = one;
  const chance =
    pValue === null ? null : html` (chance of as much among equals ${page.number(one, 'pValue', 'chance')})`;
  const kind = by === 'rover' ? 'receiver' : by;
  return html`${table(
    `Each ${kind} by itself, ${component}, counted from ${COUNTED_FROM[one.reference]}`,
    groups,
    [
      {
        head: capital(kind),
        cell: ({ group }) => (by === 'crew' ? page.crew(group) : page.name(group)),
        text: true,
      },
      {
        head: `Constant, ${page.units.error.name}`,
        cell: ({ constantMm }) => page.limits(constantMm, 'error'),
      },
      { head: 'ppm', cell: ({ ppm }) => page.limits(ppm, 'ppm') },
      { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
      { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
      { head: 'Takes part in the test', cell: ({ tested }) => (tested ? 'yes' : 'no'), text: true },
      { head: 'Why not all can be given', cell: ({ reason }) => page.text(reason ?? ''), text: true },
    ],
  )}
<p class="small">Verdict: ${verdict}${chance}.</p>
`;
}
