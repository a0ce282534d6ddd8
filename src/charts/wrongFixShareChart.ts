import { type WrongFixGrowth, wrongFixShareAtKm } from '../fit/index.js';
import type { FlaggedClass } from '../split/index.js';
import { type ChartSpec, chartSpec, LABEL_LINE_PX, type View } from './chartSpec.js';
import { type Box, overlapArea } from './placement.js';
import { COLORS, FONT_SIZE, QUIET_INK, roughTextWidthPx } from './theme.js';
import { counted, countWords, roundUp } from './words.js';

/** What {@link wrongFixShareChart} draws. */
export interface WrongFixShareInput {
  /** From `wrongFixGrowth`. */
  readonly growth: WrongFixGrowth;
  /** From `flaggedByLength` with the suspected ones: shown beside the curve, never fitted. */
  readonly classes: readonly FlaggedClass[];
  /** Where the data end, km. */
  readonly longestKm: number;
}

const WIDTH_PX = 620;
const HEIGHT_PX = 320;
const STEPS = 80;
/** Classes of fewer occupations show nothing but chance. */
const FEWEST = 20;

/** Share of wrong fixes over baseline length: the growth with its band, and the suspected ones counted by class. */
export function wrongFixShareChart({ growth, classes, longestKm }: WrongFixShareInput): ChartSpec {
  const title = titleOf(growth, longestKm);
  const measured = classes.map(({ baselineKm, occupations, flagged }) => ({
    baselineKm,
    percent: (100 * flagged) / occupations,
    text: `${flagged}/${countWords(occupations)}`,
    tooFew: occupations < FEWEST,
  }));
  return chartSpec(
    title,
    [
      `Fixed with wrong ambiguities: ${countWords(growth.suspected)} suspected of ${counted(growth.occupations, 'occupation')}, in ${counted(growth.events, 'run')}`,
      'Curve with 5 to 95 % band; points: suspected of all in a class of length, hollow below 20',
    ],
    `${title}. The share of wrong fixes in per cent against baseline length up to ${longestKm.toFixed(1)} km: a curve with its band, and what was counted in ${measured.length} classes of length.`,
    { width: WIDTH_PX, height: HEIGHT_PX, layer: layers(growth, measured, longestKm) },
  );
}

interface MeasuredShare {
  readonly baselineKm: number;
  readonly percent: number;
  readonly text: string;
  readonly tooFew: boolean;
}

function layers(growth: WrongFixGrowth, measured: readonly MeasuredShare[], longestKm: number): View[] {
  const curve = Array.from({ length: STEPS }, (_, k) => {
    const { baselineKm, mean, low5, high95 } = wrongFixShareAtKm(growth, (longestKm * (k + 1)) / STEPS);
    return { baselineKm, percent: 100 * mean, low: 100 * low5, high: 100 * high95 };
  });
  const top = [
    ...curve.map(({ high }) => high),
    ...measured.filter(({ tooFew }) => !tooFew).map(({ percent }) => percent),
  ];
  const most = roundUp(Math.max(...top, 0.01) * 1.08);
  const x = {
    type: 'quantitative',
    field: 'baselineKm',
    scale: { domain: [0, longestKm * 1.04], nice: false },
    axis: { title: 'baseline length, km', tickCount: 8 },
  };
  const y = {
    type: 'quantitative',
    scale: { domain: [0, most], nice: false },
    axis: { title: 'wrong fixes, % of occupations', tickCount: 5 },
  };
  const shown = measured.filter(({ percent }) => percent <= most);
  const points = (values: readonly MeasuredShare[], fill: string): View => ({
    data: { values },
    mark: { type: 'point', filled: true, fill, stroke: COLORS.ink, strokeWidth: 1.6, size: 58, opacity: 1 },
    encoding: { x, y: { ...y, field: 'percent' } },
  });
  return [
    {
      data: { values: curve },
      mark: { type: 'area', color: COLORS.water, opacity: 0.2 },
      encoding: { x, y: { ...y, field: 'low' }, y2: { field: 'high' } },
    },
    {
      data: { values: curve },
      mark: { type: 'line', color: COLORS.water, strokeWidth: 3 },
      encoding: { x, y: { ...y, field: 'percent' } },
    },
    ...countLayers(shown, most, longestKm),
    points(
      shown.filter(({ tooFew }) => tooFew),
      'white',
    ),
    points(
      shown.filter(({ tooFew }) => !tooFew),
      COLORS.ink,
    ),
  ];
}

/** Counts above their points, higher where the one before would be written over. */
function countLayers(shown: readonly MeasuredShare[], mostPercent: number, longestKm: number): View[] {
  const placed: Box[] = [];
  return shown.flatMap((one): View[] => {
    const half = roughTextWidthPx(one.text, FONT_SIZE.small) / 2 + 2;
    // beside the axis, not on it
    const middlePx = Math.max(half, (one.baselineKm / (longestKm * 1.04)) * WIDTH_PX);
    let bottomPx = (1 - one.percent / mostPercent) * HEIGHT_PX - 6;
    const box = (): Box => ({
      left: middlePx - half,
      right: middlePx + half,
      top: bottomPx - LABEL_LINE_PX,
      bottom: bottomPx,
    });
    while (placed.some((other) => overlapArea(other, box()) > 0)) bottomPx -= LABEL_LINE_PX;
    placed.push(box());
    const data = { values: [one] };
    const mark = { type: 'text', baseline: 'bottom', x: middlePx, y: bottomPx };
    const encoding = { text: { field: 'text' } };
    return [
      { data, mark: { ...mark, color: 'white', stroke: 'white', strokeWidth: 3 }, encoding },
      { data, mark: { ...mark, color: QUIET_INK }, encoding },
    ];
  });
}

const percent = (share: number): string => `${Number((100 * share).toPrecision(2))} %`;

function titleOf(growth: WrongFixGrowth, longestKm: number): string {
  if (growth.suspected === 0) {
    const { high95 } = wrongFixShareAtKm(growth, longestKm);
    return `No wrong fix is suspected; up to ${percent(high95)} at ${longestKm.toFixed(0)} km cannot be excluded`;
  }
  const near = Math.min(2, longestKm / 2);
  const [first, last] = [near, longestKm].map(
    (km) =>
      `${percent(wrongFixShareAtKm(growth, km).mean)} at ${km < 3 ? Number(km.toFixed(1)) : km.toFixed(0)} km`,
  );
  return `Wrong fixes: ${first}, ${last}`;
}
