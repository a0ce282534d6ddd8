import { betaQuantile, sum } from '../stats/index.js';
import {
  type AssociationOptions,
  blockOrder,
  centredRanks,
  FEWEST_BLOCKS,
  FEWEST_DAYS,
  percent,
  resolveAssociation,
  TIE,
} from './dayBlocks.js';

/** A share of days with its Clopper-Pearson interval; nulls when there are no such days. */
export interface DayShare {
  readonly count: number;
  readonly of: number;
  readonly estimate: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

/** What a rule "days whose greatest Kp reaches this" would have done. */
export interface KpThreshold {
  readonly kpFrom: number;
  readonly flaggedDays: number;
  /** Of the degraded days those that were flagged. */
  readonly caught: DayShare;
  /** Of the days that were not degraded those that were flagged. */
  readonly falseAlarms: DayShare;
  /** Share caught minus share of false alarms (Youden 1950); null without days of both kinds. */
  readonly youden: number | null;
}

export interface ThresholdRule {
  readonly days: number;
  readonly leftOut: number;
  readonly degradedDays: number;
  /** Every Kp that occurred but the least, which would flag all days; ascending. */
  readonly thresholds: readonly KpThreshold[];
  /** The threshold with the greatest Youden index, the highest of several. */
  readonly best: KpThreshold | null;
  /** Share of chance orders of the days whose best threshold is as good; null when it cannot be told. */
  readonly pValue: number | null;
  /** Greatest Youden index that chance orders reach at the confidence level; null when it cannot be told. */
  readonly chanceYouden: number | null;
  readonly blockDays: number;
  readonly statement: string;
}

export interface DegradedDay {
  readonly degraded: boolean;
  /** Greatest Kp of the day; NaN when not known. */
  readonly kpMax: number;
}

/** Degraded days below this say nothing of the share that a threshold catches. */
const FEWEST_DEGRADED = 3;

/**
 * How well the greatest Kp of a day would have told degraded days, threshold by threshold. Whether any threshold helps
 * is judged by the best one against the best ones of chance orders of the days, moved in blocks, so that the search for
 * it is allowed for. The degraded flags should not have been made with Kp in view.
 * @param days in their order
 * @throws RangeError for impossible options
 */
export function thresholdRule(days: readonly DegradedDay[], options: AssociationOptions): ThresholdRule {
  const known = days.filter(({ kpMax }) => !Number.isNaN(kpMax));
  const n = known.length;
  const flags = Float64Array.from(known, ({ degraded }) => (degraded ? 1 : 0));
  const kp = Float64Array.from(known, ({ kpMax }) => kpMax);
  const ranks = [centredRanks(flags), centredRanks(kp)] as const;
  const { random, permutations, confidence, blockDays } = resolveAssociation(options, n, ranks);
  const degradedDays = sum(flags);
  const levels = [...new Set(kp)].sort((a, b) => a - b).slice(1);
  const thresholds = levels.map((kpFrom) => thresholdAt(kpFrom, known, confidence));
  const common = { days: n, leftOut: days.length - n, degradedDays, thresholds, blockDays };
  const untold = { ...common, best: null, pValue: null, chanceYouden: null };
  const goodDays = n - degradedDays;
  if (levels.length === 0 || degradedDays === 0 || goodDays === 0) {
    const why =
      n === 0
        ? 'Kp is known for none of them'
        : levels.length === 0
          ? 'the greatest Kp is the same on all of them'
          : degradedDays === 0
            ? 'none of them was degraded'
            : 'all of them were degraded';
    return { ...untold, statement: `No threshold of Kp can be judged from these days: ${why}.` };
  }
  const best = thresholds.reduce((a, b) => (b.youden! >= a.youden! - TIE ? b : a));
  const what = `The best threshold, Kp ${best.kpFrom}, catches ${best.caught.count} of ${degradedDays} degraded days and flags ${best.falseAlarms.count} of ${goodDays} others`;
  if (n < FEWEST_DAYS || n < FEWEST_BLOCKS * blockDays || degradedDays < FEWEST_DEGRADED) {
    const few =
      degradedDays < FEWEST_DEGRADED
        ? `${degradedDays} degraded of ${n}, where ${FEWEST_DEGRADED} are needed`
        : `${n} days, where ${Math.max(FEWEST_DAYS, FEWEST_BLOCKS * blockDays)} are needed`;
    return {
      ...common,
      best,
      pValue: null,
      chanceYouden: null,
      statement: `${what}. These are too few days to tell it from chance: ${few}.`,
    };
  }
  const byKp = [...kp.keys()].sort((a, b) => kp[b]! - kp[a]!);
  const chance = new Float64Array(permutations);
  for (let k = 0; k < permutations; k++)
    chance[k] = bestYouden(flags, kp, byKp, blockOrder(n, blockDays, random), degradedDays);
  chance.sort();
  const pValue =
    (1 + chance.reduce((count, value) => count + (value >= best.youden! - TIE ? 1 : 0), 0)) /
    (1 + permutations);
  const chanceYouden = chance[Math.min(permutations - 1, Math.ceil(confidence * (permutations + 1)) - 1)]!;
  const statement =
    pValue <= 1 - confidence
      ? `${what}; a chance order of the days does as well in ${percent(pValue)} of cases. High Kp and degraded days went together here, which names no cause: days can be degraded at low Kp, and the errors themselves must go on being watched.`
      : `No threshold of Kp helps to tell degraded days here. ${what}, but a chance order of the days does as well in ${percent(pValue)} of cases. Rest no rule on Kp.`;
  return { ...common, best, pValue, chanceYouden, statement };
}

function thresholdAt(kpFrom: number, days: readonly DegradedDay[], confidence: number): KpThreshold {
  const shareOf = (degraded: boolean): DayShare => {
    const kind = days.filter((day) => day.degraded === degraded);
    return dayShare(kind.filter(({ kpMax }) => kpMax >= kpFrom).length, kind.length, confidence);
  };
  const [caught, falseAlarms] = [shareOf(true), shareOf(false)];
  const youden =
    caught.estimate === null || falseAlarms.estimate === null ? null : caught.estimate - falseAlarms.estimate;
  return { kpFrom, flaggedDays: caught.count + falseAlarms.count, caught, falseAlarms, youden };
}

/** Exact interval of a share (Clopper & Pearson 1934). */
function dayShare(count: number, of: number, confidence: number): DayShare {
  if (of === 0) return { count, of, estimate: null, low: null, high: null };
  const tail = (1 - confidence) / 2;
  return {
    count,
    of,
    estimate: count / of,
    low: count === 0 ? 0 : betaQuantile(tail, count, of - count + 1),
    high: count === of ? 1 : betaQuantile(1 - tail, count + 1, of - count),
  };
}

/** Greatest Youden index over all thresholds when the flags stand in another order. Hot loop. */
function bestYouden(
  flags: Float64Array,
  kp: Float64Array,
  byKp: readonly number[],
  order: Int32Array,
  degradedDays: number,
): number {
  const n = byKp.length;
  let [caught, alarms, best] = [0, 0, Number.NEGATIVE_INFINITY];
  for (let i = 0; i < n - 1; i++) {
    const day = byKp[i]!;
    const flag = flags[order[day]!]!;
    caught += flag;
    alarms += 1 - flag;
    // a threshold lies only between different values
    if (kp[byKp[i + 1]!] !== kp[day])
      best = Math.max(best, caught / degradedDays - alarms / (n - degradedDays));
  }
  return best;
}
