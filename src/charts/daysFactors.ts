import { type DailyFactor, type DayExplanation, DEGRADED_FACTOR } from '../days/index.js';
import type { Component } from '../fit/index.js';
import { LABEL_LINE_PX, type View } from './chartSpec.js';
import { COLORS, FONT_SIZE, QUIET_INK, roughTextWidthPx } from './theme.js';

/** What a degraded day is put down to. */
export type DayCause = Pick<DayExplanation, 'component' | 'day' | 'verdict' | 'subject'>;

export const DAYS_WIDTH_PX = 640;
const HEIGHT_PX = 190;
const TICKS = [0.1, 0.2, 0.3, 0.5, 0.7, 1, 1.5, 2, 3, 5, 10];

/** Days that any component calls degraded, as columns behind a panel, so that one follows them down to the bars. */
export const degradedColumns = (degraded: readonly string[], x: View): View => ({
  data: { values: degraded.map((day) => ({ day })) },
  mark: { type: 'rect', color: COLORS.mist, opacity: 0.75 },
  encoding: { x: { ...x, field: 'day' } },
});

/** Daily factors of one component with their bands; degraded days by shape and word. */
export function factorPanel(
  component: Component,
  factors: readonly DailyFactor[],
  verdicts: readonly DayCause[],
  x: View,
  degraded: readonly string[],
): View {
  const rows = factors.map(({ day, factor, low, high, degraded: isDegraded }) => ({
    day,
    factor,
    low,
    high,
    word: isDegraded === true ? wordsOf(day, verdicts) : '',
  }));
  const [ordinary, bad] = [rows.filter(({ word }) => word === ''), rows.filter(({ word }) => word !== '')];
  const { domain } = x.scale as { readonly domain: readonly string[] };
  const labels = placedLabels(runLabels(bad, rows), domain);
  const [least, most] = factorRange(rows, labels);
  const y = {
    type: 'quantitative',
    scale: { type: 'log', domain: [least, most], nice: false },
    axis: {
      title: `${component} daily factor`,
      values: TICKS.filter((tick) => tick >= least && tick <= most),
      format: '~g',
    },
  };
  const encoding = { x: { ...x, field: 'day' }, y: { ...y, field: 'factor' } };
  const level = (value: number, mark: View): View => ({
    data: { values: [{ factor: value }] },
    mark: { type: 'rule', color: QUIET_INK, ...mark },
    encoding: { y: { ...y, field: 'factor' } },
  });
  return {
    width: DAYS_WIDTH_PX,
    height: HEIGHT_PX,
    layer: [
      degradedColumns(degraded, x),
      level(1, { strokeWidth: 1.2 }),
      level(DEGRADED_FACTOR, { strokeWidth: 1.2, strokeDash: [5, 4] }),
      {
        data: { values: rows },
        mark: { type: 'rule', color: COLORS.water, strokeWidth: 3, opacity: 0.45 },
        encoding: { x: { ...x, field: 'day' }, y: { ...y, field: 'low' }, y2: { field: 'high' } },
      },
      {
        data: { values: ordinary },
        mark: { type: 'circle', color: COLORS.water, size: 40, opacity: 1 },
        encoding,
      },
      {
        data: { values: bad },
        mark: { type: 'point', shape: 'diamond', filled: true, color: COLORS.ink, size: 130, opacity: 1 },
        encoding,
      },
      ...labelLayers(labels, x),
    ],
  };
}

/** Ends of the logarithmic axis, with room above the bands for the lines of words. */
function factorRange(
  rows: readonly { readonly low: number; readonly high: number }[],
  labels: readonly PlacedLabel[],
): [number, number] {
  const least = Math.min(...rows.map(({ low }) => low), 0.5) / 1.1;
  const highest = Math.max(...rows.map(({ high }) => high), 2) * 1.1;
  const lines = labels.reduce((most, { line }) => Math.max(most, line + 1), 0);
  const used = Math.max(0.4, 1 - (lines * LABEL_LINE_PX) / HEIGHT_PX);
  return [least, least * (highest / least) ** (1 / used)];
}

interface LabelRow {
  readonly day: string;
  readonly word: string;
}

const wordsOf = (day: string, verdicts: readonly DayCause[]): string => {
  const found = verdicts.find((one) => one.day === day);
  if (found === undefined) return 'degraded';
  const { verdict, subject } = found;
  return subject === null || verdict === 'grows with distance' ? verdict : `${verdict} ${subject}`;
};

/** One label for degraded days that follow each other: what they are put down to. */
function runLabels(bad: readonly LabelRow[], all: readonly { readonly day: string }[]): LabelRow[] {
  const place = new Map(all.map(({ day }, k) => [day, k]));
  const runs: LabelRow[][] = [];
  for (const row of bad) {
    const before = runs.at(-1)?.at(-1);
    if (before !== undefined && place.get(row.day)! - place.get(before.day)! === 1) runs.at(-1)!.push(row);
    else runs.push([row]);
  }
  return runs.map((run) => {
    return { day: run[0]!.day, word: [...new Set(run.map(({ word }) => word))].join(', ') };
  });
}

/** A label with its place: lines of text counted from the top of the panel. */
interface PlacedLabel extends LabelRow {
  readonly line: number;
  readonly align: 'left' | 'right';
}

/** Words at the top of the panel beside their day; in the right half they end at it. Each takes the first free line. */
function placedLabels(rows: readonly LabelRow[], days: readonly string[]): PlacedLabel[] {
  const taken: { line: number; from: number; to: number }[] = [];
  return rows.map((row) => {
    const at = ((days.indexOf(row.day) + 0.5) / days.length) * DAYS_WIDTH_PX;
    const widthPx = roughTextWidthPx(row.word, FONT_SIZE.small, true) + 8;
    const align = at > DAYS_WIDTH_PX / 2 ? 'right' : 'left';
    const [from, to] = align === 'left' ? [at - 6, at + widthPx] : [at - widthPx, at + 6];
    let line = 0;
    while (taken.some((one) => one.line === line && one.from < to && one.to > from)) line += 1;
    taken.push({ line, from, to });
    return { ...row, line, align };
  });
}

/** On a white outline, so that they can be read over bands. */
function labelLayers(labels: readonly PlacedLabel[], x: View): View[] {
  return labels.flatMap(({ day, word, line, align }) => {
    const data = { values: [{ day, word }] };
    const mark = {
      type: 'text',
      align,
      baseline: 'top',
      y: 3 + line * LABEL_LINE_PX,
      dx: align === 'left' ? -5 : 5,
      fontSize: FONT_SIZE.small,
      fontWeight: 'bold',
    };
    const encoding = { x: { ...x, field: 'day' }, text: { field: 'word' } };
    return [
      { data, mark: { ...mark, color: 'white', stroke: 'white', strokeWidth: 4 }, encoding },
      { data, mark: { ...mark, color: COLORS.ink }, encoding },
    ];
  });
}
