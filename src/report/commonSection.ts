import { type CommonParameter, isTold } from '../errors/index.js';
import type { Results } from '../study/index.js';
import type { NumberKind } from './format.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type BaseParameters = Results['commonCauses']['bases'][number];
interface Row {
  readonly base: BaseParameters;
  readonly parameter: CommonParameter;
}

/** What all positions from a base have in common, what likely caused it, and what to do. */
export function commonSection(page: Page): Html {
  const { bases, causes } = page.results.commonCauses;
  const rows = bases.flatMap((base) => base.parameters.map((parameter): Row => ({ base, parameter })));
  if (rows.length === 0 && causes.length === 0) return html``;
  return html`<section id="common"><h2>What all positions have in common</h2>
<p>Another frame or unit, a grid taken for the ground, a geoid, a rod or the coordinate of a base moves all marks together.
Such errors are signed: they have a direction and are the same on all days. They are no part of the random spread of which
constant and ppm are the measure, and a ppm in this table is another thing than the ppm of the error model.</p>
${causeList(page, causes)}
${bases.map((base) => html`<p class="small">Base ${page.name(base.base)}: mean errors of ${page.counted(base, 'marks', 'mark')} on ${page.counted(base, 'days', 'day')}.</p>\n`)}
${rows.length === 0 ? null : parameterTable(page, rows)}
</section>
`;
}

function causeList(page: Page, causes: Results['commonCauses']['causes']): Html {
  if (causes.length === 0) {
    return html`<p>Nothing was found that all positions have in common beyond what chance explains or a fit leaves aside.</p>\n`;
  }
  return html`${causes.map(({ text, remedy }) => html`<p class="first">${page.text(text)} <strong>${page.text(remedy)}</strong></p>\n`)}
<p>Nothing was repaired. State the remedy in the study file and run it again.</p>
`;
}

const NAMES: Readonly<Record<CommonParameter['name'], string>> = {
  'shift-east': 'Shift east',
  'shift-north': 'Shift north',
  'shift-up': 'Shift up',
  scale: 'Scale along the baselines (signed ppm)',
  rotation: 'Rotation about the base, anticlockwise',
  'tilt-east': 'Growth of the height error to the east',
  'tilt-north': 'Growth of the height error to the north',
};

const UNITS = {
  ppm: 'ppm',
  arcsec: '″',
  'mm/km': 'ppm',
} as const;

function parameterTable(page: Page, rows: readonly Row[]): Html {
  const several = new Set(rows.map(({ base }) => base.base)).size > 1;
  return html`${table(
    `Shift, scale, rotation and tilts of the marks about their base; heights are ${page.results.heights}`,
    rows,
    [
      ...(several ? [{ head: 'Base', cell: ({ base }: Row) => page.name(base.base), text: true }] : []),
      { head: 'What', cell: ({ parameter }) => NAMES[parameter.name], text: true },
      { head: 'Estimate', cell: ({ parameter }) => page.number(parameter, 'estimate', kind(parameter)) },
      {
        head: 'Standard error',
        cell: ({ parameter }) =>
          page.number(parameter, 'standardError', parameter.unit === 'mm' ? 'error' : 'ppm'),
      },
      { head: 'Unit', cell: ({ parameter }) => unitOf(page, parameter), text: true },
      {
        head: 'Degrees of freedom',
        cell: ({ parameter }) => page.number(parameter, 'degreesOfFreedom', 'count'),
      },
      { head: 'Told from nothing (99 %)', cell: ({ parameter }) => toldWords(parameter), text: true },
    ],
  )}
<p class="small">From medians of day medians of each mark, so that single bad shots do not count; the standard errors hold
the scatter of days and the marks' own errors.</p>
`;
}

const kind = ({ unit }: CommonParameter): NumberKind => (unit === 'mm' ? 'signed error' : 'signed ppm');

/** `mm per km` is a part in a million. */
const unitOf = ({ units }: Page, { unit }: CommonParameter): string =>
  unit === 'mm' ? units.error.name : UNITS[unit];

const toldWords = (parameter: CommonParameter): string =>
  parameter.standardError === null ? 'too few marks to tell' : isTold(parameter) ? 'yes' : 'no';
