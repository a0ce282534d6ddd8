import type { View } from './chartSpec.js';
import { type MapFrame, type PlanPoint, planPoint, toPx } from './mapFrame.js';
import type { LabelPlace } from './placement.js';
import { FONT_SIZE, roughTextWidthPx } from './theme.js';

/** Round radii, km, of about four circles up to the corner that is farthest from the base. */
export function ringRadiiKm(frame: MapFrame): number[] {
  const { x, y } = toPx(frame, { eastKm: 0, northKm: 0 });
  const reachPx = Math.max(x, frame.widthPx - x, y, frame.heightPx - y);
  const step = roundStep(reachPx / frame.pxPerKm / 3);
  const count = Math.floor(reachPx / frame.pxPerKm / step + 1e-9);
  return Array.from({ length: count }, (_, k) => Number(((k + 1) * step).toPrecision(6)));
}

/** The largest of 1, 2, 5 times a power of ten that is not above a positive value. */
export function roundStep(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9);
  const lead = value / power + 1e-9;
  return Number(((lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power).toPrecision(6));
}

/** Circles around the base as lines of many points. */
export function ringLayer(
  radiiKm: readonly number[],
  channels: { readonly x: View; readonly y: View },
  mark: View,
): View {
  const values = radiiKm.flatMap((ringKm) =>
    Array.from({ length: 121 }, (_, k) => ({ ringKm, order: k, ...planPoint(ringKm, 3 * k) })),
  );
  return {
    data: { values },
    mark: { type: 'line', clip: true, strokeWidth: 1.2, ...mark },
    encoding: {
      x: { ...channels.x, field: 'eastKm' },
      y: { ...channels.y, field: 'northKm' },
      detail: { field: 'ringKm', type: 'nominal' },
      order: { field: 'order', type: 'quantitative' },
    },
  };
}

/** Places on a circle where its length could be written: every 5°, first north-east. */
export function ringLabelPlaces(radiusKm: number, text: string, frame: MapFrame): LabelPlace<PlanPoint>[] {
  const half = roughTextWidthPx(text, FONT_SIZE.small) / 2 + 4;
  return Array.from({ length: 72 }, (_, k) => planPoint(radiusKm, 45 + 5 * k)).map((place, k) => {
    const { x, y } = toPx(frame, place);
    return { box: { left: x - half, right: x + half, top: y - 8, bottom: y + 8 }, wish: k, place };
  });
}
