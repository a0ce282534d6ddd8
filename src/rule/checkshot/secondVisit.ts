import { type ErrorsInput, groupIndices } from '../../errors/index.js';
import type { Component, ErrorModel, EstimateWithLimits } from '../../fit/index.js';
import type { Random } from '../../stats/index.js';
import { quantile } from '../../stats/index.js';
import { type VisitPair, visitPairs } from './visitPairs.js';

/**
 * Correlation of two visits: (1 - s) cA exp(-t/tA) + s cB exp(-t/tB), t the gap in minutes, s the share of the variance
 * that comes from the distance.
 */
export interface VisitCorrelation {
  readonly A: number;
  readonly B: number;
  readonly nearStrength: number;
  readonly nearMinutes: number;
  readonly farStrength: number;
  readonly farMinutes: number;
}

/** What a second visit on the same day gains. */
export interface SecondVisit {
  readonly baselineKm: number;
  readonly minutes: number;
  /** Error of the mean of both visits over that of one: 0.71 if they were independent, 1 if the second gained nothing. */
  readonly factor: EstimateWithLimits;
  /** Error of the difference of both over that of one: 1.41 if they were independent, 0 if they were the same. */
  readonly differenceFactor: EstimateWithLimits;
}

export interface SecondVisits {
  readonly component: Component;
  readonly pairs: number;
  /** Pairs where the distance carries half of the variance or more. */
  readonly farPairs: number;
  readonly days: number;
  /** Null where the visits are too few to tell. */
  readonly correlation: VisitCorrelation | null;
  readonly visits: readonly SecondVisit[];
  readonly sentence: string;
}

export interface SecondVisitOptions {
  readonly random: Random;
  readonly weights?: Float64Array | undefined;
  /** Default 10, 20, 45, 90 and 180 minutes. */
  readonly minutes?: readonly number[] | undefined;
  /** Default 1, 5 and 10 km. */
  readonly lengthsKm?: readonly number[] | undefined;
  /** Resamples of the days for the limits; default 399. */
  readonly resamples?: number | undefined;
}

const NEAR_MINUTES = [5, 10, 20, 40];
const FAR_MINUTES = [20, 40, 80, 160];
const FEWEST_PAIRS = 30;
const FEWEST_DAYS = 15;
const FEWEST_FAR = 15;
const FAR_SHARE = 0.5;

/**
 * How much the mean of two visits to a point some minutes apart is better than one. The error of the base's coordinates
 * is in both and is reduced by no gap.
 * @param errors with `mark` and `startMs`
 * @throws InputError when a column is missing, or the model is not of the form root-sum-square
 */
export function secondVisits(
  errors: ErrorsInput,
  model: ErrorModel,
  options: SecondVisitOptions,
): SecondVisits {
  const {
    minutes = [10, 20, 45, 90, 180],
    lengthsKm = [1, 5, 10],
    resamples = 399,
    random,
    weights,
  } = options;
  const pairs = visitPairs(errors, model, weights);
  const byDay = [...groupIndices(pairs.map(({ day }) => day))].sort(([a], [b]) => (a < b ? -1 : 1));
  const farPairs = pairs.filter(({ farShare }) => farShare >= FAR_SHARE).length;
  const common = { component: model.component, pairs: pairs.length, farPairs, days: byDay.length };
  const { displayA: A, displayB: B } = model.variance!;
  if (pairs.length < FEWEST_PAIRS || byDay.length < FEWEST_DAYS) {
    return {
      ...common,
      correlation: null,
      visits: [],
      sentence: `The visits are too few to tell what a second one gains: ${pairs.length} pairs on ${byDay.length} days, it needs ${FEWEST_PAIRS} on ${FEWEST_DAYS}. Visit some marks twice a day.`,
    };
  }
  const sums = byDay.map(([, members]) => daySums(members.map((k) => pairs[k]!)));
  const solve = (list: readonly Float64Array[]): VisitCorrelation => ({ A, B, ...bestFit(list) });
  const found = solve(sums);
  const drawn = Array.from({ length: resamples }, () =>
    solve(sums.map(() => sums[Math.floor(random() * sums.length)]!)),
  );
  const visits = lengthsKm
    .filter((km) => farPairs >= FEWEST_FAR || farShareAt(found, km) < FAR_SHARE)
    .flatMap((baselineKm) =>
      minutes.map((gap): SecondVisit => {
        const limits = (of: typeof meanFactor): EstimateWithLimits => {
          const values = drawn.map((each) => of(each, baselineKm, gap));
          return {
            estimate: of(found, baselineKm, gap),
            low: quantile(values, 0.025),
            high: quantile(values, 0.975),
          };
        };
        return {
          baselineKm,
          minutes: gap,
          factor: limits(meanFactor),
          differenceFactor: limits(differenceFactor),
        };
      }),
    );
  return { ...common, correlation: found, visits, sentence: sentenceOf(visits, farPairs) };
}

