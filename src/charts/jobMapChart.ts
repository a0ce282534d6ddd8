import type { JobResult } from '../study/index.js';
import { type ChartSpec, chartSpec, type PlacedText, textLayers, type View } from './chartSpec.js';
import { type JobPlacePoint, jobPlan, nearTheJob } from './jobMapPlan.js';
import { frameAround, fromPx, type MapFrame, mapChannels, planPoint, toPx } from './mapFrame.js';
import { placeLabels } from './placement.js';
import { COLORS, FONT_SIZE, roughTextWidthPx } from './theme.js';
import { counted, kmRoundedDown, percentWords, shortNumber } from './words.js';

/** What {@link jobMapChart} draws. */
export interface JobMapInput {
  readonly job: JobResult;
}

const [WIDTH_PX, HEIGHT_PX] = [640, 560];
/** More names than these cannot be read; points that need another base come first. */
const MOST_NAMED = 40;
/** More points than these cover each other: of each small cell one is drawn. */
const MOST_POINTS = 300;
const CELL_PX = 7;

/**
 * Plan of the points of a job with the bases and a ring around each as far as the rule reaches; points that no base
 * reaches are hollow triangles with their names.
 */
export function jobMapChart({ job }: JobMapInput): ChartSpec {
  const all = nearTheJob(jobPlan(job));
  const frame = frameAround(all, WIDTH_PX, HEIGHT_PX);
  const crowded = all.length > MOST_POINTS;
  const places = crowded ? onePerCell(all, frame) : all;
  const channels = mapChannels(frame);
  const [first] = job.bases;
  const axis = (channel: View, direction: string): View => ({
    ...channel,
    axis: { ...(channel.axis as View), title: `${direction} of base ${first!.base}, km` },
  });
  const position = { x: axis(channels.x, 'east'), y: axis(channels.y, 'north') };
  const points = [
    symbols(places, position, 'reached', {
      shape: 'circle',
      filled: true,
      color: COLORS.water,
      size: crowded ? 14 : 52,
    }),
    symbols(places, position, 'not reached', {
      shape: 'triangle-up',
      filled: true,
      fill: 'white',
      stroke: COLORS.ink,
      strokeWidth: crowded ? 0.8 : 1.8,
      size: crowded ? 16 : 96,
    }),
  ];
  const ring = rings(places, position);
  return chartSpec(title(job), subtitle(job, crowded), description(job), {
    width: frame.widthPx,
    height: frame.heightPx,
    view: { stroke: COLORS.mist, strokeWidth: 1.6 },
    layer: [
      ...(crowded ? [...points, ring] : [ring, ...points]),
      symbols(places, position, 'base', { shape: 'square', filled: true, color: COLORS.ink, size: 144 }),
      ...textLayers(names(crowded ? places.filter(({ kind }) => kind === 'base') : places, frame), position, {
        align: 'center',
      }),
    ],
  });
}

/** Of the points of a kind in one cell the first. */
function onePerCell(places: readonly JobPlacePoint[], frame: MapFrame): JobPlacePoint[] {
  const taken = new Set<string>();
  return places.filter((place) => {
    if (place.kind === 'base') return true;
    const { x, y } = toPx(frame, place);
    const cell = `${place.kind} ${Math.floor(x / CELL_PX)} ${Math.floor(y / CELL_PX)}`;
    return !taken.has(cell) && taken.add(cell);
  });
}

function rings(places: readonly JobPlacePoint[], position: { readonly x: View; readonly y: View }): View {
  const values = places.flatMap(({ name, eastKm, northKm, reachKm }) =>
    reachKm === null || reachKm === 0
      ? []
      : Array.from({ length: 121 }, (_, order) => {
          const ring = planPoint(reachKm, 3 * order);
          return { name, order, eastKm: eastKm + ring.eastKm, northKm: northKm + ring.northKm };
        }),
  );
  return {
    data: { values },
    mark: { type: 'line', clip: true, color: COLORS.brick, strokeWidth: 1.6 },
    encoding: {
      x: { ...position.x, field: 'eastKm' },
      y: { ...position.y, field: 'northKm' },
      detail: { field: 'name', type: 'nominal' },
      order: { field: 'order', type: 'quantitative' },
    },
  };
}

