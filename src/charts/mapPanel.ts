import { textLayers, type View } from './chartSpec.js';
import { fromPx, type MapFrame, mapChannels } from './mapFrame.js';
import { BASE_HALF_PX, type MapLabels, mapLabels } from './mapLabels.js';
import { type ArrowPoint, arrowLayer, arrowPath, arrowPoints, type MapMark } from './mapMarks.js';
import { ringLayer, ringRadiiKm } from './mapRings.js';
import { COLORS, QUIET_INK } from './theme.js';

/** One plan of base and marks. */
export interface MapPanel {
  readonly frame: MapFrame;
  readonly baseName: string;
  readonly marks: readonly MapMark[];
  /** Marks within this radius have no names and arrows here: another panel enlarges them; null for none. */
  readonly enlargedKm: number | null;
  readonly pxPerMm: number;
  /** Length of the arrow in the key below this panel, mm; null for no key. */
  readonly keyMm: number | null;
  readonly title: string | null;
}

const distanceKm = ({ eastKm, northKm }: MapMark): number => Math.hypot(eastKm, northKm);

/** Which marks of a panel are named and which are only dots, and where the words stand. */
export function panelLabels({ frame, baseName, marks, enlargedKm, pxPerMm }: MapPanel): {
  readonly full: readonly MapMark[];
  readonly small: readonly MapMark[];
  readonly labels: MapLabels;
} {
  const isFull = (mark: MapMark): boolean =>
    mark.named && (enlargedKm === null || distanceKm(mark) > enlargedKm);
  const full = marks.filter(isFull);
  const small = marks.filter((mark) => !isFull(mark));
  return { full, small, labels: mapLabels(frame, baseName, full, small, pxPerMm) };
}

/** Draws a panel: rings, arrows, marks, base, names. */
export function mapPanelView(panel: MapPanel): View {
  const { frame, enlargedKm, pxPerMm } = panel;
  const channels = mapChannels(frame);
  const { full, small, labels } = panelLabels(panel);
  const layer = [
    ringLayer(ringRadiiKm(frame), channels, { color: COLORS.mist, strokeWidth: 1.6 }),
    ...(enlargedKm === null
      ? []
      : [ringLayer([enlargedKm], channels, { color: QUIET_INK, strokeDash: [4, 4] })]),
    ...labelLayers(labels, channels),
    arrowLayer(
      full.flatMap((mark) => arrowPoints(mark, frame, pxPerMm)),
      channels,
    ),
    circleLayer(
      small.map((mark) => ({ ...mark, sizePx2: 16 })),
      channels,
    ),
    circleLayer(full, channels),
    {
      data: { values: [{ base: panel.baseName, eastKm: 0, northKm: 0 }] },
      mark: {
        type: 'point',
        shape: 'square',
        filled: true,
        color: COLORS.ink,
        size: (2 * BASE_HALF_PX) ** 2,
        opacity: 1,
      },
      encoding: { x: { ...channels.x, field: 'eastKm' }, y: { ...channels.y, field: 'northKm' } },
    },
    ...(panel.keyMm === null ? [] : arrowKey(panel.keyMm, panel, channels)),
  ];
  return {
    width: frame.widthPx,
    height: frame.heightPx,
    view: { stroke: COLORS.mist, strokeWidth: 1.6 },
    ...(panel.title === null
      ? {}
      : {
          title: {
            text: panel.title,
            fontSize: 13,
            fontWeight: 'normal',
            offset: 8,
            anchor: 'start',
            frame: 'group',
          },
        }),
    layer,
  };
}

function circleLayer(values: readonly MapMark[], channels: { readonly x: View; readonly y: View }): View {
  return {
    data: { values },
    mark: { type: 'circle', color: COLORS.water, opacity: 1, stroke: 'white', strokeWidth: 1 },
    encoding: {
      x: { ...channels.x, field: 'eastKm' },
      y: { ...channels.y, field: 'northKm' },
      size: { field: 'sizePx2', type: 'quantitative', scale: null, legend: null },
    },
  };
}

/** Names and lengths, with leaders to names that stand apart. */
function labelLayers(labels: MapLabels, channels: { readonly x: View; readonly y: View }): View[] {
  const centred = { align: 'center' };
  const values = labels.leaders.flatMap(({ mark, ends }) =>
    ends.map(({ eastKm, northKm }) => ({ mark, eastKm, northKm })),
  );
  return [
    ...textLayers(labels.rings, channels, centred),
    {
      data: { values },
      mark: { type: 'line', color: QUIET_INK, strokeWidth: 0.8 },
      encoding: {
        x: { ...channels.x, field: 'eastKm' },
        y: { ...channels.y, field: 'northKm' },
        detail: { field: 'mark', type: 'nominal' },
      },
    },
    ...textLayers(labels.marks, channels, centred),
    ...textLayers(labels.base, channels, { ...centred, fontWeight: 'bold' }),
  ];
}

/** Below the axis and its title. */
const KEY_TOP_PX = 62;

/** An arrow of known length with its words, below the panel. */
function arrowKey(
  keyMm: number,
  { frame, pxPerMm }: MapPanel,
  channels: { readonly x: View; readonly y: View },
): View[] {
  const y = frame.heightPx + KEY_TOP_PX;
  const lengthPx = keyMm * pxPerMm;
  const path = arrowPath(0, y, lengthPx, 0).map(
    ([px, py], order): ArrowPoint => ({ mark: '', order, ...fromPx(frame, px, py) }),
  );
  const place = fromPx(frame, lengthPx + 9, y);
  const text = [`${keyMm} mm of mean horizontal error, measured minus known`];
  return [arrowLayer(path, channels), ...textLayers([{ x: place.eastKm, y: place.northKm, text }], channels)];
}
