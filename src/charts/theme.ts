/** Colours of every chart: our own, told apart by the colour-blind and in grey print. */
export const COLORS = {
  ink: '#22303c',
  water: '#2b6c8f',
  ochre: '#b9812b',
  brick: '#9c4a33',
  moss: '#5c7a4f',
  mist: '#dfe6ea',
} as const;

/** Amounts: one hue of water, light to middling, so that curves in full water still stand out on it. */
export const AMOUNT_RAMP: readonly string[] = ['#e4eef3', '#bcd4e0', '#8fb6c9', '#6296b0'];

/** The same hue in five steps for cells on white, the last one dark. */
export const AMOUNT_STEPS: readonly string[] = ['#e4eef3', '#bcd4e0', '#8fb6c9', '#4f88a6', '#1d4f6b'];

/** The fallbacks have nearly the widths of the first font, for readers who do not have it. */
const FONT = 'DejaVu Sans, Verdana, sans-serif';

/** Font sizes in pixels; a chart of 800 pixels printed 165 mm wide shows 12 px as 7 pt. */
export const FONT_SIZE = { title: 18, text: 13, small: 12 } as const;

/** Quiet text: ink lightened, still dark enough to read. */
export const QUIET_INK = '#55636f';

/** Ochre for text: thin letters in the ochre of lines are hard to read on white. */
export const OCHRE_TEXT = '#8f621b';

/** The Vega-Lite configuration that all charts share. */
export function themeConfig(): Record<string, unknown> {
  return {
    font: FONT,
    aria: false,
    view: { stroke: null },
    title: {
      anchor: 'start',
      color: COLORS.ink,
      fontSize: FONT_SIZE.title,
      fontWeight: 'bold',
      subtitleColor: QUIET_INK,
      subtitleFontSize: FONT_SIZE.text,
      subtitleLineHeight: 18,
      lineHeight: 23,
      subtitlePadding: 6,
      offset: 16,
      limit: 0,
    },
    axis: {
      labelColor: COLORS.ink,
      labelFontSize: FONT_SIZE.small,
      labelFlush: false,
      labelLimit: 0,
      labelPadding: 5,
      titleColor: COLORS.ink,
      titleFontSize: FONT_SIZE.text,
      titleFontWeight: 'normal',
      titleLimit: 0,
      titlePadding: 10,
      domainColor: COLORS.ink,
      tickColor: COLORS.ink,
      tickSize: 4,
      grid: false,
    },
    text: { color: COLORS.ink, fontSize: FONT_SIZE.small },
  };
}

/**
 * Rough width of a text in pixels, where labels are placed before any font is at hand: 0.6 em a character, 0.68 in
 * bold, a little wide of most words.
 */
export function roughTextWidthPx(text: string, fontSizePx: number, bold = false): number {
  return [...text].length * fontSizePx * (bold ? 0.68 : 0.6);
}
