import { inputError } from '../logs/index.js';
import type { MarkMean } from '../split/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS, QUIET_INK } from './theme.js';
import { counted, signedNumber } from './words.js';

/** What {@link markMeansChart} draws. */
export interface MarkMeansInput {
  /** From `markMeans`. */
  readonly marks: readonly MarkMean[];
  /** Kind of the heights; named where it is given. */
  readonly heights?: 'ellipsoidal' | 'orthometric' | undefined;
}

const AXES = ['east', 'north', 'up'] as const;
type Axis = (typeof AXES)[number];

interface MeanRow {
  readonly label: string;
  /** mm. */
  readonly mean: number;
  /** Two standard errors below and above the mean, mm; null for a single day. */
  readonly low: number | null;
  readonly high: number | null;
}

const ROW_PX = 22;
const PANEL_PX = 215;

/**
 * Mean east, north and up error of each mark with two standard errors on either side, nearest mark first.
 * @throws InputError when there is no mark
 */
export function markMeansChart({ marks, heights }: MarkMeansInput): ChartSpec {
  if (marks.length === 0) {
    throw inputError(
      'bad-option',
      'Expected at least one mark, came none. Hand in the means of measured marks.',
    );
  }
  const ordered = largestMeans(marks).sort(
    (a, b) => a.baselineKm - b.baselineKm || (a.mark < b.mark ? -1 : 1),
  );
  const labels = rowLabels(ordered);
  const panels = AXES.map((axis) => meanRows(ordered, labels, axis));
  const domain = commonDomain(panels.flat());
  const views = AXES.map((axis, k) =>
    panelView(axisTitle(axis, heights), panels[k]!, labels, domain, k === 0),
  );
  return chartSpec(title(marks), subtitle(marks, ordered.length), description(marks), {
    hconcat: views,
    spacing: 22,
  });
}

/** More rows than these are no picture any more: of many marks those with the largest means are drawn. */
const MOST_ROWS = 60;

function largestMeans(marks: readonly MarkMean[]): MarkMean[] {
  if (marks.length <= MOST_ROWS) return [...marks];
  const size = (mark: MarkMean): number => Math.hypot(...AXES.map((axis) => mark[axis] ?? 0));
  return [...marks].sort((a, b) => size(b) - size(a) || (a.mark < b.mark ? -1 : 1)).slice(0, MOST_ROWS);
}

/** `M01  0.4 km`; with the base where one mark was measured from several. */
function rowLabels(marks: readonly MarkMean[]): string[] {
  const severalBases = new Set(marks.map(({ base }) => base)).size > 1;
  return marks.map(
    ({ mark, base, baselineKm }) =>
      `${mark}${severalBases ? ` from ${base}` : ''}, ${baselineKm.toFixed(1)} km`,
  );
}

function meanRows(marks: readonly MarkMean[], labels: readonly string[], axis: Axis): MeanRow[] {
  return marks.flatMap((mark, i) => {
    const [mean, se] = [mark[axis], mark.se[axis]];
    if (mean === null) return [];
    return [
      {
        label: labels[i]!,
        mean,
        low: se === null ? null : mean - 2 * se,
        high: se === null ? null : mean + 2 * se,
      },
    ];
  });
}

/** One scale for the three panels, with 0 and a little room. */
function commonDomain(rows: readonly MeanRow[]): [number, number] {
  const ends = rows.flatMap(({ mean, low, high }) => [mean, low ?? mean, high ?? mean]);
  const [least, most] = [Math.min(0, ...ends), Math.max(0, ...ends)];
  const room = 0.05 * (most - least) || 1;
  return [least - room, most + room];
}

const axisTitle = (axis: Axis, heights: MarkMeansInput['heights']): string =>
  `mean ${axis} error${axis === 'up' && heights !== undefined ? ` (${heights})` : ''}, mm`;

