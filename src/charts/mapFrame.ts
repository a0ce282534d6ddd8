import type { View } from './chartSpec.js';

/** A place on the plan, km east and north of the base. */
export interface PlanPoint {
  readonly eastKm: number;
  readonly northKm: number;
}

/** A piece of the plan with the same scale east and north. */
export interface MapFrame {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly westKm: number;
  readonly southKm: number;
  readonly pxPerKm: number;
}

/** East and north of a mark from its distance and its direction (degrees from north over east) at the base. */
export function planPoint(baselineKm: number, azimuthDeg: number): PlanPoint {
  const azimuth = (azimuthDeg * Math.PI) / 180;
  return { eastKm: baselineKm * Math.sin(azimuth), northKm: baselineKm * Math.cos(azimuth) };
}

/** Free room around the outermost marks, for their names and arrows. */
const MARGIN_PX = 52;
const LEAST_SIDE_PX = 260;

/** The frame that holds the base and all points, as large as the room allows. */
export function frameAround(
  points: readonly PlanPoint[],
  mostWidthPx: number,
  mostHeightPx: number,
  leastSidePx = LEAST_SIDE_PX,
): MapFrame {
  // Spreading a long list as arguments overflows the stack.
  let [west, south, east, north] = [0, 0, 0, 0];
  for (const { eastKm, northKm } of points) {
    [west, south] = [Math.min(west, eastKm), Math.min(south, northKm)];
    [east, north] = [Math.max(east, eastKm), Math.max(north, northKm)];
  }
  const [wide, high] = [east - west, north - south];
  const pxPerKm = Math.min(
    (mostWidthPx - 2 * MARGIN_PX) / Math.max(wide, 1e-6),
    (mostHeightPx - 2 * MARGIN_PX) / Math.max(high, 1e-6),
  );
  const widthPx = Math.max(leastSidePx, Math.round(wide * pxPerKm + 2 * MARGIN_PX));
  const heightPx = Math.max(leastSidePx, Math.round(high * pxPerKm + 2 * MARGIN_PX));
  return {
    widthPx,
    heightPx,
    westKm: west + wide / 2 - widthPx / 2 / pxPerKm,
    southKm: south + high / 2 - heightPx / 2 / pxPerKm,
    pxPerKm,
  };
}

/** A square frame around the base that holds a circle of the given radius. */
export function frameOfRadius(radiusKm: number, sidePx: number): MapFrame {
  const pxPerKm = (sidePx - MARGIN_PX) / 2 / radiusKm;
  const half = sidePx / 2 / pxPerKm;
  return { widthPx: sidePx, heightPx: sidePx, westKm: -half, southKm: -half, pxPerKm };
}

/** Pixels from the left and from the top of the frame. */
export function toPx(
  frame: MapFrame,
  { eastKm, northKm }: PlanPoint,
): { readonly x: number; readonly y: number } {
  return {
    x: (eastKm - frame.westKm) * frame.pxPerKm,
    y: frame.heightPx - (northKm - frame.southKm) * frame.pxPerKm,
  };
}

/** The place at so many pixels from the left and from the top of the frame. */
export function fromPx(frame: MapFrame, x: number, y: number): PlanPoint {
  return {
    eastKm: frame.westKm + x / frame.pxPerKm,
    northKm: frame.southKm + (frame.heightPx - y) / frame.pxPerKm,
  };
}

/** Channels `x` and `y` of a frame. */
export function mapChannels(frame: MapFrame): { readonly x: View; readonly y: View } {
  const channel = (from: number, sidePx: number, title: string): View => ({
    type: 'quantitative',
    scale: { domain: [from, from + sidePx / frame.pxPerKm], nice: false, zero: false },
    axis: { title, tickCount: Math.max(3, Math.round(sidePx / 90)) },
  });
  return {
    x: channel(frame.westKm, frame.widthPx, 'east of the base, km'),
    y: channel(frame.southKm, frame.heightPx, 'north of the base, km'),
  };
}
