import type { PlacedText } from './chartSpec.js';
import { fromPx, type MapFrame, type PlanPoint, toPx } from './mapFrame.js';
import { type MapMark, radiusPx } from './mapMarks.js';
import { ringLabelPlaces, ringRadiiKm } from './mapRings.js';
import { type Box, type LabelPlace, overlapArea, placeLabels } from './placement.js';
import { COLORS, FONT_SIZE, QUIET_INK, roughTextWidthPx } from './theme.js';

/** What is written on a plan, and how much of it had to be written over something else. */
export interface MapLabels {
  readonly base: readonly PlacedText[];
  readonly marks: readonly PlacedText[];
  readonly rings: readonly PlacedText[];
  /** From a circle to a name that stands apart from it. */
  readonly leaders: readonly { readonly mark: string; readonly ends: readonly [PlanPoint, PlanPoint] }[];
  /** How hard the plan is to read, px²: what names cover, ten times what circles cover of each other, and leaders. */
  readonly hardshipPx2: number;
}

/** Half the side of the square that shows the base, px. */
export const BASE_HALF_PX = 6;

/** A ring's length is left out where it would cover more than this, px². */
const MOST_COVERED_PX2 = 40;

/** A hidden circle is worse than a covered letter. */
const HIDDEN_CIRCLE = 10;
/** A name that stands apart from its mark is as bad as so much covered. */
const LEADER_PX2 = 100;

/**
 * Finds places for the names of base and marks, then for the lengths of the rings where room is left.
 * @param full marks that are named
 * @param small marks that are only dots here
 */
export function mapLabels(
  frame: MapFrame,
  baseName: string,
  full: readonly MapMark[],
  small: readonly MapMark[],
  pxPerMm: number,
): MapLabels {
  const origin = toPx(frame, { eastKm: 0, northKm: 0 });
  const circles = [
    boxAround(origin, BASE_HALF_PX + 1),
    ...full.map((mark) => boxAround(toPx(frame, mark), radiusPx(mark) + 1)),
  ];
  const obstacles = [
    ...circles,
    ...full.flatMap((mark) => shaftBoxes(mark, frame, pxPerMm)),
    ...small.map((mark) => boxAround(toPx(frame, mark), 3)),
  ];
  const named = [
    namePlaces(baseName, origin, BASE_HALF_PX, frame),
    ...full.map((mark) => namePlaces(mark.mark, toPx(frame, mark), radiusPx(mark), frame)),
  ];
  const radii = ringRadiiKm(frame);
  const plot = { left: 0, top: 0, right: frame.widthPx, bottom: frame.heightPx };
  const chosen = placeLabels(
    [...named, ...radii.map((km) => ringLabelPlaces(km, `${km} km`, frame))],
    obstacles,
    plot,
  );
  const [base, ...rest] = chosen as [(typeof chosen)[number], ...typeof chosen];
  const marks = rest.slice(0, full.length);
  const text = ({ box }: { readonly box: Box }, words: string, color: string): PlacedText => {
    const { eastKm, northKm } = fromPx(frame, (box.left + box.right) / 2, (box.top + box.bottom) / 2);
    return { x: eastKm, y: northKm, text: [words], color };
  };
  return {
    base: [text(base, baseName, COLORS.ink)],
    marks: marks.map((label, i) => text(label, full[i]!.mark, COLORS.ink)),
    rings: rest
      .slice(full.length)
      .flatMap((label, i) =>
        label.coveredPx2 > MOST_COVERED_PX2 ? [] : [text(label, `${radii[i]!} km`, QUIET_INK)],
      ),
    leaders: marks.flatMap(({ place }, i) => {
      const mark = full[i]!;
      return place === null ? [] : [{ mark: mark.mark, ends: [mark, place] as const }];
    }),
    hardshipPx2:
      [base, ...marks].reduce((sum, label) => sum + label.coveredPx2, 0) +
      HIDDEN_CIRCLE * sharedArea(circles) +
      LEADER_PX2 * marks.filter(({ place }) => place !== null).length,
  };
}

const boxAround = ({ x, y }: { readonly x: number; readonly y: number }, half: number): Box => ({
  left: x - half,
  right: x + half,
  top: y - half,
  bottom: y + half,
});

const sharedArea = (boxes: readonly Box[]): number =>
  boxes.reduce(
    (sum, box, i) => boxes.slice(i + 1).reduce((area, other) => area + overlapArea(box, other), sum),
    0,
  );

/** What an arrow covers, as a row of small boxes. */
function shaftBoxes(mark: MapMark, frame: MapFrame, pxPerMm: number): Box[] {
  const { x, y } = toPx(frame, mark);
  const { east, north } = mark;
  if (east === null || north === null) return [];
  return Array.from({ length: 9 }, (_, k) =>
    boxAround({ x: x + (east * pxPerMm * k) / 8, y: y - (north * pxPerMm * k) / 8 }, 4),
  );
}

/** Directions right, left, above, below, then between them. */
const DIRECTIONS = [0, 180, 90, 270, 45, 315, 135, 225, 22, 158, 202, 338].map(
  (deg) => (deg * Math.PI) / 180,
);
/** Gaps between circle and name, px; from the second one on a leader bridges them. */
const GAPS_PX = [3, 14, 28, 44];

/** Where a name could stand; its place is where a leader would end, null beside the circle. */
function namePlaces(
  text: string,
  { x, y }: { readonly x: number; readonly y: number },
  r: number,
  frame: MapFrame,
): LabelPlace<PlanPoint | null>[] {
  const [halfW, halfH] = [roughTextWidthPx(text, FONT_SIZE.small) / 2, 7];
  return GAPS_PX.flatMap((gap, far) =>
    DIRECTIONS.map((direction, k) => {
      const [ux, uy] = [Math.cos(direction), -Math.sin(direction)];
      // the point of the box that is nearest to the circle lies in the given direction
      const [nearX, nearY] = [x + ux * (r + gap), y + uy * (r + gap)];
      const cx = nearX + halfW * leaning(ux);
      const cy = nearY + halfH * leaning(uy);
      return {
        box: { left: cx - halfW, right: cx + halfW, top: cy - halfH, bottom: cy + halfH },
        wish: 2 * k + 40 * far,
        place: far === 0 ? null : fromPx(frame, nearX, nearY),
      };
    }),
  );
}

/** −1, 0 or 1 for the main directions, in between for slanting ones. */
const leaning = (part: number): number => Math.max(-1, Math.min(1, 1.42 * part));