function panelView(
  title: string,
  rows: readonly MeanRow[],
  labels: readonly string[],
  domain: readonly [number, number],
  first: boolean,
): View {
  const y = {
    type: 'nominal',
    scale: { domain: labels },
    sort: null,
    axis: first
      ? { title: null, ticks: false, domain: false, labelPadding: 8, grid: true, gridColor: COLORS.mist }
      : { title: null, ticks: false, domain: false, labels: false, grid: true, gridColor: COLORS.mist },
  };
  const x = {
    type: 'quantitative',
    scale: { domain, nice: false },
    axis: { title, tickCount: 5 },
  };
  const withBar = rows.filter(({ low }) => low !== null);
  const unknown = labels.filter((label) => !rows.some((row) => row.label === label));
  return {
    width: PANEL_PX,
    height: Math.max(3, labels.length) * ROW_PX,
    layer: [
      {
        data: { values: [{ zero: 0 }] },
        mark: { type: 'rule', color: QUIET_INK, strokeWidth: 1.2 },
        encoding: { x: { ...x, field: 'zero' } },
      },
      {
        data: { values: withBar },
        mark: { type: 'rule', color: COLORS.water, strokeWidth: 2 },
        encoding: { y: { ...y, field: 'label' }, x: { ...x, field: 'low' }, x2: { field: 'high' } },
      },
      {
        data: { values: rows },
        mark: { type: 'circle', color: COLORS.water, size: 34, opacity: 1 },
        encoding: { y: { ...y, field: 'label' }, x: { ...x, field: 'mean' } },
      },
      {
        data: { values: unknown.map((label) => ({ label, zero: 0, text: 'not known' })) },
        mark: { type: 'text', color: QUIET_INK, align: 'left', dx: 6, baseline: 'middle' },
        encoding: { y: { ...y, field: 'label' }, x: { ...x, field: 'zero' }, text: { field: 'text' } },
      },
    ],
  };
}

interface Largest {
  readonly mark: string;
  readonly axis: Axis;
  readonly mean: number;
}

function largestMean(marks: readonly MarkMean[]): Largest | null {
  return marks
    .flatMap((mark) => AXES.map((axis) => ({ mark: mark.mark, axis, mean: mark[axis] })))
    .reduce<Largest | null>((most, { mark, axis, mean }) => {
      if (mean === null || (most !== null && Math.abs(mean) <= Math.abs(most.mean))) return most;
      return { mark, axis, mean };
    }, null);
}

/** A mark shot from two bases has two means. */
function marksCounted(marks: readonly MarkMean[]): string {
  const bases = new Set(marks.map(({ base }) => base)).size;
  const names = counted(new Set(marks.map(({ mark }) => mark)).size, 'mark');
  return bases > 1 ? `${names} from ${bases} bases` : names;
}

function title(marks: readonly MarkMean[]): string {
  const most = largestMean(marks);
  return most === null
    ? `Mean error of ${marksCounted(marks)}: none known`
    : `Mean error of ${marksCounted(marks)}: largest ${most.axis} ${signedNumber(most.mean)} mm at ${most.mark}`;
}

function subtitle(marks: readonly MarkMean[], drawn: number): string[] {
  const single = marks.some(({ days }) => days < 2);
  return [
    `Measured minus known; bars: two standard errors to either side, counted by days, not by shots${single ? '; no bar: one day only' : ''}`,
    drawn < marks.length
      ? `The ${drawn} marks with the largest means of ${marks.length}, in order of distance from the base`
      : 'Marks in order of distance from the base',
  ];
}

function description(marks: readonly MarkMean[]): string {
  const lengths = marks.map(({ baselineKm }) => baselineKm);
  return `Mean east, north and up errors in millimetres of ${marksCounted(marks)} from ${Math.min(...lengths).toFixed(1)} to ${Math.max(...lengths).toFixed(1)} km from the base, with two standard errors. ${title(marks)}.`;
}
