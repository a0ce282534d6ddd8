import type { Rule, Tolerance } from '../rule/index.js';
import { textLayers, type View } from './chartSpec.js';
import { type ErrorFrame, kmAtPx, mmAtPx, pxOfKm, pxOfMm } from './errorFrame.js';
import type { ErrorPoint } from './errorPoints.js';
import { type Box, type LabelPlace, placeLabels } from './placement.js';
import { COLORS, FONT_SIZE, roughTextWidthPx } from './theme.js';
import { kmRoundedDown, percentWords, shortNumber } from './words.js';

interface Channels {
  readonly x: View;
  readonly y: View;
}

/** The tolerance as a line across the plot. */
export function toleranceLayer(tolerance: Tolerance, frame: ErrorFrame, channels: Channels): View {
  const { limitMm } = tolerance;
  return {
    data: { values: [{ baselineKm: 0, toKm: frame.maxKm, limitMm }] },
    mark: { type: 'rule', color: COLORS.brick, strokeWidth: 2 },
    encoding: {
      x: { ...channels.x, field: 'baselineKm' },
      x2: { field: 'toKm' },
      y: { ...channels.y, field: 'limitMm' },
    },
  };
}

/** The words of a rule that allows work: `25 mm holds to 7.9 km`; null for a rule that gives no length. */
export function ruleWords(rule: Rule): string | null {
  const km = rule.maximumBaselineKm;
  return km === null || km <= 0 ? null : `${shortNumber(rule.limitMm)} mm holds to ${kmRoundedDown(km)} km`;
}

/** Where the words of a rule stand: the side of the upright line, and their middle in pixels from the top. */
interface RulePlace {
  readonly align: 'left' | 'right';
  readonly middlePx: number;
}

const WORDS_HIGH_PX = 34;
const GAP_PX = 8;

/**
 * The maximum baseline as an upright line, with its words above the tolerance on whichever side and height least is
 * covered by them; null for a rule that gives no length.
 * @param drawn points and points of curves that should stay free
 */
export function ruleLayers(
  rule: Rule,
  drawn: readonly ErrorPoint[],
  frame: ErrorFrame,
  channels: Channels,
): { readonly line: View; readonly words: readonly View[] } | null {
  const words = ruleWords(rule);
  const km = rule.maximumBaselineKm;
  if (words === null || km === null) return null;
  const detail = `for ${percentWords(rule.share)} of positions, ${percentWords(rule.confidence)} confidence`;
  const linePx = pxOfKm(frame, km);
  const limitPx = pxOfMm(frame, rule.limitMm);
  const { align, middlePx } = freePlace(detail, linePx, limitPx, drawn, frame);
  const x = kmAtPx(frame, linePx + (align === 'left' ? GAP_PX : -GAP_PX));
  const text = (line: string, px: number) => [{ x, y: mmAtPx(frame, px), text: [line], color: COLORS.brick }];
  const toMm = mmAtPx(frame, middlePx - WORDS_HIGH_PX / 2);
  return {
    line: {
      data: { values: [{ maximumBaselineKm: km, fromMm: 0, toMm }] },
      mark: { type: 'rule', color: COLORS.brick, strokeWidth: 2 },
      encoding: {
        x: { ...channels.x, field: 'maximumBaselineKm' },
        y: { ...channels.y, field: 'fromMm' },
        y2: { field: 'toMm' },
      },
    },
    words: [
      ...textLayers(text(words, middlePx - 8), channels, {
        fontWeight: 'bold',
        fontSize: FONT_SIZE.text,
        align,
      }),
      ...textLayers(text(detail, middlePx + 8), channels, { align }),
    ],
  };
}

function freePlace(
  text: string,
  linePx: number,
  limitPx: number,
  drawn: readonly ErrorPoint[],
  frame: ErrorFrame,
): RulePlace {
  const widthPx = roughTextWidthPx(text, FONT_SIZE.small);
  const places: LabelPlace<RulePlace>[] = [];
  const highest = WORDS_HIGH_PX / 2;
  for (let middlePx = Math.max(highest, limitPx - 26); middlePx >= highest; middlePx -= 12) {
    for (const align of ['right', 'left'] as const) {
      const left = align === 'left' ? linePx + GAP_PX : linePx - GAP_PX - widthPx;
      places.push({
        box: {
          left,
          right: left + widthPx,
          top: middlePx - WORDS_HIGH_PX / 2,
          bottom: middlePx + WORDS_HIGH_PX / 2,
        },
        wish: limitPx - middlePx,
        place: { align, middlePx },
      });
    }
  }
  const obstacles = drawn.map(({ baselineKm, errorMm }): Box => {
    const [px, py] = [pxOfKm(frame, baselineKm), pxOfMm(frame, errorMm)];
    return { left: px - 4, right: px + 4, top: py - 4, bottom: py + 4 };
  });
  const plot = { left: 0, top: 0, right: frame.widthPx, bottom: frame.heightPx };
  return placeLabels([places], obstacles, plot)[0]!.place;
}
