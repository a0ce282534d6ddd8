/** Names of the series. `apDaily` is Ap, the mean of a UTC day's eight ap; ap, ap30, ap60 and Ap are in units of 2 nT. */
export const INDEX_NAMES = [
  'kp',
  'ap',
  'apDaily',
  'hp30',
  'ap30',
  'hp60',
  'ap60',
  'dst',
  'f107Observed',
  'f107Adjusted',
  'sunspotNumber',
] as const;
export type IndexName = (typeof INDEX_NAMES)[number];

/** How final a value is; its place in this list is the number kept in `IndexSeries.status`. */
export const INDEX_STATUSES = ['not-stated', 'preliminary', 'provisional', 'definitive'] as const;
export type IndexStatus = (typeof INDEX_STATUSES)[number];

/** How an index is written in messages. */
export const INDEX_WORDS: Readonly<Record<IndexName, string>> = {
  kp: 'Kp',
  ap: 'ap',
  apDaily: 'Ap',
  hp30: 'Hp30',
  ap30: 'ap30',
  hp60: 'Hp60',
  ap60: 'ap60',
  dst: 'Dst',
  f107Observed: 'F10.7 observed',
  f107Adjusted: 'F10.7 adjusted',
  sunspotNumber: 'the sunspot number',
};

const HOUR_MS = 3_600_000;

/** Length of the interval that a value holds for, milliseconds. */
export const INDEX_LENGTH_MS: Readonly<Record<IndexName, number>> = {
  kp: 3 * HOUR_MS,
  ap: 3 * HOUR_MS,
  apDaily: 24 * HOUR_MS,
  hp30: HOUR_MS / 2,
  ap30: HOUR_MS / 2,
  hp60: HOUR_MS,
  ap60: HOUR_MS,
  dst: HOUR_MS,
  f107Observed: 24 * HOUR_MS,
  f107Adjusted: 24 * HOUR_MS,
  sunspotNumber: 24 * HOUR_MS,
};

/** One index over time. Entry i holds from `startMs[i]` for `lengthMs`; starts ascend and do not repeat. */
export interface IndexSeries {
  /** UTC milliseconds. */
  readonly startMs: Float64Array;
  readonly lengthMs: number;
  /** Dst in nT, F10.7 in solar flux units, the others without unit; NaN where the file marks a value as missing. */
  readonly values: Float64Array;
  /** Index into INDEX_STATUSES, of each value. */
  readonly status: Uint8Array;
}

/** Geomagnetic and solar indices; a series that no file held is absent. */
export interface GeomagneticIndices {
  readonly series: Readonly<Partial<Record<IndexName, IndexSeries>>>;
}

/** Number of entries that begin at `utcMs` or before, by bisection. */
function countStarted(series: IndexSeries, utcMs: number): number {
  let [low, high] = [0, series.startMs.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (series.startMs[middle]! <= utcMs) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Entry whose interval contains an instant (start in, end out), or -1. */
export function entryAt(series: IndexSeries, utcMs: number): number {
  const entry = countStarted(series, utcMs) - 1;
  return entry >= 0 && utcMs < series.startMs[entry]! + series.lengthMs ? entry : -1;
}

/** Entries that overlap [fromMs, toMs): the first of them, and the first behind them. */
export function entriesWithin(series: IndexSeries, fromMs: number, toMs: number): [number, number] {
  const first = countStarted(series, fromMs - series.lengthMs);
  let end = first;
  while (end < series.startMs.length && series.startMs[end]! < toMs) end += 1;
  return [first, end];
}

/** Value of the interval that contains an instant; NaN when it is missing or no file held the index then. */
export function indexAt(indices: GeomagneticIndices, name: IndexName, utcMs: number): number {
  const series = indices.series[name];
  if (series === undefined) return Number.NaN;
  const entry = entryAt(series, utcMs);
  return entry < 0 ? Number.NaN : series.values[entry]!;
}

/** How final the value of an instant is; null when there is none. */
export function indexStatusAt(
  indices: GeomagneticIndices,
  name: IndexName,
  utcMs: number,
): IndexStatus | null {
  const series = indices.series[name];
  const entry = series === undefined ? -1 : entryAt(series, utcMs);
  return entry < 0 || Number.isNaN(series!.values[entry]!) ? null : INDEX_STATUSES[series!.status[entry]!]!;
}
