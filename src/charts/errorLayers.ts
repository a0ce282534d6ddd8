import type { SummaryRow } from '../split/index.js';
import { countGrid } from '../split/index.js';
import type { View } from './chartSpec.js';
import type { ErrorFrame } from './errorFrame.js';
import type { BandPoint, ErrorLine } from './errorLines.js';
import type { ErrorPoint } from './errorPoints.js';
import { AMOUNT_RAMP, COLORS } from './theme.js';

interface Channels {
  readonly x: View;
  readonly y: View;
}

const at = (channels: Channels, x: string, y: string): { x: View; y: View } => ({
  x: { ...channels.x, field: x },
  y: { ...channels.y, field: y },
});

/** Occupations as light points. */
export function pointLayer(points: readonly ErrorPoint[], channels: Channels): View {
  return {
    data: { values: points },
    mark: { type: 'circle', size: 16, color: COLORS.ink, opacity: 0.22 },
    encoding: at(channels, 'baselineKm', 'errorMm'),
  };
}

/** Cells of the heat: about 10 px wide and 8 px high. */
const HEAT = { columns: 62, rows: 48 };

/** Many occupations as counts in cells, one hue of water; the number of the fullest cell goes to the key. */
export function heatLayer(
  points: readonly ErrorPoint[],
  frame: ErrorFrame,
  channels: Channels,
): { readonly layer: View; readonly fullest: number } {
  const { cells } = countGrid(
    points.map(({ baselineKm }) => baselineKm),
    points.map(({ errorMm }) => errorMm),
    { xMax: frame.maxKm, yMax: frame.maxMm, ...HEAT },
  );
  const fullest = cells.reduce((most, { count }) => Math.max(most, count), 1);
  const layer = {
    data: { values: cells },
    mark: { type: 'rect' },
    encoding: {
      ...at(channels, 'xFrom', 'yFrom'),
      x2: { field: 'xTo' },
      y2: { field: 'yTo' },
      color: { field: 'count', ...amountChannel(fullest) },
    },
  };
  return { layer, fullest };
}

/** Colour of a count: square roots, since a few cells near the base hold most occupations. */
export const amountChannel = (fullest: number): View => ({
  type: 'quantitative',
  scale: { type: 'sqrt', domain: [1, Math.max(2, fullest)], range: AMOUNT_RAMP },
  legend: null,
});

/** The band of the fitted curve. */
export function bandLayer(band: readonly BandPoint[], channels: Channels): View {
  return {
    data: { values: band },
    mark: { type: 'area', clip: true, color: COLORS.water, opacity: 0.2 },
    encoding: { ...at(channels, 'baselineKm', 'lowMm'), y2: { field: 'highMm' } },
  };
}

/** A curve on a white casing, which keeps it apart from what lies under it. */
export function lineLayers(line: ErrorLine, channels: Channels): View[] {
  const data = { values: line.points };
  const encoding = at(channels, 'baselineKm', 'errorMm');
  const mark = { type: 'line', clip: true, strokeWidth: line.widthPx, color: line.color };
  return [
    { data, mark: { ...mark, color: 'white', strokeWidth: line.widthPx + 2, opacity: 0.7 }, encoding },
    { data, mark: line.dash.length === 0 ? mark : { ...mark, strokeDash: line.dash }, encoding },
  ];
}

/** The measured value of one length class, mm. */
export interface MeasuredClass {
  readonly group: string;
  readonly baselineKm: number;
  readonly rmsMm: number;
  readonly lowMm: number | null;
  readonly highMm: number | null;
  readonly tooFew: boolean;
}

/** The RMS of each class in the component shown; classes without one are left out. */
export function measuredClasses(
  bins: readonly SummaryRow[],
  component: 'horizontal' | 'vertical',
): MeasuredClass[] {
  return bins.flatMap((row) => {
    const rms = component === 'horizontal' ? row.horizontalRms : row.verticalRms;
    if (rms === null) return [];
    const { group, baselineKm, tooFew } = row;
    return [{ group, baselineKm, rmsMm: rms.estimate, lowMm: rms.low, highMm: rms.high, tooFew }];
  });
}

/** Points along the bar of a class, which words should keep clear of. */
export function barPoints({ baselineKm, lowMm, highMm }: MeasuredClass): ErrorPoint[] {
  if (lowMm === null || highMm === null) return [];
  return Array.from({ length: 25 }, (_, k) => ({ baselineKm, errorMm: lowMm + ((highMm - lowMm) * k) / 24 }));
}

/** Measured values by class: points with bars, hollow where the class holds too little. */
export function classLayers(classes: readonly MeasuredClass[], channels: Channels): View[] {
  const withBar = classes.filter(({ lowMm, highMm }) => lowMm !== null && highMm !== null);
  const points = (values: readonly MeasuredClass[], fill: string): View => ({
    data: { values },
    mark: {
      type: 'point',
      clip: true,
      size: 58,
      filled: true,
      fill,
      stroke: COLORS.ink,
      strokeWidth: 1.6,
      opacity: 1,
    },
    encoding: at(channels, 'baselineKm', 'rmsMm'),
  });
  return [
    {
      data: { values: withBar },
      mark: { type: 'rule', clip: true, color: COLORS.ink, strokeWidth: 1.6 },
      encoding: { ...at(channels, 'baselineKm', 'lowMm'), y2: { field: 'highMm' } },
    },
    points(
      classes.filter(({ tooFew }) => tooFew),
      'white',
    ),
    points(
      classes.filter(({ tooFew }) => !tooFew),
      COLORS.ink,
    ),
  ];
}
