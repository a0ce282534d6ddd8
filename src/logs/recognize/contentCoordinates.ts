import { geocentricToGeodetic } from '../../geodesy/index.js';
import { isDms } from './cellKinds.js';
import { type Column, isInteger } from './columns.js';
import type { Draft } from './draft.js';

/** Columns that look like coordinates by their cells alone. */
export type FoundCoordinates =
  | {
      readonly kind: 'geocentric';
      readonly columns: readonly [Column, Column, Column];
      readonly feet: boolean;
    }
  | { readonly kind: 'geographic'; readonly columns: readonly [Column, Column]; readonly dms: boolean }
  | { readonly kind: 'plane'; readonly columns: readonly [Column, Column] };

/** The coordinates among columns without a role; the surest kind first, null when nothing looks like any. */
export function findCoordinates(draft: Draft): FoundCoordinates | null {
  const free = draft.free();
  const numeric = free.filter(({ numbers }) => numbers !== null);
  for (const [a, b, c] of runs(numeric, 3) as [Column, Column, Column][]) {
    const kind = earthRadius(a, b, c);
    if (kind !== null) return { kind: 'geocentric', columns: [a, b, c], feet: kind === 'feet' };
  }
  for (const [a, b] of runs(free, 2) as [Column, Column][]) {
    if (isAngle(a) && isAngle(b)) return { kind: 'geographic', columns: [a, b], dms: true };
  }
  for (const [a, b] of runs(numeric, 2) as [Column, Column][]) {
    if (areDegrees(a, b)) return { kind: 'geographic', columns: [a, b], dms: false };
  }
  return bestPlanePair(numeric);
}

/** All stretches of so many columns that stand side by side. */
function runs(columns: readonly Column[], length: number): Column[][] {
  return columns
    .map((_, k) => columns.slice(k, k + length))
    .filter((run) => run.length === length && run.at(-1)!.index - run[0]!.index === length - 1);
}

const FOOT_M = 0.3048;

/** Plane coordinates may be as long as the radius of the earth, but the height with them is not as large as this. */
const LARGEST_HEIGHT = 10_000;

/** Whether three columns are geocentric: they give heights on the earth's surface, in metres or in feet. */
export function earthRadius(a: Column, b: Column, c: Column): 'metres' | 'feet' | null {
  const [xs, ys, zs] = [a.numbers, b.numbers, c.numbers];
  if (!xs || !ys || !zs || c.median < LARGEST_HEIGHT) return null;
  const isOnEarth = (xM: number, yM: number, zM: number): boolean => {
    const radius = Math.hypot(xM, yM, zM);
    if (!(radius > 6.3e6 && radius < 6.5e6)) return false;
    return Math.abs(geocentricToGeodetic({ xM, yM, zM }).heightM) < LARGEST_HEIGHT;
  };
  const fits = (unit: number): boolean => {
    const found = xs.filter((x, k) => isOnEarth(x * unit, (ys[k] ?? 0) * unit, (zs[k] ?? 0) * unit));
    return found.length > 0.9 * xs.length;
  };
  if (fits(1)) return 'metres';
  return fits(FOOT_M) ? 'feet' : null;
}

const FINE_SECONDS = /\d[.,]\d{2,}\D*$/;
/** Times of day have at most milliseconds. */
const TIME_OF_DAY = /^\d{1,2}:\d{2}(:\d{2}([.,]\d{1,3})?)?$/;

/** An angle in degrees, minutes and seconds: by its letters or symbols, or by decimals that no time of day has. */
export function isAngle({ texts, numbers }: Column): boolean {
  if (numbers !== null || texts.length === 0) return false;
  const angles = texts.filter((text) => isDms(text) && !/^\d{4}[-/.]/.test(text) && !TIME_OF_DAY.test(text));
  const shown = angles.filter(
    (text) => /[NSEW°º′″'"]/i.test(text) || /^-/.test(text) || FINE_SECONDS.test(text),
  );
  return angles.length > 0.9 * texts.length && shown.length > 0.9 * texts.length;
}

const DEGREE_DECIMALS = 6;

function areDegrees(a: Column, b: Column): boolean {
  if (Math.min(a.decimals, b.decimals) < DEGREE_DECIMALS) return false;
  const within = (column: Column, limit: number): boolean => column.least >= -180 && column.greatest <= limit;
  const isLatitude = (column: Column): boolean => column.least >= -90 && column.greatest <= 90;
  return within(a, 360) && within(b, 360) && (isLatitude(a) || isLatitude(b));
}

/** Smaller numbers are local coordinates at best. */
const LARGE = 1000;

function bestPlanePair(numeric: readonly Column[]): FoundCoordinates | null {
  let best: readonly [Column, Column] | null = null;
  let most = 0;
  for (const [a, b] of runs(numeric, 2) as [Column, Column][]) {
    const large = a.median >= LARGE && b.median >= LARGE;
    const finelyWritten = a.decimals >= 2 && b.decimals >= 2;
    if (!large && !finelyWritten) continue;
    const next = numeric.find(({ index }) => index === b.index + 1);
    // Written alike, with a height behind them: a point number in front shows neither.
    const alike = isInteger(a) === isInteger(b) && !isRunning(a) ? 2 : 0;
    const score = alike + (next !== undefined && looksLikeHeight(next) ? 2 : 0) + (large ? 2 : 0);
    if (score > most) [best, most] = [[a, b], score];
  }
  return best === null || most < 4 ? null : { kind: 'plane', columns: best };
}

/** Metres or feet above anything on land. */
export const looksLikeHeight = ({ numbers, least, greatest }: Column): boolean =>
  numbers !== null && least >= -1500 && greatest <= 30_000;

/** Whole numbers that only grow, as numbers of points do. */
function isRunning(column: Column): boolean {
  const { numbers } = column;
  if (numbers === null || !isInteger(column) || numbers.length < 2) return false;
  return numbers.every((value, k) => k === 0 || (value > numbers[k - 1]! && value - numbers[k - 1]! <= 1000));
}
