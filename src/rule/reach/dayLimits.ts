import { comboQuantiles, type DayModelNode, type DayPosterior, dayModelNodes } from '../../days/index.js';

/** One value of the constant with what a share of days does not exceed there. */
interface NodeLimits {
  readonly A: number;
  readonly weight: number;
  /** Ppm of that share of days under every combo, ascending, with the probability up to each. */
  readonly ppm: Float64Array;
  readonly reached: Float64Array;
}

/** How probable it is that days hold a spread: asked at any length and spread. */
export interface DayLimits {
  /** Probability that on the share of days σ² at a length is at most a value, mm². */
  readonly confidence: (km: number, variance: number) => number;
  /** The value of σ² at a length that holds with a probability, mm². */
  readonly variance: (km: number, confidence: number) => number;
}

/** The day model at its nodes of the constant: from a posterior, or with days dropped. */
export interface DayNodes {
  readonly B: number;
  readonly nodes: readonly DayModelNode[];
}

/** Nodes of posteriors that are in use: rules, their table and their test ask for the same ones. */
const remembered = new WeakMap<DayPosterior, DayNodes>();

export function dayNodes(posterior: DayPosterior): DayNodes {
  const known = remembered.get(posterior) ?? { B: posterior.B, nodes: dayModelNodes(posterior) };
  remembered.set(posterior, known);
  return known;
}

/** A combo below this weight changes no promise. */
const NEGLIGIBLE = 1e-12;

/** @param dayShare share of days, between 0 and 1 */
export function dayLimits({ B, nodes }: DayNodes, dayShare: number): DayLimits {
  const logs = comboQuantiles(dayShare);
  const order = Uint32Array.from(logs.keys()).sort((i, j) => logs[i]! - logs[j]!);
  const limits = nodes.map(({ A, weight, comboWeights }): NodeLimits => {
    const kept = order.filter((j) => comboWeights[j]! > NEGLIGIBLE);
    const ppm = Float64Array.from(kept, (j) => Math.sqrt(B) * Math.exp(logs[j]!));
    const reached = new Float64Array(kept.length);
    let total = 0;
    kept.forEach((j, k) => {
      total += comboWeights[j]!;
      reached[k] = total;
    });
    return { A, weight, ppm, reached };
  });
  const confidence = (km: number, variance: number): number =>
    limits.reduce((sum, node) => {
      const room = variance - node.A;
      return room > 0 ? sum + node.weight * reachedAt(node, Math.sqrt(room) / km) : sum;
    }, 0);
  return { confidence, variance: (km, level) => varianceAt(limits, km, level) };
}

/** Probability of a ppm up to a bound. */
function reachedAt({ ppm, reached }: NodeLimits, bound: number): number {
  let [low, high] = [0, ppm.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ppm[middle]! <= bound) low = middle + 1;
    else high = middle;
  }
  return low === 0 ? 0 : reached[low - 1]!;
}

/** Weighted quantile of A + ppm² L² over nodes and combos. */
function varianceAt(limits: readonly NodeLimits[], km: number, level: number): number {
  const values: { variance: number; weight: number }[] = [];
  for (const { A, weight, ppm, reached } of limits) {
    ppm.forEach((value, k) => {
      values.push({
        variance: A + (value * km) ** 2,
        weight: weight * (reached[k]! - (reached[k - 1] ?? 0)),
      });
    });
  }
  values.sort((a, b) => a.variance - b.variance);
  let reached = 0;
  for (const { variance, weight } of values) {
    reached += weight;
    if (reached >= level) return variance;
  }
  // Rounding, and combos too light to be kept, may leave the sum a hair below the level.
  return values.at(-1)!.variance;
}
