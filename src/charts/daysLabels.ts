import { LABEL_LINE_PX, type View } from './chartSpec.js';
import { COLORS, FONT_SIZE, roughTextWidthPx } from './theme.js';

/** Words that belong to a day. */
export interface DayLabel {
  readonly day: string;
  readonly word: string;
  /** Upper end of what is drawn of the day, in the units of the axis. */
  readonly high: number;
}

/** A label with its place: lines of text counted from the top of the panel. */
export interface PlacedLabel extends DayLabel {
  readonly line: number;
  readonly align: 'left' | 'right';
}

/**
 * Words at the top of a panel, like flags: in the left half they begin at the line that goes down to their day, in the
 * right half they end at it. Of flags in each other's way the outer one hangs higher, so that no line runs through words.
 * @param days of the whole axis
 */
export function placedLabels(
  labels: readonly DayLabel[],
  days: readonly string[],
  widthPx: number,
): PlacedLabel[] {
  const at = ({ day }: DayLabel): number => ((days.indexOf(day) + 0.5) / days.length) * widthPx;
  const outer = (label: DayLabel): number => Math.min(at(label), widthPx - at(label));
  const taken: { line: number; from: number; to: number }[] = [];
  return [...labels]
    .sort((a, b) => outer(a) - outer(b))
    .map((label) => {
      const wordPx = roughTextWidthPx(label.word, FONT_SIZE.small, true) + 8;
      const align = at(label) > widthPx / 2 ? 'right' : 'left';
      const [from, to] = align === 'left' ? [at(label), at(label) + wordPx] : [at(label) - wordPx, at(label)];
      const inTheWay = taken.filter((one) => one.from < to && one.to > from);
      const line = inTheWay.reduce((most, one) => Math.max(most, one.line + 1), 0);
      taken.push({ line, from, to });
      return { ...label, line, align };
    });
}

/** The words on a white outline, so that they can be read over bands, and the line from each to its day. */
export function flagLayers(labels: readonly PlacedLabel[], x: View, y: View): View[] {
  return labels.flatMap(({ day, word, high, line, align }) => {
    const data = { values: [{ day, word, high }] };
    const top = 3 + line * LABEL_LINE_PX;
    const mark = {
      type: 'text',
      align,
      baseline: 'top',
      y: top,
      dx: align === 'left' ? 5 : -5,
      fontSize: FONT_SIZE.small,
      fontWeight: 'bold',
    };
    const encoding = { x: { ...x, field: 'day' }, text: { field: 'word' } };
    return [
      {
        data,
        mark: { type: 'rule', color: COLORS.ink, strokeWidth: 1.2 },
        encoding: { x: { ...x, field: 'day' }, y: { ...y, field: 'high' }, y2: { value: top } },
      },
      { data, mark: { ...mark, color: 'white', stroke: 'white', strokeWidth: 4 }, encoding },
      { data, mark: { ...mark, color: COLORS.ink }, encoding },
    ];
  });
}
