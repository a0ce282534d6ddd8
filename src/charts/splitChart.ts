import type { Component } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import type { Interval, SummaryRow } from '../split/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS, QUIET_INK } from './theme.js';
import { componentTitle, counted, percentWords, rmsWords, roundUp } from './words.js';

/** What {@link splitChart} draws. */
export interface SplitInput {
  /** From `summarizeBy`. */
  readonly rows: readonly SummaryRow[];
  readonly component: Component;
  /** What the rows are split by, as an axis is named: `crew`, `PDOP`. */
  readonly by: string;
}

interface SplitRow {
  readonly label: string;
  readonly rms: number;
  readonly low: number | null;
  readonly high: number | null;
  readonly tooFew: boolean;
  readonly text: string;
}

const ROW_PX = 24;
const WIDTH_PX = 430;
/** More rows than these are no picture any more: of many those with the most occupations are drawn. */
const MOST_ROWS = 40;

/**
 * RMS of each group of a split with its interval; hollow where the group holds too little.
 * @throws InputError when no group has an RMS of the component
 */
export function splitChart({ rows, component, by }: SplitInput): ChartSpec {
  const known = rows.filter((row) => rmsOf(row, component) !== null);
  if (known.length === 0) {
    throw inputError(
      'bad-option',
      `Expected groups with a ${rmsWords(component)}, came none. Hand in a summary of errors that have it.`,
    );
  }
  const drawn = mostOccupied(known);
  const split = drawn.map((row) => splitRow(row, component));
  const title = titleOf(known, component, by);
  return chartSpec(
    title,
    [
      `${rmsWords(component)} of each class, ${barWords(split)}; lengths may differ between classes`.replace(
        /^./,
        (first) => first.toUpperCase(),
      ),
      ...(split.some(({ tooFew }) => tooFew) ? ['Hollow: too few shots or days to rest anything on'] : []),
      ...(drawn.length < known.length
        ? [`The ${drawn.length} of ${known.length} classes with the most occupations`]
        : []),
    ],
    `${title}. ${describe(known, component)}`,
    { width: WIDTH_PX, height: split.length * ROW_PX, layer: layers(split, component, by) },
  );
}

const barWords = (rows: readonly SplitRow[]): string =>
  rows.some(({ low }) => low !== null)
    ? 'bars: intervals counted by days'
    : 'without intervals, for no class has two days';

const rmsOf = (row: SummaryRow, component: Component): Interval | null =>
  component === 'horizontal' ? row.horizontalRms : row.verticalRms;

function mostOccupied(rows: readonly SummaryRow[]): readonly SummaryRow[] {
  if (rows.length <= MOST_ROWS) return rows;
  const least = [...rows].sort((a, b) => b.occupations - a.occupations).slice(0, MOST_ROWS);
  return rows.filter((row) => least.includes(row));
}

function splitRow(row: SummaryRow, component: Component): SplitRow {
  const { estimate, low, high } = rmsOf(row, component)!;
  const { from, to, group, occupations, days, shareWithoutFix, tooFew } = row;
  const missing = shareWithoutFix === null ? '' : `; ${percentWords(shareWithoutFix)} without a fix`;
  return {
    label: from === null ? group : `${from} to ${to}`,
    rms: estimate,
    low,
    high,
    tooFew,
    text: `${counted(occupations, 'shot')}, ${counted(days, 'day')}${tooFew ? ': too few' : ''}${missing}`,
  };
}

function layers(rows: readonly SplitRow[], component: Component, by: string): View[] {
  const withBar = rows.filter(({ low, high }) => low !== null && high !== null);
  // One class of two days may have a bar without end: it must not flatten the others.
  const most = roundUp(
    Math.max(
      ...rows.map(({ rms }) => 1.4 * rms),
      ...withBar.filter(({ tooFew }) => !tooFew).map(({ high }) => high!),
      0.1,
    ) * 1.04,
  );
  const y = {
    type: 'nominal',
    field: 'label',
    sort: null,
    scale: { domain: rows.map(({ label }) => label) },
    axis: {
      title: by,
      // lying above the labels, for a standing one may be longer than a few rows are high
      titleAngle: 0,
      titleAlign: 'right',
      titleX: -8,
      titleY: -8,
      ticks: false,
      domain: false,
      labelPadding: 8,
      grid: true,
      gridColor: COLORS.mist,
    },
  };
  const x = {
    type: 'quantitative',
    scale: { domain: [0, most], nice: false },
    axis: { title: `${rmsWords(component)}, mm`, tickCount: 6 },
  };
  const points = (values: readonly SplitRow[], fill: string): View => ({
    data: { values },
    mark: { type: 'point', filled: true, fill, stroke: COLORS.water, strokeWidth: 1.8, size: 60, opacity: 1 },
    encoding: { y, x: { ...x, field: 'rms' } },
  });
  return [
    {
      data: { values: withBar },
      mark: { type: 'rule', clip: true, color: COLORS.water, strokeWidth: 2 },
      encoding: { y, x: { ...x, field: 'low' }, x2: { field: 'high' } },
    },
    points(
      rows.filter(({ tooFew }) => tooFew),
      'white',
    ),
    points(
      rows.filter(({ tooFew }) => !tooFew),
      COLORS.water,
    ),
    {
      data: { values: rows },
      mark: { type: 'text', align: 'left', baseline: 'middle', x: WIDTH_PX + 12, color: QUIET_INK },
      encoding: { y, text: { field: 'text' } },
    },
  ];
}

const nameOf = ({ from, to, group }: SummaryRow): string => (from === null ? group : `${from} to ${to}`);

function extremes(rows: readonly SummaryRow[], component: Component): [SummaryRow, SummaryRow] | null {
  const enough = rows.filter(({ tooFew }) => !tooFew);
  if (enough.length < 2) return null;
  const size = (row: SummaryRow): number => rmsOf(row, component)!.estimate;
  return [
    enough.reduce((a, b) => (size(b) < size(a) ? b : a)),
    enough.reduce((a, b) => (size(b) > size(a) ? b : a)),
  ];
}

function titleOf(rows: readonly SummaryRow[], component: Component, by: string): string {
  const found = extremes(rows, component);
  const head = `${componentTitle(component)} error by ${by.split(',')[0]}`;
  // kept on one line
  const size = (row: SummaryRow): string =>
    `${rmsOf(row, component)!.estimate.toFixed(1)} mm (${nameOf(row)})`.replaceAll(' ', '\u00a0');
  if (rows.length === 1 && !rows[0]!.tooFew) return `${head}: one class only, ${size(rows[0]!)}`;
  if (found === null) return `${head}: too few to compare`;
  const [least, most] = found.map(size);
  return `${head}: ${least} to ${most}`;
}

function describe(rows: readonly SummaryRow[], component: Component): string {
  const total = rows.reduce((sum, { occupations }) => sum + occupations, 0);
  const few = rows.filter(({ tooFew }) => tooFew).length;
  return `The ${rmsWords(component)} in millimetres of ${rows.length} ${rows.length === 1 ? 'class' : 'classes'} with ${counted(total, 'occupation')}${few === 0 ? '' : `, ${few} of them with too few to compare`}.`;
}
