import type { Results } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Standard = Results['standards'][number];

/** What standards say of the shots, in one sentence each. */
export function standardsSection(page: Page): Html {
  const { standards } = page.results;
  if (standards.length === 0) return html``;
  return html`<section id="standards"><h2>Standards</h2>
<ul>${standards.map(({ name, outcome }) => html`<li><strong>${name}.</strong> ${page.text(outcome)}</li>\n`)}</ul>
<p class="small">Definitions and conditions are from memory: the printed standard decides, and this is no certificate. All figures and
conditions stand in the annex.</p>
</section>
`;
}

/** The figures and conditions of each standard. */
export function annexStandards(page: Page): Html {
  const { standards } = page.results;
  if (standards.length === 0) return html``;
  return html`<section id="standards"><h2>Standards</h2>
${standards.map((one) => standardPart(page, one))}
</section>
`;
}

const MET = new Map<boolean | null, string>([
  [true, 'met'],
  [false, 'not met'],
  [null, 'to be shown by other means'],
]);

function standardPart(page: Page, one: Standard): Html {
  const { error, distance } = page.units;
  return html`<p><strong>${one.name}</strong> (${one.standard}): ${page.text(one.definition)}. ${page.text(one.outcome)}</p>
<ul>${one.conditions.map(({ text, met }) => html`<li>${page.text(text)}: ${MET.get(met)!}</li>\n`)}</ul>
${
  one.figures.length === 0
    ? null
    : table(`Figures of ${one.name}`, one.figures, [
        { head: 'What', cell: ({ what }) => page.text(what), text: true },
        { head: 'Component', cell: ({ component }) => component ?? 'all', text: true },
        { head: `Distance, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance') },
        { head: `Value, ${error.name}`, cell: (row) => page.number(row, 'valueMm', 'error') },
        { head: 'From', cell: (row) => page.number(row, 'lowMm', 'error') },
        { head: 'To', cell: (row) => page.number(row, 'highMm', 'error') },
        { head: `Allowed, ${error.name}`, cell: (row) => page.number(row, 'allowedMm', 'error') },
        { head: 'Verdict', cell: ({ verdict }) => verdict ?? '', text: true },
      ])
}
<p class="small">${page.text(one.caution)}</p>
`;
}