const farShareAt = ({ A, B }: VisitCorrelation, km: number): number => (B * km * km) / (A + B * km * km);

/** Correlation of two visits at a length, so many minutes apart. */
export function visitCorrelation(correlation: VisitCorrelation, km: number, minutes: number): number {
  const { nearStrength, nearMinutes, farStrength, farMinutes } = correlation;
  const s = farShareAt(correlation, km);
  return (
    (1 - s) * nearStrength * Math.exp(-minutes / nearMinutes) +
    s * farStrength * Math.exp(-minutes / farMinutes)
  );
}

/** Error of the mean of two over that of one: √((1 + ρ)/2). */
const meanFactor = (correlation: VisitCorrelation, km: number, minutes: number): number =>
  Math.sqrt((1 + visitCorrelation(correlation, km, minutes)) / 2);

/** Error of the difference of two over that of one: √(2(1 - ρ)). */
const differenceFactor = (correlation: VisitCorrelation, km: number, minutes: number): number =>
  Math.sqrt(2 * (1 - visitCorrelation(correlation, km, minutes)));

/** Of each pair of time constants Σ aa, ab, bb, az, bz, and Σ zz, with a and b the two decays and z the product. */
function daySums(pairs: readonly VisitPair[]): Float64Array {
  const sums = new Float64Array(NEAR_MINUTES.length * FAR_MINUTES.length * 6);
  for (const { minutes, product, farShare } of pairs) {
    let at = 0;
    for (const near of NEAR_MINUTES) {
      const a = (1 - farShare) * Math.exp(-minutes / near);
      for (const far of FAR_MINUTES) {
        const b = farShare * Math.exp(-minutes / far);
        [a * a, a * b, b * b, a * product, b * product, product * product].forEach((value, k) => {
          sums[at + k]! += value;
        });
        at += 6;
      }
    }
  }
  return sums;
}

/** Least squares over the grid of time constants, strengths kept in [0, 1]. */
function bestFit(days: readonly Float64Array[]): Omit<VisitCorrelation, 'A' | 'B'> {
  const sums = new Float64Array(days[0]!.length);
  for (const day of days) for (let k = 0; k < sums.length; k++) sums[k]! += day[k]!;
  const clip = (value: number): number => (Number.isFinite(value) ? Math.min(1, Math.max(0, value)) : 0);
  let best = { nearStrength: 0, nearMinutes: 5, farStrength: 0, farMinutes: 20 };
  let least = Number.POSITIVE_INFINITY;
  NEAR_MINUTES.forEach((nearMinutes, i) => {
    FAR_MINUTES.forEach((farMinutes, j) => {
      const at = (i * FAR_MINUTES.length + j) * 6;
      const [aa, ab, bb, az, bz, zz] = sums.subarray(at, at + 6) as unknown as [
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const determinant = aa * bb - ab * ab;
      let near = clip((az * bb - bz * ab) / determinant);
      let far = clip((bz - near * ab) / bb);
      near = clip((az - far * ab) / aa);
      far = clip((bz - near * ab) / bb);
      const rest = zz - 2 * (near * az + far * bz) + near * near * aa + 2 * near * far * ab + far * far * bb;
      if (rest >= least) return;
      least = rest;
      best = { nearStrength: near, nearMinutes, farStrength: far, farMinutes };
    });
  });
  return best;
}

function sentenceOf(visits: readonly SecondVisit[], farPairs: number): string {
  const far = farPairs >= FEWEST_FAR ? '' : 'Pairs far from the base are too few to tell of them.';
  const shown = visits[Math.floor(visits.length / 2)];
  if (shown === undefined) return far;
  const { baselineKm, minutes, factor } = shown;
  return `The mean of two visits ${minutes} minutes apart has ${factor.estimate!.toFixed(2)} times the error of one at ${Number(baselineKm.toFixed(1))} km (0.71 if they were independent); an error of the base's coordinates is in both.${far === '' ? '' : ` ${far}`}`;
}
