import type { MarkMean } from '../split/index.js';
import type { View } from './chartSpec.js';
import { fromPx, type MapFrame, type PlanPoint, planPoint, toPx } from './mapFrame.js';
import { COLORS } from './theme.js';

/** A mark on the plan. */
export interface MapMark extends PlanPoint {
  readonly mark: string;
  readonly occupations: number;
  /** Mean errors, mm; null where not known. */
  readonly east: number | null;
  readonly north: number | null;
  /** Area of its circle, px². */
  readonly sizePx2: number;
  /** False for marks beyond those that a plan can name: they are only dots. */
  readonly named: boolean;
}

/** More names than these cannot be read on a plan. */
export const MOST_NAMED = 60;

/** Marks with their places; circles grow mildly with the number of occupations. */
export function mapMarks(marks: readonly MarkMean[]): MapMark[] {
  const most = marks.reduce((a, { occupations }) => Math.max(a, occupations), 1);
  const sizes = marks.map((mark) => meanHorizontalMm(mark) ?? 0).sort((a, b) => b - a);
  const leastNamedMm = sizes[MOST_NAMED - 1] ?? 0;
  return marks.map(({ mark, baselineKm, azimuthDeg, occupations, east, north }) => ({
    mark,
    ...planPoint(baselineKm, azimuthDeg),
    occupations,
    east,
    north,
    sizePx2: 45 + 95 * Math.sqrt(occupations / most),
    named: marks.length <= MOST_NAMED || (meanHorizontalMm({ east, north }) ?? 0) >= leastNamedMm,
  }));
}

export const radiusPx = ({ sizePx2 }: MapMark): number => Math.sqrt(sizePx2 / Math.PI);

/** Length of the mean horizontal error of a mark, mm; null where it is not known. */
export function meanHorizontalMm(mark: {
  readonly east: number | null;
  readonly north: number | null;
}): number | null {
  return mark.east === null || mark.north === null ? null : Math.hypot(mark.east, mark.north);
}

/** One point of the line that draws an arrow. */
export interface ArrowPoint extends PlanPoint {
  readonly mark: string;
  readonly order: number;
}

const HEAD_PX = 6;

/** Arrow of a mark's mean horizontal error: shaft, then both sides of the head, as one line. */
export function arrowPoints(mark: MapMark, frame: MapFrame, pxPerMm: number): ArrowPoint[] {
  if (mark.east === null || mark.north === null) return [];
  const { x, y } = toPx(frame, mark);
  const [dx, dy] = [mark.east * pxPerMm, -mark.north * pxPerMm];
  // an arrow that ends in its own circle cannot be seen
  if (Math.hypot(dx, dy) < radiusPx(mark) + 1) return [];
  const path = arrowPath(x, y, dx, dy);
  return path.map(([px, py], order) => ({ mark: mark.mark, order, ...fromPx(frame, px, py) }));
}

/** Pixels of an arrow from (x, y) over (dx, dy). */
export function arrowPath(x: number, y: number, dx: number, dy: number): [number, number][] {
  const [tipX, tipY] = [x + dx, y + dy];
  const direction = Math.atan2(dy, dx);
  const headPx = Math.min(HEAD_PX, 0.4 * Math.hypot(dx, dy));
  const barb = (turn: number): [number, number] => [
    tipX - headPx * Math.cos(direction + turn),
    tipY - headPx * Math.sin(direction + turn),
  ];
  return [[x, y], [tipX, tipY], barb(0.45), [tipX, tipY], barb(-0.45)];
}

/** A layer of arrows. */
export function arrowLayer(
  points: readonly ArrowPoint[],
  channels: { readonly x: View; readonly y: View },
): View {
  return {
    data: { values: points },
    mark: { type: 'line', color: COLORS.ink, strokeWidth: 1.7, strokeJoin: 'round', strokeCap: 'round' },
    encoding: {
      x: { ...channels.x, field: 'eastKm' },
      y: { ...channels.y, field: 'northKm' },
      detail: { field: 'mark', type: 'nominal' },
      order: { field: 'order', type: 'quantitative' },
    },
  };
}
