import { textLayers, type View } from './chartSpec.js';
import { type ErrorFrame, kmAtPx, mmAtPx } from './errorFrame.js';
import { amountChannel } from './errorLayers.js';
import { COLORS, FONT_SIZE, roughTextWidthPx } from './theme.js';

/** What a row of the key explains. */
export type KeyEntry =
  | { readonly kind: 'point' | 'filled-class' | 'hollow-class'; readonly text: string }
  | { readonly kind: 'amount'; readonly text: string; readonly fullest: number };

interface Channels {
  readonly x: View;
  readonly y: View;
}

/** Below the axis with its title. */
const KEY_TOP_PX = 62;
const GAP_PX = 26;
/** Swatches of the ramp: as many as tell amounts apart. */
const SWATCHES = 5;
const SWATCH_PX = 14;

/** Symbols that no curve's words explain, in a row below the plot. */
export function keyLayers(entries: readonly KeyEntry[], frame: ErrorFrame, channels: Channels): View[] {
  const y = frame.heightPx + KEY_TOP_PX;
  let left = 0;
  return entries.flatMap((entry) => {
    const symbolPx = entry.kind === 'amount' ? SWATCHES * SWATCH_PX : 12;
    const symbol = symbolLayers(entry, left, y, frame, channels);
    const textLeft = left + symbolPx + 7;
    left = textLeft + 0.93 * roughTextWidthPx(entry.text, FONT_SIZE.small) + GAP_PX;
    const place = { x: kmAtPx(frame, textLeft), y: mmAtPx(frame, y), text: [entry.text] };
    return [...symbol, ...textLayers([place], channels)];
  });
}

function symbolLayers(
  entry: KeyEntry,
  left: number,
  y: number,
  frame: ErrorFrame,
  channels: Channels,
): View[] {
  const at = (px: number, py: number): { x: number; y: number } => ({
    x: kmAtPx(frame, px),
    y: mmAtPx(frame, py),
  });
  const encoding = { x: { ...channels.x, field: 'x' }, y: { ...channels.y, field: 'y' } };
  const centre = { values: [at(left + 6, y)] };
  if (entry.kind === 'point') {
    return [{ data: centre, mark: { type: 'circle', size: 20, color: COLORS.ink, opacity: 0.4 }, encoding }];
  }
  if (entry.kind === 'amount') {
    const values = Array.from({ length: SWATCHES }, (_, k) => ({
      ...at(left + k * SWATCH_PX, y - 6),
      x2: kmAtPx(frame, left + (k + 1) * SWATCH_PX),
      y2: mmAtPx(frame, y + 6),
      count: 1 + ((entry.fullest - 1) * k) / (SWATCHES - 1),
    }));
    const color = { field: 'count', ...amountChannel(entry.fullest) };
    return [
      {
        data: { values },
        mark: 'rect',
        encoding: { ...encoding, x2: { field: 'x2' }, y2: { field: 'y2' }, color },
      },
    ];
  }
  const fill = entry.kind === 'hollow-class' ? 'white' : COLORS.ink;
  return [
    {
      data: { values: [{ ...at(left + 6, y - 9), y2: mmAtPx(frame, y + 9) }] },
      mark: { type: 'rule', color: COLORS.ink, strokeWidth: 1.6 },
      encoding: { ...encoding, y2: { field: 'y2' } },
    },
    {
      data: centre,
      mark: { type: 'point', size: 58, filled: true, fill, stroke: COLORS.ink, strokeWidth: 1.6, opacity: 1 },
      encoding,
    },
  ];
}