const symbols = (
  places: readonly JobPlacePoint[],
  position: { readonly x: View; readonly y: View },
  wanted: JobPlacePoint['kind'],
  mark: View,
): View => ({
  data: { values: places.filter(({ kind }) => kind === wanted) },
  mark: { type: 'point', opacity: 1, ...mark },
  encoding: { x: { ...position.x, field: 'eastKm' }, y: { ...position.y, field: 'northKm' } },
});

const HALF_PX = { base: 7, reached: 5, 'not reached': 7 } as const;
/** Right, left, above, below, then between them: shares of the way in x and y. */
const SIDES = [
  [1, 0],
  [-1, 0],
  [0, -1],
  [0, 1],
  [0.9, -0.7],
  [-0.9, -0.7],
  [0.9, 0.7],
  [-0.9, 0.7],
] as const;

/** Names where there is room for them: of all bases, then of points that need another base, then of the others. */
function names(places: readonly JobPlacePoint[], frame: MapFrame): PlacedText[] {
  const order = ['base', 'not reached', 'reached'] as const;
  const named = order.flatMap((kind) => places.filter((place) => place.kind === kind)).slice(0, MOST_NAMED);
  const boxAt = (place: JobPlacePoint) => {
    const { x, y } = toPx(frame, place);
    const half = HALF_PX[place.kind];
    return { left: x - half, right: x + half, top: y - half, bottom: y + half };
  };
  const chosen = placeLabels(
    named.map((place) => {
      const { x, y } = toPx(frame, place);
      const [half, halfW] = [HALF_PX[place.kind] + 3, roughTextWidthPx(place.name, FONT_SIZE.small) / 2];
      return SIDES.map(([right, down], k) => {
        const [cx, cy] = [x + right * (half + halfW), y + down * (half + 7)];
        return {
          box: { left: cx - halfW, right: cx + halfW, top: cy - 7, bottom: cy + 7 },
          wish: 2 * k,
          place: fromPx(frame, cx, cy),
        };
      });
    }),
    places.map(boxAt),
    { left: 0, top: 0, right: frame.widthPx, bottom: frame.heightPx },
  );
  return chosen.map(({ place }, k) => ({
    x: place.eastKm,
    y: place.northKm,
    text: [named[k]!.name],
    color: COLORS.ink,
  }));
}

/** Spreading a long list as arguments overflows the stack. */
const leastOf = (values: readonly number[]): number => values.reduce((a, b) => Math.min(a, b));
const mostOf = (values: readonly number[]): number => values.reduce((a, b) => Math.max(a, b));

const limitWords = ({ component, limitMm }: JobResult): string =>
  `${shortNumber(limitMm)} mm ${component === 'horizontal' ? 'in plan' : 'in height'}`;

function title(job: JobResult): string {
  const far = job.points.filter(({ needsAnotherBase }) => needsAnotherBase === true).length;
  if (job.maximumBaselineKm === null) return `No rule for ${limitWords(job)}: no point can be promised it`;
  if (far === 0) {
    return job.points.length === 1
      ? `The point is reached for ${limitWords(job)}`
      : `All ${job.points.length} points are reached for ${limitWords(job)}`;
  }
  return `${far} of ${counted(job.points.length, 'point')} ${far === 1 ? 'needs' : 'need'} another base for ${limitWords(job)}`;
}

function subtitle(job: JobResult, crowded: boolean): string[] {
  const promised = job.points.flatMap(({ promisedMm }) => (promisedMm === null ? [] : [promisedMm]));
  return [
    `${job.file}: ${percentWords(job.share)} of a day’s positions on ${percentWords(job.dayShare)} of the days`,
    job.maximumBaselineKm === null
      ? 'Squares: bases. Triangles: points.'
      : `Rings: as far as the rule reaches, ${kmRoundedDown(job.maximumBaselineKm)} km. Squares: bases. Circles: points that a base reaches; triangles: points that none does.`,
    ...(promised.length === 0
      ? []
      : [
          `What can be promised at the points: ${shortNumber(leastOf(promised))} to ${shortNumber(mostOf(promised))} mm.`,
        ]),
    ...(crowded ? ['Points that would cover each other are drawn as one; names are left out.'] : []),
  ];
}

const description = (job: JobResult): string =>
  `Plan of ${counted(job.points.length, 'point')} of a job and ${counted(job.bases.length, 'base')}, north up. ${job.sentence}`;
