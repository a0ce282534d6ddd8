import type { DaySpan } from '../daySpan.js';
import { entriesWithin, type GeomagneticIndices, type IndexSeries, indexAt } from './indexSeries.js';

/** Geomagnetic and solar activity of one day of a study. NaN where no value is known. */
export interface DayIndices {
  readonly day: string;
  /** Mean of ap over the day, each interval by the time it shares with the day; for a UTC day this is Ap before rounding. */
  readonly apMean: number;
  /** Greatest Kp of the intervals that overlap the day. */
  readonly kpMax: number;
  /** Greatest Hp30 of the intervals that overlap the day. */
  readonly hp30Max: number;
  /** The same of Hp60. */
  readonly hp60Max: number;
  /** Smallest Dst of the hours that overlap the day, nT. */
  readonly dstMin: number;
  /** Observed F10.7 of the UTC day in which the middle of the day lies, solar flux units. */
  readonly f107: number;
  /** Share of the day for which Kp is known (without it ap, Hp30 or Hp60), 0 to 1: below 1, extremes may have been missed. */
  readonly knownShare: number;
}

/** Summaries of days, in their order. A local day need not be a UTC day: intervals are taken as they overlap it. */
export function dayIndices(days: readonly DaySpan[], indices: GeomagneticIndices): DayIndices[] {
  const { kp, ap, hp30, hp60, dst } = indices.series;
  return days.map((span) => {
    const f107 = indexAt(indices, 'f107Observed', (span.startMs + span.endMs) / 2);
    return {
      day: span.day,
      apMean: overlap(ap, span).mean,
      kpMax: overlap(kp, span).max,
      hp30Max: overlap(hp30, span).max,
      hp60Max: overlap(hp60, span).max,
      dstMin: overlap(dst, span).min,
      f107,
      knownShare: overlap(kp ?? ap ?? hp30 ?? hp60, span).knownShare,
    };
  });
}

interface Overlap {
  readonly mean: number;
  readonly min: number;
  readonly max: number;
  readonly knownShare: number;
}

function overlap(series: IndexSeries | undefined, { startMs, endMs }: DaySpan): Overlap {
  let knownMs = 0;
  let total = 0;
  let [min, max] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  if (series !== undefined) {
    const [first, end] = entriesWithin(series, startMs, endMs);
    for (let i = first; i < end; i++) {
      const value = series.values[i]!;
      if (Number.isNaN(value)) continue;
      const from = Math.max(startMs, series.startMs[i]!);
      const sharedMs = Math.min(endMs, series.startMs[i]! + series.lengthMs) - from;
      knownMs += sharedMs;
      total += value * sharedMs;
      min = Math.min(min, value);
      max = Math.max(max, value);
    }
  }
  if (knownMs === 0) return { mean: Number.NaN, min: Number.NaN, max: Number.NaN, knownShare: 0 };
  return { mean: total / knownMs, min, max, knownShare: knownMs / (endMs - startMs) };
}
