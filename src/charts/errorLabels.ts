import { LABEL_LINE_PX, type PlacedText, textLayers, type View } from './chartSpec.js';
import { type ErrorFrame, kmAtPx, mmAtPx, pxOfMm } from './errorFrame.js';
import type { ErrorLine } from './errorLines.js';
import { spreadLabels } from './placement.js';
import { COLORS, OCHRE_TEXT } from './theme.js';

/** Words at a height of the right edge. */
export interface EndLabel {
  readonly errorMm: number;
  readonly text: readonly string[];
  readonly color: string;
  readonly bold: boolean;
}

/** What is written at the end of a curve; a curve that leaves the chart is named at the top. */
export function endLabel(line: ErrorLine): EndLabel {
  const color = line.color === COLORS.ochre ? OCHRE_TEXT : line.color;
  return { errorMm: line.points.at(-1)!.errorMm, text: line.label, color, bold: line.bold };
}

/** Gap between plot and labels, bridged by leaders. */
const LEADER_PX = { from: 3, to: 17, text: 21 };
/** Free space above and below a label. */
const BREATH_PX = 5;

/** Direct labels right of the plot, moved apart where curves end close together, each with a leader to its line. */
export function endLabelLayers(
  labels: readonly EndLabel[],
  frame: ErrorFrame,
  channels: { readonly x: View; readonly y: View },
): View[] {
  const ends = labels.map(({ errorMm }) => Math.max(0, pxOfMm(frame, errorMm)));
  const centres = spreadLabels(
    ends,
    labels.map(({ text }) => text.length * LABEL_LINE_PX + BREATH_PX),
  );
  const leaders = labels.flatMap(({ color }, i) => [
    { label: i, color, x: kmAtPx(frame, frame.widthPx + LEADER_PX.from), y: mmAtPx(frame, ends[i]!) },
    { label: i, color, x: kmAtPx(frame, frame.widthPx + LEADER_PX.to), y: mmAtPx(frame, centres[i]!) },
  ]);
  const texts = (bold: boolean): PlacedText[] =>
    labels.flatMap((label, i) =>
      label.bold === bold
        ? [
            {
              x: kmAtPx(frame, frame.widthPx + LEADER_PX.text),
              y: mmAtPx(frame, centres[i]!),
              text: label.text,
              color: label.color,
            },
          ]
        : [],
    );
  return [
    {
      data: { values: leaders },
      mark: { type: 'line', strokeWidth: 1, opacity: 0.8 },
      encoding: {
        x: { ...channels.x, field: 'x' },
        y: { ...channels.y, field: 'y' },
        detail: { field: 'label', type: 'nominal' },
        // not `color`, whose scale may be that of the counts
        stroke: { field: 'color', type: 'nominal', scale: null },
      },
    },
    ...textLayers(texts(false), channels),
    ...textLayers(texts(true), channels, { fontWeight: 'bold' }),
  ];
}
