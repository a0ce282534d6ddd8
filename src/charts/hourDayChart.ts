import type { HourDayCell } from '../days/index.js';
import type { Component } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { calendarDays, dayChannel, dayWords } from './dayAxis.js';
import { AMOUNT_STEPS, COLORS, FONT_SIZE } from './theme.js';
import { componentTitle, counted } from './words.js';

/** What {@link hourDayChart} draws. */
export interface HourDayInput {
  readonly component: Component;
  /** From `hourDayRatios`. */
  readonly cells: readonly HourDayCell[];
}

const WIDTH_PX = 640;
const ROW_PX = 26;
/** Cells of fewer shots are drawn small: one wrong shot colours them. */
const FEWEST = 3;
/** Steps of the ratio; a colour for below, one for each between, one for beyond. */
const STEPS = [0.75, 1.25, 1.75, 2.5];
const STEP_WORDS = ['below 0.75', '0.75 to 1.25', '1.25 to 1.75', '1.75 to 2.5', 'above 2.5'];

/**
 * Errors by day and solar hour against what the model gives at the same length, in one hue.
 * @throws InputError when there is no cell
 */
export function hourDayChart({ component, cells }: HourDayInput): ChartSpec {
  if (cells.length === 0) {
    throw inputError(
      'bad-option',
      'Expected errors by hour and day, came none. Hand in errors with a time of day.',
    );
  }
  const title = titleOf(component, cells);
  const days = calendarDays(cells.map(({ day }) => day));
  const [first, last] = [
    Math.min(...cells.map(({ fromHour }) => fromHour)),
    Math.max(...cells.map(({ toHour }) => toHour)),
  ];
  const hoursHigh = cells[0]!.toHour - cells[0]!.fromHour;
  return chartSpec(
    title,
    [
      'Root-mean-square of error over the model’s spread at the same length; 1: as the model says',
      `Full cells hold ${FEWEST} occupations or more, small squares fewer; blank: no work`,
    ],
    `${title}. Heat map of ${counted(cells.length, 'cell')}: days from ${dayWords(days[0]!)} to ${dayWords(days.at(-1)!)} across, solar hours ${first} to ${last} upward, darker for larger errors against the model.`,
    {
      width: WIDTH_PX,
      height: ((last - first) / hoursHigh) * ROW_PX,
      layer: layers(cells, days, [first, last]),
    },
  );
}

function layers(cells: readonly HourDayCell[], days: readonly string[], domain: readonly number[]): View[] {
  const rows = cells.map((cell) => ({
    ...cell,
    middle: (cell.fromHour + cell.toHour) / 2,
    step: STEP_WORDS[STEPS.filter((edge) => cell.ratio >= edge).length]!,
  }));
  const x = { ...dayChannel(days, true), field: 'day' };
  const y = {
    type: 'quantitative',
    scale: { domain, nice: false, zero: false },
    axis: { title: 'local mean solar time, h', tickMinStep: 1 },
  };
  const color = {
    field: 'step',
    type: 'ordinal',
    scale: { domain: STEP_WORDS, range: AMOUNT_STEPS },
    legend: {
      title: 'error over model',
      labelColor: COLORS.ink,
      titleColor: COLORS.ink,
      titleFontWeight: 'normal',
      labelFontSize: FONT_SIZE.small,
      titleFontSize: FONT_SIZE.small,
      symbolType: 'square',
      symbolSize: 200,
      symbolStrokeWidth: 0,
      symbolOpacity: 1,
    },
  };
  return [
    {
      data: { values: rows.filter(({ occupations }) => occupations >= FEWEST) },
      mark: { type: 'rect', stroke: 'white', strokeWidth: 1 },
      encoding: { x, y: { ...y, field: 'fromHour' }, y2: { field: 'toHour' }, color },
    },
    {
      data: { values: rows.filter(({ occupations }) => occupations < FEWEST) },
      mark: { type: 'square', size: 36, opacity: 1 },
      encoding: { x, y: { ...y, field: 'middle' }, color },
    },
  ];
}

function titleOf(component: Component, cells: readonly HourDayCell[]): string {
  const full = cells.filter(({ occupations }) => occupations >= FEWEST);
  const name = `${componentTitle(component)} errors by hour and day`;
  if (full.length === 0) return `${name}: too few in every cell`;
  const { ratio, day, fromHour, toHour } = full.reduce((a, b) => (b.ratio > a.ratio ? b : a));
  return `${name}: up to ${ratio.toFixed(1)} times the model, on ${dayWords(day).replace(' ', '\u00a0')} from ${fromHour} to ${toHour} h`;
}
