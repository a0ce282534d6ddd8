import { COLORS, FONT_SIZE, themeConfig } from './theme.js';
import { wrapText } from './words.js';

/** A chart as data: what it says, and how to draw it. A plain type, so that every TypeScript understands it. */
export interface ChartSpec {
  /** The finding. */
  readonly title: string;
  readonly subtitle: readonly string[];
  /** Alternative text: the chart in sentences, for those who do not see it. */
  readonly description: string;
  /** A complete Vega-Lite 6 specification with its data. */
  readonly vegaLite: Record<string, unknown>;
}

/** A part of a Vega-Lite view: one layer, or a view to stand beside others. */
export type View = Record<string, unknown>;

/** Characters that fit over a chart of ordinary width in the sizes of the theme. */
const TITLE_CHARACTERS = 66;
const SUBTITLE_CHARACTERS = 100;

/** Puts title, subtitle, theme and background around a view. */
export function chartSpec(
  title: string,
  subtitle: readonly string[],
  description: string,
  view: View,
): ChartSpec {
  return {
    title,
    subtitle,
    description,
    vegaLite: {
      $schema: 'https://vega.github.io/schema/vega-lite/v6.json',
      description,
      background: 'white',
      padding: 12,
      title: {
        text: wrapText(title, TITLE_CHARACTERS),
        subtitle: subtitle.flatMap((line) => wrapText(line, SUBTITLE_CHARACTERS)),
      },
      config: themeConfig(),
      ...view,
    },
  };
}

/** A text to be written at a place of the plot, in the units of its axes. */
export interface PlacedText {
  readonly x: number;
  readonly y: number;
  /** Several lines stand below each other, centred on the place. */
  readonly text: readonly string[];
  readonly color?: string;
}

/** Line height of labels, px. */
export const LABEL_LINE_PX = 15;

/**
 * Two layers: a white outline and the texts on it, so that labels can be read over points and lines.
 * @param position `x` and `y` channels without fields
 */
export function textLayers(
  texts: readonly PlacedText[],
  position: { readonly x: View; readonly y: View },
  mark: View = {},
): View[] {
  const encoding = {
    x: { ...position.x, field: 'x', type: 'quantitative' },
    y: { ...position.y, field: 'y', type: 'quantitative' },
    text: { field: 'text' },
  };
  const values = texts.map(({ x, y, text, color = COLORS.ink }) => ({
    x,
    // vega hangs further lines below the first one; centring them needs the offset of the first
    offset: (-(text.length - 1) * LABEL_LINE_PX) / 2,
    y,
    text: text.length === 1 ? text[0] : [...text],
    color,
  }));
  const base = {
    type: 'text',
    align: 'left',
    baseline: 'middle',
    fontSize: FONT_SIZE.small,
    lineHeight: LABEL_LINE_PX,
    dy: { expr: 'datum.offset' },
    ...mark,
  };
  return [
    { data: { values }, mark: { ...base, color: 'white', stroke: 'white', strokeWidth: 4 }, encoding },
    {
      data: { values },
      mark: base,
      encoding: { ...encoding, fill: { field: 'color', type: 'nominal', scale: null } },
    },
  ];
}
