import { normalQuantile, studentTQuantile } from '../stats/index.js';

/*
 * The grid on which days are judged: θ, the log of a day's ppm against the fitted one, is m + τ z with z standard
 * normal or Student t with 4 degrees of freedom (not rescaled). Its ends are part of the model: a log-t factor has no
 * finite mean square, so the upper end bounds what a day may be (11 times the fitted ppm).
 */

const THETA_LOW = -2.2;
const THETA_HIGH = 2.4;
const THETA_COUNT = 139;
/** Below this spread the prior would fall between the points of the grid. */
const LEAST_SPREAD = 0.03;
const HEAVY_DF = 4;

/** Log factor of a day against the fitted ppm. */
export const THETAS: Float64Array = Float64Array.from(
  { length: THETA_COUNT },
  (_, k) => THETA_LOW + (k * (THETA_HIGH - THETA_LOW)) / (THETA_COUNT - 1),
);

/** Medians run fastest among the combos. */
export const MEDIAN_COUNT = 101;
const MEDIANS = Float64Array.from({ length: MEDIAN_COUNT }, (_, i) => -1 + i / 50);
const SPREADS = [...Array.from({ length: 11 }, (_, i) => i / 20), 0.6, 0.7, 0.8, 0.9, 1, 1.2];
const FAMILIES = ['normal', 't4'] as const;

/** One way in which the days of a study may differ. */
export interface DayCombo {
  /** Log of the median day's ppm over the fitted one. */
  readonly median: number;
  /** τ, the spread of the log factors. */
  readonly spread: number;
  readonly family: 'normal' | 't4';
  /** Weight of the flat prior on τ: width of its cell. */
  readonly width: number;
}

export const DAY_COMBOS: readonly DayCombo[] = FAMILIES.flatMap((family) =>
  SPREADS.flatMap((spread, t) =>
    Array.from(MEDIANS, (median) => ({ median, spread, family, width: cellWidth(t) })),
  ),
);

function cellWidth(t: number): number {
  const last = SPREADS.length - 1;
  if (t === 0) return SPREADS[1]! - SPREADS[0]!;
  if (t === last) return SPREADS[last]! - SPREADS[last - 1]!;
  return (SPREADS[t + 1]! - SPREADS[t - 1]!) / 2;
}

let prior: Float64Array | undefined;

/** Probability of every θ (fast index) under every combo, made once: combos × thetas. */
export function dayPrior(): Float64Array {
  prior ??= makePrior();
  return prior;
}

function makePrior(): Float64Array {
  const table = new Float64Array(DAY_COMBOS.length * THETA_COUNT);
  DAY_COMBOS.forEach(({ median, spread, family }, j) => {
    const row = table.subarray(j * THETA_COUNT, (j + 1) * THETA_COUNT);
    let total = 0;
    for (let k = 0; k < THETA_COUNT; k++) {
      const z = (THETAS[k]! - median) / Math.max(spread, LEAST_SPREAD);
      row[k] = family === 'normal' ? Math.exp(-0.5 * z * z) : (1 + (z * z) / HEAVY_DF) ** -2.5;
      total += row[k]!;
    }
    for (let k = 0; k < THETA_COUNT; k++) row[k]! /= total;
  });
  return table;
}

/** Probabilities below this change nothing in sixteen digits of a sum. */
export const NOTHING = 1e-20;
let support: { readonly first: Uint8Array; readonly end: Uint8Array } | null = null;

/** For every combo the first θ whose probability counts, and the one after the last. */
export function priorSupport(): { readonly first: Uint8Array; readonly end: Uint8Array } {
  support ??= makeSupport();
  return support;
}

function makeSupport(): { first: Uint8Array; end: Uint8Array } {
  const table = dayPrior();
  const [first, end] = [new Uint8Array(DAY_COMBOS.length), new Uint8Array(DAY_COMBOS.length)];
  DAY_COMBOS.forEach((_, j) => {
    const row = table.subarray(j * THETA_COUNT, (j + 1) * THETA_COUNT);
    first[j] = row.findIndex((value) => value > NOTHING);
    end[j] = row.findLastIndex((value) => value > NOTHING) + 1;
  });
  return { first, end };
}

/**
 * For every combo the log factor that a share of days does not exceed.
 * @param dayShare between 0 and 1
 */
export function comboQuantiles(dayShare: number): Float64Array {
  const z = { normal: normalQuantile(dayShare), t4: studentTQuantile(dayShare, HEAVY_DF) };
  return Float64Array.from(DAY_COMBOS, ({ median, spread, family }) => median + z[family] * spread);
}

/** For every combo the log of the root-mean-square factor over days. */
export function comboRms(): Float64Array {
  const table = dayPrior();
  const squares = THETAS.map((theta) => Math.exp(2 * theta));
  return Float64Array.from(DAY_COMBOS, (_, j) => {
    let total = 0;
    for (let k = 0; k < THETA_COUNT; k++) total += table[j * THETA_COUNT + k]! * squares[k]!;
    return 0.5 * Math.log(total);
  });
}
