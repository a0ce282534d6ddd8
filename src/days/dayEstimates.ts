import { type ComboFit, daySupport } from './comboFit.js';
import { dayPrior, MEDIAN_COUNT, priorSupport, THETAS } from './dayGrid.js';
import type { DayCells } from './dayLikelihood.js';

/** A day is called degraded when its ppm is at least this many times that of the median day. */
export const DEGRADED_FACTOR = 1.5;

/** Where a value of one day lies: posterior mean of the log, and the central 95 %. */
export interface DayValue {
  readonly estimate: number;
  readonly low: number;
  readonly high: number;
}

/** What is known of one day. */
export interface DayEstimate {
  readonly day: string;
  readonly occupations: number;
  /** Shrunken toward the other days as far as the day itself says little. */
  readonly ppm: DayValue;
  /** The same over the ppm of the median day. */
  readonly factor: DayValue;
  /** Probability that the factor is 1.5 or more. */
  readonly probabilityDegraded: number;
}

/** A combo below this weight changes nothing in ten digits. */
const NEGLIGIBLE = 1e-13;
/**
 * Differences θ - m in steps of 1/150: θ = -2.2 + k/30 and m = -1 + i/50 give (5k - 3i - 180)/150, so that with
 * i = 0 … 100 and k = 0 … 138 the index 5k - 3i + 300 runs from 0 to 990.
 */
const DIFFERENCES = Float64Array.from({ length: 991 }, (_, s) => (s - 480) / 150);

/**
 * Posterior of each day over all combos: its log factor θ and its distance θ - m from the median day, which are known
 * together and not one after the other.
 * @param fittedPpm b of the fit, to which θ refers
 */
export function dayEstimates(
  cells: DayCells,
  likelihood: Float64Array,
  { weights, marginals }: ComboFit,
  fittedPpm: number,
): DayEstimate[] {
  const used = Array.from(weights.keys()).filter((j) => weights[j]! > NEGLIGIBLE);
  const told = daySupport(likelihood);
  const days = cells.days.length;
  return cells.days.map((day, d) => {
    const row = likelihood.subarray(d * THETAS.length, (d + 1) * THETAS.length);
    const scales = Float64Array.from(used, (j) => weights[j]! / marginals[j * days + d]!);
    const { own, apart } = dayPosterior(row, told.first[d]!, told.end[d]!, used, scales);
    const threshold = Math.log(DEGRADED_FACTOR);
    return {
      day,
      occupations: cells.occupations[d]!,
      ppm: dayValue(THETAS, own, fittedPpm),
      factor: dayValue(DIFFERENCES, apart, 1),
      probabilityDegraded: Math.min(
        1,
        apart.reduce((sum, p, s) => (DIFFERENCES[s]! >= threshold ? sum + p : sum), 0),
      ),
    };
  });
}

/**
 * Weights of a day's θ, and of its distance from the median, over the combos that count.
 * @param scales of each combo: its weight over the day's likelihood under it
 */
function dayPosterior(
  likelihood: Float64Array,
  first: number,
  end: number,
  used: readonly number[],
  scales: Float64Array,
): { own: Float64Array; apart: Float64Array } {
  const prior = dayPrior();
  const possible = priorSupport();
  const own = new Float64Array(THETAS.length);
  const apart = new Float64Array(DIFFERENCES.length);
  for (let i = 0; i < used.length; i++) {
    const j = used[i]!;
    const scale = scales[i]!;
    const from = j * own.length;
    const shift = 300 - 3 * (j % MEDIAN_COUNT);
    const stop = Math.min(possible.end[j]!, end);
    for (let k = Math.max(possible.first[j]!, first); k < stop; k++) {
      const p = scale * prior[from + k]! * likelihood[k]!;
      own[k]! += p;
      apart[5 * k + shift]! += p;
    }
  }
  return { own, apart };
}

function dayValue(logs: Float64Array, weights: Float64Array, unit: number): DayValue {
  const total = weights.reduce((a, b) => a + b);
  const mean = weights.reduce((sum, p, k) => sum + p * logs[k]!, 0) / total;
  let [reached, low, high] = [0, Number.NaN, Number.NaN];
  for (let k = 0; k < logs.length; k++) {
    reached += weights[k]! / total;
    if (Number.isNaN(low) && reached >= 0.025) low = logs[k]!;
    if (Number.isNaN(high) && reached >= 0.975) high = logs[k]!;
  }
  return { estimate: unit * Math.exp(mean), low: unit * Math.exp(low), high: unit * Math.exp(high) };
}
