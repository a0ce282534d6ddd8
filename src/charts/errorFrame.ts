import { quantile } from '../stats/index.js';
import type { View } from './chartSpec.js';
import { roundUp } from './words.js';

/** The plot of errors by baseline: its size in pixels and the ends of its axes. */
export interface ErrorFrame {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly maxKm: number;
  readonly maxMm: number;
}

/** Errors beyond this quantile may lie above the chart, so that a few blunders do not flatten all the rest. */
const SHOWN_SHARE = 0.995;
/** Room above the tolerance for its words. */
const ROOM_ABOVE_LIMIT = 1.3;

/**
 * Chooses the axes: as long as the data reach, and high enough for 99.5 % of the errors, for the tolerance and for
 * the given heights, which must not be cut.
 * @param mustShowMm ends of curves, measured values
 */
export function errorFrame(
  lengthsKm: readonly number[],
  errorsMm: readonly number[],
  mustShowMm: readonly number[],
  limitMm: number | null,
): ErrorFrame {
  const high = Math.max(
    errorsMm.length === 0 ? 1 : quantile(errorsMm, SHOWN_SHARE),
    ...mustShowMm,
    (limitMm ?? 0) * ROOM_ABOVE_LIMIT,
    0.1,
  );
  const longestKm = lengthsKm.reduce((a, b) => Math.max(a, b), 0.1);
  return { widthPx: 620, heightPx: 380, maxKm: longestKm * 1.02, maxMm: roundUp(high * 1.02) };
}

/** The length at so many pixels from the left end of the plot, km. */
export const kmAtPx = (frame: ErrorFrame, px: number): number => (px / frame.widthPx) * frame.maxKm;

/** The error at so many pixels below the top of the plot, mm. */
export const mmAtPx = (frame: ErrorFrame, px: number): number => (1 - px / frame.heightPx) * frame.maxMm;

/** Pixels from the left end of the plot of a length in km. */
export const pxOfKm = (frame: ErrorFrame, km: number): number => (km / frame.maxKm) * frame.widthPx;

/** Pixels below the top of the plot of an error in mm. */
export const pxOfMm = (frame: ErrorFrame, mm: number): number => (1 - mm / frame.maxMm) * frame.heightPx;

/** Channels `x` and `y` of a frame; every layer has the same, so that none stretches the axes. */
export function frameChannels(frame: ErrorFrame, errorTitle: string): { readonly x: View; readonly y: View } {
  const scale = (max: number): View => ({ domain: [0, max], nice: false, zero: true });
  return {
    x: {
      type: 'quantitative',
      scale: scale(frame.maxKm),
      axis: { title: 'baseline length, km', tickCount: 8 },
    },
    y: {
      type: 'quantitative',
      scale: scale(frame.maxMm),
      axis: { title: errorTitle, tickCount: 6 },
    },
  };
}
