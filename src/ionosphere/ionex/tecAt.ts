import type { Geographic } from '../../geodesy/index.js';
import { valueAt } from './mapGrid.js';
import type { TecMaps } from './tecMaps.js';

/**
 * How a time between two maps is served (Schaer, Gurtner & Feltens 1998): `nearest` map; `linear` between the maps
 * before and after; `rotated`, linear between both, each turned to where the Sun stood at its own epoch;
 * `nearest-rotated`, the nearest map turned so.
 */
export const TIME_SCHEMES = ['nearest', 'linear', 'rotated', 'nearest-rotated'] as const;
export type TimeScheme = (typeof TIME_SCHEMES)[number];

/** Maps farther apart than this, or than the interval their file states, are not interpolated between. */
const LONGEST_STEP_MS = 4 * 3_600_000;

/** The Sun's way: degrees of longitude a millisecond. */
const DEGREES_PER_MS = 15 / 3_600_000;

/**
 * Vertical TEC at a place and time, TECU. NaN outside the grid, where the maps have no value, outside their time, and in
 * a gap of more than four hours; the nearest map serves half an interval beyond the first and the last.
 * @param scheme default `rotated`, the best of the four where TEC follows the Sun
 */
export function tecAt(
  maps: TecMaps,
  utcMs: number,
  place: Geographic,
  scheme: TimeScheme = 'rotated',
): number {
  return seriesAt(maps, maps.tec, utcMs, place, scheme);
}

/** Root-mean-square error of TEC at a place and time, TECU, as `tecAt`; NaN where a map has none. */
export function tecRmsAt(
  maps: TecMaps,
  utcMs: number,
  place: Geographic,
  scheme: TimeScheme = 'rotated',
): number {
  return seriesAt(maps, maps.rms, utcMs, place, scheme);
}

function seriesAt(
  maps: TecMaps,
  series: readonly (Float64Array | null)[],
  utcMs: number,
  { latitudeDeg, longitudeDeg }: Geographic,
  scheme: TimeScheme,
): number {
  const isRotated = scheme === 'rotated' || scheme === 'nearest-rotated';
  const mapValue = (map: number): number => {
    const values = series[map];
    if (values == null) return Number.NaN;
    const turned = isRotated ? (utcMs - maps.epochsMs[map]!) * DEGREES_PER_MS : 0;
    return valueAt(maps, values, latitudeDeg, longitudeDeg + turned);
  };
  const after = firstAtOrAfter(maps.epochsMs, utcMs);
  if (scheme === 'nearest' || scheme === 'nearest-rotated') {
    const map = nearestMap(maps, utcMs, after);
    return map === null ? Number.NaN : mapValue(map);
  }
  if (maps.epochsMs[after] === utcMs) return mapValue(after);
  if (!isReached(maps, utcMs, after)) return Number.NaN;
  const [from, to] = [maps.epochsMs[after - 1]!, maps.epochsMs[after]!];
  const share = (utcMs - from) / (to - from);
  return (1 - share) * mapValue(after - 1) + share * mapValue(after);
}

/** Whether a time is an epoch of a map or lies between two that are near enough to interpolate. */
export const mapsReach = (maps: TecMaps, utcMs: number): boolean =>
  isReached(maps, utcMs, firstAtOrAfter(maps.epochsMs, utcMs));

function isReached({ epochsMs, intervalSeconds }: TecMaps, utcMs: number, after: number): boolean {
  if (epochsMs[after] === utcMs) return true;
  if (!(after > 0 && after < epochsMs.length)) return false;
  const longestMs = Math.max(LONGEST_STEP_MS, 1000 * intervalSeconds);
  return epochsMs[after]! - epochsMs[after - 1]! <= longestMs;
}

/** Index of the first map at `utcMs` or later; the number of maps when there is none. */
function firstAtOrAfter(epochsMs: Float64Array, utcMs: number): number {
  let [low, high] = [0, epochsMs.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (epochsMs[middle]! < utcMs) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Of two maps equally near the earlier one; null for a time that no map is near to. */
function nearestMap(maps: TecMaps, utcMs: number, after: number): number | null {
  const { epochsMs, intervalSeconds } = maps;
  const away = (map: number): number => Math.abs((epochsMs[map] ?? Number.POSITIVE_INFINITY) - utcMs);
  const nearest = away(after - 1) <= away(after) ? after - 1 : after;
  const isNear = away(nearest) <= (1000 * intervalSeconds) / 2;
  return isNear || isReached(maps, utcMs, after) ? nearest : null;
}
