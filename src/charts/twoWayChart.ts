import type { Component } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import type { Group, TwoWayRow } from '../split/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { AMOUNT_RAMP, COLORS, QUIET_INK } from './theme.js';
import { componentTitle, rmsWords } from './words.js';

/** What {@link twoWayChart} draws. */
export interface TwoWayInput {
  /** From `summarizeByTwo`: the first column goes across, the second down. */
  readonly cells: readonly TwoWayRow[];
  readonly component: Component;
  /** What the columns are, as axes are named. */
  readonly first: string;
  readonly second: string;
}

interface CellRow {
  readonly across: string;
  readonly down: string;
  readonly rms: number;
  readonly text: string;
  readonly tooFew: boolean;
}

const CELL_PX = { width: 62, height: 30 };
const MOST_ACROSS = 14;
const MOST_DOWN = 40;

/**
 * RMS by two columns at once: one hue, the number in every cell, in brackets and on white where there is too little.
 * @throws InputError when no cell has an RMS of the component, or there are more classes than can be read
 */
export function twoWayChart({ cells, component, first, second }: TwoWayInput): ChartSpec {
  const rows = cells.flatMap((cell) => cellRow(cell, component));
  if (rows.length === 0) {
    throw inputError(
      'bad-option',
      `Expected cells with a ${rmsWords(component)}, came none. Hand in a summary of errors that have it.`,
    );
  }
  const across = inOrder(cells.map((cell) => cell.first));
  const down = inOrder(cells.map((cell) => cell.second));
  if (across.length > MOST_ACROSS || down.length > MOST_DOWN) {
    throw inputError(
      'bad-option',
      `Expected at most ${MOST_ACROSS} classes across and ${MOST_DOWN} down, came ${across.length} and ${down.length}. Take wider classes or exchange the columns.`,
    );
  }
  const title = titleOf(rows, component, first, second);
  return chartSpec(
    title,
    [
      `${componentTitle(component)} error: ${rmsWords(component)} in mm. In brackets on white: too few shots or days`,
    ],
    `${title}. Table of ${rmsWords(component)} in millimetres, ${across.length} classes of ${first} across and ${down.length} of ${second} down, darker for larger.`,
    {
      width: across.length * CELL_PX.width,
      height: down.length * CELL_PX.height,
      layer: layers(rows, across, down, first, second),
    },
  );
}

const nameOf = ({ from, to, group }: Group): string => (from === null ? group : `${from} to ${to}`);

/** Names in the order of the summary, which is that of their limits. */
function inOrder(groups: readonly Group[]): string[] {
  const known = new Map(groups.map((group) => [group.group, group]));
  const list = [...known.values()];
  if (list.some(({ from }) => from !== null))
    list.sort((a, b) => (a.from ?? Number.MAX_VALUE) - (b.from ?? Number.MAX_VALUE));
  return list.map(nameOf);
}

function cellRow(cell: TwoWayRow, component: Component): CellRow[] {
  const rms = component === 'horizontal' ? cell.horizontalRms : cell.verticalRms;
  if (rms === null) return [];
  const number = rms.estimate.toFixed(rms.estimate < 100 ? 1 : 0);
  return [
    {
      across: nameOf(cell.first),
      down: nameOf(cell.second),
      rms: rms.estimate,
      text: cell.tooFew ? `(${number})` : number,
      tooFew: cell.tooFew,
    },
  ];
}

function layers(
  rows: readonly CellRow[],
  across: readonly string[],
  down: readonly string[],
  first: string,
  second: string,
): View[] {
  const x = {
    type: 'nominal',
    field: 'across',
    sort: null,
    scale: { domain: across, padding: 0.04 },
    axis: {
      title: first,
      labelAngle: 0,
      ticks: false,
      domain: false,
      orient: 'top',
      labelLimit: CELL_PX.width,
    },
  };
  const y = {
    type: 'nominal',
    field: 'down',
    sort: null,
    scale: { domain: down, padding: 0.06 },
    axis: { title: second, ticks: false, domain: false },
  };
  const full = rows.filter(({ tooFew }) => !tooFew);
  const sizes = full.map(({ rms }) => rms);
  const most = sizes.reduce((a, b) => Math.max(a, b), 1);
  const least = sizes.reduce((a, b) => Math.min(a, b), most);
  const color = {
    field: 'rms',
    type: 'quantitative',
    scale: { domain: [least, Math.max(most, least * 1.01)], range: AMOUNT_RAMP },
    legend: null,
  };
  const words = (values: readonly CellRow[], fill: string): View => ({
    data: { values },
    mark: { type: 'text', baseline: 'middle', color: fill },
    encoding: { x, y, text: { field: 'text' } },
  });
  return [
    { data: { values: full }, mark: { type: 'rect' }, encoding: { x, y, color } },
    words(full, COLORS.ink),
    words(
      rows.filter(({ tooFew }) => tooFew),
      QUIET_INK,
    ),
  ];
}

function titleOf(rows: readonly CellRow[], component: Component, first: string, second: string): string {
  const head = `${componentTitle(component)} error by ${[first, second].map((by) => by.split(',')[0]).join(' and ')}`;
  const full = rows.filter(({ tooFew }) => !tooFew);
  if (full.length === 0) return `${head}: too few in every cell`;
  const { rms, across, down } = full.reduce((a, b) => (b.rms > a.rms ? b : a));
  return `${head}: largest ${rms.toFixed(1)}\u00a0mm at ${across}, ${down}`;
}
