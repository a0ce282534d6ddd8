import { type CommonParameter, isTold } from '../errors/index.js';
import type { Results } from '../study/index.js';
import { count, NOT_GIVEN, plural, signed } from './format.js';
import { type Html, html } from './html.js';
import { table } from './table.js';

type BaseParameters = Results['commonCauses']['bases'][number];
interface Row {
  readonly base: BaseParameters;
  readonly parameter: CommonParameter;
}

/** What all positions from a base have in common, what likely caused it, and what to do. */
export function commonSection({ commonCauses, heights }: Results): Html {
  const { bases, causes } = commonCauses;
  const rows = bases.flatMap((base) => base.parameters.map((parameter): Row => ({ base, parameter })));
  if (rows.length === 0 && causes.length === 0) return html``;
  return html`<section id="common"><h2>What all positions have in common</h2>
<p>Another frame or unit, a grid taken for the ground, a geoid, a rod or the coordinate of a base moves all marks together.
Such errors are signed: they have a direction and are the same on all days. They are no part of the random spread of which
constant and ppm are the measure, and a ppm in this table is another thing than the ppm of the error model.</p>
${causeList(causes)}
${bases.map(({ base, marks, days }) => html`<p class="small">Base ${base}: mean errors of ${plural(marks, 'mark')} on ${plural(days, 'day')}.</p>\n`)}
${rows.length === 0 ? null : parameterTable(rows, heights)}
</section>
`;
}

function causeList(causes: Results['commonCauses']['causes']): Html {
  if (causes.length === 0) {
    return html`<p>Nothing was found that all positions have in common beyond what chance explains or a fit leaves aside.</p>\n`;
  }
  return html`${causes.map(({ text, remedy }) => html`<p class="first">${text} <strong>${remedy}</strong></p>\n`)}
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

const UNITS: Readonly<Record<CommonParameter['unit'], string>> = {
  mm: 'mm',
  ppm: 'ppm',
  arcsec: '″',
  'mm/km': 'mm per km',
};

function parameterTable(rows: readonly Row[], heights: Results['heights']): Html {
  const several = new Set(rows.map(({ base }) => base.base)).size > 1;
  return html`${table(
    `Shift, scale, rotation and tilts of the marks about their base; heights are ${heights}`,
    rows,
    [
      ...(several ? [{ head: 'Base', cell: ({ base }: Row) => base.base, text: true }] : []),
      { head: 'What', cell: ({ parameter }) => NAMES[parameter.name], text: true },
      { head: 'Estimate', cell: ({ parameter }) => signed(parameter.estimate, decimals(parameter)) },
      {
        head: 'Standard error',
        cell: ({ parameter: { standardError, ...rest } }) =>
          standardError === null ? NOT_GIVEN : standardError.toFixed(decimals(rest)),
      },
      { head: 'Unit', cell: ({ parameter }) => UNITS[parameter.unit], text: true },
      { head: 'Degrees of freedom', cell: ({ parameter }) => count(parameter.degreesOfFreedom) },
      { head: 'Told from nothing (99 %)', cell: ({ parameter }) => toldWords(parameter), text: true },
    ],
  )}
<p class="small">From medians of day medians of each mark, so that single bad shots do not count; the standard errors hold
the scatter of days and the marks' own errors.</p>
`;
}

const decimals = ({ unit }: Pick<CommonParameter, 'unit'>): number => (unit === 'mm' ? 1 : 2);

const toldWords = (parameter: CommonParameter): string =>
  parameter.standardError === null ? 'too few marks to tell' : isTold(parameter) ? 'yes' : 'no';
