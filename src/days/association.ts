import { normalQuantile } from '../stats/index.js';
import {
  type AssociationOptions,
  blockOrder,
  centredRanks,
  FEWEST_BLOCKS,
  FEWEST_DAYS,
  lagCorrelation,
  memoryDays,
  percent,
  product,
  resolveAssociation,
  TIE,
} from './dayBlocks.js';

export type { AssociationOptions } from './dayBlocks.js';
export {
  type DayShare,
  type DegradedDay,
  type KpThreshold,
  type ThresholdRule,
  thresholdRule,
} from './thresholdRule.js';

/** How far two quantities of the same days go together. */
export interface RankAssociation {
  /** Days on which both are known; the others are left out. */
  readonly days: number;
  readonly leftOut: number;
  /** Spearman's rank correlation; null when one of the two does not vary, or with fewer than three days. */
  readonly spearman: number | null;
  readonly low: number | null;
  readonly high: number | null;
  /** Two-sided; null with too few days or blocks of days. */
  readonly pValue: number | null;
  readonly blockDays: number;
  readonly permutations: number;
  /** Whole sentences that keep going together and causing apart. */
  readonly statement: string;
}

const CAUTION =
  'That they go together names no cause: season, hours of work, crews and sites may move both, and a cause may show on other days.';

/**
 * Spearman's rank correlation of two quantities of the same days, in the order of the days. The p-value comes from
 * orders in which blocks of consecutive days, cut at a random day of the circle of days, are shuffled, so that days that
 * resemble their neighbours are not counted as independent (Politis & Romano 1992 for circular blocks; from memory). The
 * interval is Fisher's with the variance of Bonett & Wright (2000, Psychometrika 65), for the number of days that
 * independent days would need (Bartlett 1935; from memory).
 * @throws RangeError for lists of different lengths or impossible options
 */
export function rankAssociation(
  dayValues: ArrayLike<number>,
  dayCovariate: ArrayLike<number>,
  options: AssociationOptions,
): RankAssociation {
  if (dayCovariate.length !== dayValues.length)
    throw new RangeError(
      `dayCovariate: expected ${dayValues.length} values as in dayValues, received ${dayCovariate.length}`,
    );
  const both = Array.from(dayValues, (value, i) => [value, dayCovariate[i]!] as const).filter(
    ([x, y]) => !Number.isNaN(x) && !Number.isNaN(y),
  );
  const [x, y] = [0, 1].map((k) => centredRanks(both.map((pair) => pair[k]!))) as [
    Float64Array,
    Float64Array,
  ];
  const n = both.length;
  const { random, permutations, confidence, blockDays } = resolveAssociation(options, n, [x, y]);
  const common = { days: n, leftOut: dayValues.length - n, blockDays, permutations };
  const nothing = { ...common, spearman: null, low: null, high: null, pValue: null };
  const scale = Math.sqrt(product(x, x) * product(y, y));
  if (n < 3 || scale === 0) {
    const why = n < 3 ? `${n} of them are known in both` : 'one of the two is the same on all of them';
    return { ...nothing, statement: `Nothing can be said from these days: ${why}.` };
  }
  const spearman = Math.min(1, Math.max(-1, product(x, y) / scale));
  const { low, high } = spearmanInterval(spearman, independentDays(x, y), confidence);
  const found = { ...common, spearman, low, high };
  const limits =
    low === null || high === null
      ? ''
      : `, ${percent(confidence)} limits ${low.toFixed(2)} to ${high.toFixed(2)}`;
  const size = `Spearman ${spearman.toFixed(2)}${limits}`;
  if (n < FEWEST_DAYS || n < FEWEST_BLOCKS * blockDays) {
    const needed = Math.max(FEWEST_DAYS, FEWEST_BLOCKS * blockDays);
    return {
      ...found,
      pValue: null,
      statement: `Too few days to tell an association from chance: ${n} are known in both, ${needed} are needed (${size}).`,
    };
  }
  let asFar = 0;
  for (let k = 0; k < permutations; k++) {
    const order = blockOrder(n, blockDays, random);
    let total = 0;
    for (let i = 0; i < n; i++) total += x[i]! * y[order[i]!]!;
    if (Math.abs(total) / scale >= Math.abs(spearman) - TIE) asFar += 1;
  }
  const pValue = (1 + asFar) / (1 + permutations);
  const chance = `a chance order of the days gives as much in ${percent(pValue)} of cases`;
  const statement =
    pValue <= 1 - confidence
      ? `Over ${n} days the two went together: where one ranked higher, the other tended to rank ${spearman > 0 ? 'higher' : 'lower'} (${size}; ${chance}). ${CAUTION}`
      : `Over ${n} days no association can be told from chance (${size}; ${chance}). This does not show that there is none: the limits say what the days leave open.`;
  return { ...found, pValue, statement };
}

/** Number of independent days whose correlation would scatter as much: n/(1 + 2 Σ r_x r_y) over the common memory. */
function independentDays(x: Float64Array, y: Float64Array): number {
  const n = x.length;
  let inflation = 1;
  for (let lag = 1; lag <= memoryDays([x, y], n); lag++)
    inflation += 2 * (1 - lag / n) * lagCorrelation(x, lag) * lagCorrelation(y, lag);
  return n / inflation;
}

function spearmanInterval(
  spearman: number,
  days: number,
  confidence: number,
): { low: number | null; high: number | null } {
  if (days <= 4 || Math.abs(spearman) >= 1) return { low: null, high: null };
  const half = normalQuantile((1 + confidence) / 2) * Math.sqrt((1 + spearman ** 2 / 2) / (days - 3));
  const z = Math.atanh(spearman);
  return { low: Math.tanh(z - half), high: Math.tanh(z + half) };
}
