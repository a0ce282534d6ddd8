import type { MarkShift, NextMark } from '../rule/index.js';
import type { WatchMonth } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** Marks that may have moved. */
export function markShiftSection(page: Page, { markShifts }: WatchMonth): Html {
  if (markShifts.length === 0) {
    return html`<section id="moved"><h2>Marks that may have moved</h2>
<p>No mark could be compared: that takes a model to watch by, and new days at marks it knows.</p></section>`;
  }
  const moved = markShifts.filter(({ verdict }) => verdict === 'moved');
  const { error } = page.units;
  const judged = markShifts.filter(({ verdict }) => verdict !== 'too few days').length;
  const words =
    moved.length === 0
      ? html`<p>${judged === 0 ? 'No mark has three new days, the least from which a move is told.' : 'No mark is shown to have moved.'}</p>`
      : html`<ul>${moved.map(
          (one) =>
            html`<li><strong>${page.name(one.mark)}</strong>, from base ${page.name(one.base)}, lies ${shift(page, one)} ${error.name} off in ${one.component === 'horizontal' ? 'plan (east, north)' : 'height'} on ${page.counted(one, 'days', 'new day')}. Look for damage, have it measured again, and check nothing on it until then.</li>\n`,
        )}</ul>`;
  return html`<section id="moved"><h2>Marks that may have moved</h2>
${words}</section>`;
}

/** How far every mark lies from its earlier mean. */
export function markShiftTable(page: Page, { markShifts }: WatchMonth): Html {
  if (markShifts.length === 0) return html``;
  const { error } = page.units;
  return html`<section id="marks"><h2>Mark by mark</h2>
${table<MarkShift>(`Mean error of the new days less that of the earlier ones, ${error.name}`, markShifts, [
  { head: 'Mark', cell: ({ mark }) => page.name(mark), text: true },
  { head: 'Base', cell: ({ base }) => page.name(base), text: true },
  {
    head: `Distance, ${page.units.distance.name}`,
    cell: (row) => page.number(row, 'baselineKm', 'distance'),
  },
  { head: 'In', cell: ({ component }) => (component === 'horizontal' ? 'plan' : 'height'), text: true },
  { head: 'New days', cell: (row) => page.number(row, 'days', 'count') },
  { head: 'East, north or up', cell: (row) => shift(page, row) },
  { head: 'Standard error', cell: (row) => page.number(row, 'seMm', 'error') },
  { head: 'Chance without a move', cell: (row) => page.number(row, 'pValue', 'chance') },
  { head: 'Moved', cell: ({ verdict }) => MOVED[verdict], text: true },
])}
<p class="small">What four marks or more of one base have in common is taken out: that is the base’s. Chances are for as many marks as were compared; below 0.01 a mark counts as moved.</p>
</section>`;
}

const MOVED = {
  moved: 'yes',
  'not shown to have moved': 'not\u00a0shown',
  'too few days': 'too few days',
} as const;

const shift = (page: Page, { shiftMm }: MarkShift): Html =>
  html`${shiftMm.map((_, axis) => html`${axis === 0 ? '' : ', '}${page.number(shiftMm as unknown as number[], axis, 'signed error')}`)}`;

/** Where to go next, and why. */
export function nextMarkSection(page: Page, { nextMarks, markShifts }: WatchMonth): Html {
  if (nextMarks.length === 0) return html``;
  const { distance } = page.units;
  return html`<section id="next"><h2>Visit next</h2>
<ol>${nextMarks.map(
    (next) =>
      html`<li><strong>${page.name(next.mark)}</strong>, ${page.number(next, 'baselineKm', 'distance')} ${distance.name} from the base: ${why(page, next, markShifts)}.</li>\n`,
  )}</ol></section>`;
}

function why(page: Page, next: NextMark, shifts: readonly MarkShift[]): Html {
  const gain =
    next.informationGain === null
      ? null
      : html` (one more occupation adds ${page.number(next, 'informationGain', 'small share')} to what is known of it)`;
  switch (next.reason) {
    case 'may have moved': {
      const own = shifts.find(({ mark, verdict }) => mark === next.mark && verdict === 'moved');
      return html`it may have moved${own === undefined ? null : html` in ${own.component === 'horizontal' ? 'plan' : 'height'}`}; a visit on another day confirms it or not`;
    }
    case 'tells most of the ppm':
      return html`a shot there tells most of the ppm${gain}`;
    case 'not visited':
      return html`it was not visited on the new days`;
    case 'few days':
      return html`it has only ${page.counted(next, 'days', 'day')} so far`;
  }
}
