import { inputError } from '../logs/index.js';
import type { MarkMean } from '../split/index.js';
import { type ChartSpec, chartSpec } from './chartSpec.js';
import { frameAround, frameOfRadius } from './mapFrame.js';
import { type MapMark, MOST_NAMED, mapMarks, meanHorizontalMm } from './mapMarks.js';
import { type MapPanel, mapPanelView, panelLabels } from './mapPanel.js';
import { roundStep } from './mapRings.js';
import { counted, countWords } from './words.js';

/** What {@link markMapChart} draws. */
export interface MarkMapInput {
  /** From `markMeans`; those of other bases are left out. */
  readonly marks: readonly MarkMean[];
  readonly baseName: string;
}

const ONE_PANEL = { widthPx: 640, heightPx: 560 };
const TWO_PANELS_PX = 390;
/** Arrows are shorter where many marks share the plan. */
const longestArrowPx = (marks: number): number => (marks <= 15 ? 56 : 38);

/**
 * Plan of a base and its marks with the mean horizontal error of each mark as a magnified arrow. Marks that crowd
 * near the base are enlarged in a second plan.
 * @throws InputError when no mark was measured from the base
 */
export function markMapChart({ marks: means, baseName }: MarkMapInput): ChartSpec {
  const own = means.filter(({ base }) => base === baseName);
  if (own.length === 0) {
    const known = [...new Set(means.map(({ base }) => base))].map((base) => JSON.stringify(base)).join(', ');
    throw inputError(
      'bad-option',
      `Expected marks measured from base ${JSON.stringify(baseName)}, came ${known === '' ? 'none' : `marks from ${known}`}. Name a base of the table.`,
    );
  }
  const marks = mapMarks(own);
  const largestMm = own.reduce((most, mark) => Math.max(most, meanHorizontalMm(mark) ?? 0), 0);
  const pxPerMm = largestMm === 0 ? 0 : longestArrowPx(own.length) / largestMm;
  const keyMm = largestMm === 0 ? null : roundStep(largestMm);
  const panels = easiestToRead({ baseName, marks, pxPerMm }, keyMm);
  const views = panels.map(mapPanelView);
  return chartSpec(
    title(own, baseName),
    subtitle(own),
    description(own, baseName),
    views.length === 1 ? views[0]! : { hconcat: views, spacing: 44 },
  );
}

type Common = Pick<MapPanel, 'baseName' | 'marks' | 'pxPerMm'>;

/** A second plan must save at least this much, px²: about two names. */
const WORTH_A_PANEL_PX2 = 600;

/** One plan, or two with the circle around the base enlarged that is easier to read. */
function easiestToRead(common: Common, keyMm: number | null): MapPanel[] {
  const frame = frameAround(common.marks, ONE_PANEL.widthPx, ONE_PANEL.heightPx);
  const one: MapPanel[] = [{ ...common, frame, enlargedKm: null, keyMm, title: null }];
  const hardship = (panels: readonly MapPanel[]): number =>
    panels.reduce((sum, panel) => sum + panelLabels(panel).labels.hardshipPx2, 0);
  const candidates = radiiToEnlargeKm(common.marks).map((km) => twoPanels(common, km, keyMm));
  return candidates
    .map((panels) => ({ panels, cost: hardship(panels) + WORTH_A_PANEL_PX2 }))
    .reduce((a, b) => (b.cost < a.cost ? b : a), { panels: one, cost: hardship(one) }).panels;
}

/** Round radii, km, that hold some of the marks and can be enlarged at least two and a half times. */
function radiiToEnlargeKm(marks: readonly MapMark[]): number[] {
  const distances = marks.map(({ eastKm, northKm }) => Math.hypot(eastKm, northKm));
  const [nearest, farthest] = [Math.min(...distances), Math.max(...distances)];
  return [0.01, 0.1, 1, 10, 100]
    .flatMap((power) => [1, 1.5, 2, 3, 4, 5, 6, 8].map((lead) => Number((lead * power).toPrecision(6))))
    .filter((km) => km >= nearest && km <= farthest / 2.5);
}

function twoPanels(common: Common, enlargedKm: number, keyMm: number | null): MapPanel[] {
  const near = common.marks.filter(({ eastKm, northKm }) => Math.hypot(eastKm, northKm) <= enlargedKm);
  const side = TWO_PANELS_PX;
  return [
    {
      ...common,
      frame: frameAround(common.marks, side, side, side),
      enlargedKm,
      keyMm,
      title: 'All marks; the dashed circle is enlarged on the right',
    },
    {
      ...common,
      marks: near,
      frame: frameOfRadius(enlargedKm, side),
      enlargedKm: null,
      keyMm: null,
      title: `Within ${enlargedKm} km of the base`,
    },
  ];
}

function range(own: readonly MarkMean[]): string {
  const lengths = own.map(({ baselineKm }) => baselineKm);
  const [from, to] = [Math.min(...lengths).toFixed(1), Math.max(...lengths).toFixed(1)];
  return from === to ? `${from} km` : `${from} to ${to} km`;
}

const title = (own: readonly MarkMean[], baseName: string): string =>
  `${counted(own.length, 'mark')}, ${range(own)} from base ${baseName}`;

function largest(own: readonly MarkMean[]): { readonly mark: string; readonly mm: number } | null {
  return own.reduce<{ mark: string; mm: number } | null>((most, mean) => {
    const mm = meanHorizontalMm(mean);
    return mm !== null && (most === null || mm > most.mm) ? { mark: mean.mark, mm } : most;
  }, null);
}

function largestWords(own: readonly MarkMean[]): string {
  const most = largest(own);
  return most === null
    ? 'No mean horizontal error is known'
    : `Largest mean horizontal error: ${most.mm.toFixed(1)} mm at ${most.mark}`;
}

function subtitle(own: readonly MarkMean[]): string[] {
  const counts = own.map(({ occupations }) => occupations);
  const [few, many] = [Math.min(...counts), Math.max(...counts)].map(countWords);
  return [
    largestWords(own),
    few === many
      ? `Circles: marks, ${few} occupations each. Square: the base.`
      : `Circles: marks, larger with more occupations (${few} to ${many}). Square: the base.`,
    ...(own.length > MOST_NAMED
      ? [`Named: the ${MOST_NAMED} marks with the largest mean error; the others are dots.`]
      : []),
  ];
}

const description = (own: readonly MarkMean[], baseName: string): string =>
  `Plan of base ${baseName} and ${counted(own.length, 'mark')} at ${range(own)} from it, north up. ${largestWords(own)}. Arrows show the mean horizontal error of each mark, magnified.`;
