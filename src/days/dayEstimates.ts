import { dayPrior, MEDIAN_COUNT, THETAS } from './dayGrid.js';
import type { ComboFit, DayCells } from './dayLikelihood.js';

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

/** A combo below this weight changes nothing in 15 digits. */
const NEGLIGIBLE = 1e-17;
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
  const prior = dayPrior();
  const thetas = THETAS.length;
  const used = Array.from(weights.keys()).filter((j) => weights[j]! > NEGLIGIBLE);
  return cells.days.map((day, d) => {
    const own = new Float64Array(thetas);
    const apart = new Float64Array(DIFFERENCES.length);
    for (const j of used) {
      const scale = weights[j]! / marginals[j * cells.days.length + d]!;
      const shift = 300 - 3 * (j % MEDIAN_COUNT);
      for (let k = 0; k < thetas; k++) {
        const p = scale * prior[j * thetas + k]! * likelihood[d * thetas + k]!;
        own[k]! += p;
        apart[5 * k + shift]! += p;
      }
    }
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
