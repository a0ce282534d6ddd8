import { type Random, shuffle, sum } from '../stats/index.js';

export interface AssociationOptions {
  readonly random: Random;
  /** Consecutive days that are moved together; by default as many as the days resemble their neighbours, at least n^⅓. */
  readonly blockDays?: number | undefined;
  /** Default 9999. */
  readonly permutations?: number | undefined;
  /** Level of the intervals; default 0.95. */
  readonly confidence?: number | undefined;
}

/** Fewer days, or fewer blocks to move, have too few orders for a test. */
export const FEWEST_DAYS = 10;
export const FEWEST_BLOCKS = 5;
/** Sums in another order differ by their rounding. */
export const TIE = 1e-12;

/** Options with every default filled in. */
export interface ResolvedAssociation {
  readonly random: Random;
  readonly blockDays: number;
  readonly permutations: number;
  readonly confidence: number;
}

/**
 * Fills in the defaults.
 * @param n number of days
 * @param series centred ranks of both quantities, in the order of the days
 * @throws RangeError for impossible options
 */
export function resolveAssociation(
  { random, blockDays, permutations = 9999, confidence = 0.95 }: AssociationOptions,
  n: number,
  series: readonly Float64Array[],
): ResolvedAssociation {
  if (!(Number.isInteger(permutations) && permutations >= 99))
    throw new RangeError(`permutations: expected a whole number of at least 99, received ${permutations}`);
  if (!(confidence > 0.5 && confidence < 1))
    throw new RangeError(`confidence: expected a number between 0.5 and 1, received ${confidence}`);
  if (blockDays !== undefined && !(Number.isInteger(blockDays) && blockDays >= 1))
    throw new RangeError(`blockDays: expected a whole number of at least 1, received ${blockDays}`);
  const usual = Math.max(1, Math.ceil(Math.cbrt(n)), 2 * memoryDays(series, n) + 1);
  return {
    random,
    permutations,
    confidence,
    blockDays: blockDays ?? Math.min(usual, Math.max(1, Math.floor(n / FEWEST_BLOCKS))),
  };
}

/** Days 0 to n − 1 in an order that keeps neighbours together: the circle is cut at a random day, blocks are shuffled. */
export function blockOrder(n: number, blockDays: number, random: Random): Int32Array {
  const start = Math.floor(random() * n);
  const blocks = shuffle([...Array(Math.ceil(n / blockDays)).keys()], random);
  const order = new Int32Array(n);
  let at = 0;
  for (const block of blocks)
    for (let i = block * blockDays; i < Math.min(n, (block + 1) * blockDays); i++)
      order[at++] = (start + i) % n;
  return order;
}

/** Mid-ranks minus their mean. */
export function centredRanks(values: ArrayLike<number>): Float64Array {
  const n = values.length;
  const order = Array.from({ length: n }, (_, i) => i).sort((a, b) => values[a]! - values[b]!);
  const ranks = new Float64Array(n);
  for (let from = 0; from < n; ) {
    let to = from + 1;
    while (to < n && values[order[to]!] === values[order[from]!]) to += 1;
    for (let i = from; i < to; i++) ranks[order[i]!] = (from + to - 1) / 2 - (n - 1) / 2;
    from = to;
  }
  return ranks;
}

/** Sum of products. */
export const product = (a: Float64Array, b: Float64Array): number => sum(a.map((value, i) => value * b[i]!));

/** Lag correlation of centred ranks. */
export function lagCorrelation(ranks: Float64Array, lag: number): number {
  const square = product(ranks, ranks);
  return square === 0 ? 0 : product(ranks.slice(lag), ranks.slice(0, ranks.length - lag)) / square;
}

/** Longest lag to which both series resemble themselves more than chance would have it. */
export function memoryDays(series: readonly Float64Array[], n: number): number {
  const longest = Math.floor(n / FEWEST_BLOCKS) - 1;
  for (let lag = 1; lag <= longest; lag++)
    if (series.some((ranks) => lagCorrelation(ranks, lag) < 2 / Math.sqrt(n))) return lag - 1;
  return Math.max(0, longest);
}

/** A share as a percentage with two digits that count: `95 %`, `1.2 %`, `0.01 %`. */
export const percent = (share: number): string => `${Number((100 * share).toPrecision(2))} %`;
