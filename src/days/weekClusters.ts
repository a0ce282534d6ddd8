import type { ErrorsInput } from '../errors/index.js';
import { clusterTerms, covariance, type ErrorModel, type FitData } from '../fit/index.js';
import { type Message, message } from '../logs/index.js';
import type { DayEstimate } from './dayEstimates.js';
import { near } from './degradedDays.js';
import { fittedData, varianceOf } from './fittedSpread.js';

/** Weeks replace days as clusters when they widen the error of the ppm by so much, and there are so many. */
const WIDER = 1.25;
const FEWEST_WEEKS = 20;
const FEWEST_PAIRS = 10;
const DAY_MS = 86_400_000;
/** 1970-01-01 was a Thursday. */
const MONDAY_OFFSET_DAYS = 3;

/** Whether days that follow each other are alike. */
export interface DayDependence {
  /** What the ppm should be clustered by. */
  readonly cluster: 'day' | 'week';
  readonly weeks: number;
  /** Standard error of b² by weeks over that by days; null when the days are no dates, or their weeks too few. */
  readonly standardErrorRatio: number | null;
  /** Correlation of the log factors of neighbouring days; null with fewer than 10 pairs. */
  readonly lagOneCorrelation: number | null;
  readonly pairs: number;
  readonly notes: readonly Message[];
}

/**
 * Compares day and week clusters, and tells the correlation of neighbouring days.
 * @param days of the day model; empty where it could not judge
 * @throws InputError when a column of the fit is missing
 */
export function dayDependence(
  errors: ErrorsInput,
  model: ErrorModel,
  days: readonly DayEstimate[],
  weights?: Float64Array,
): DayDependence {
  const { A, B } = varianceOf(model);
  return dayDependenceOf(fittedData(errors, model, weights), A, B, days);
}

/** @param A,B unconstrained estimates, mm² and ppm² */
export function dayDependenceOf(
  data: FitData,
  A: number,
  B: number,
  days: readonly DayEstimate[],
): DayDependence {
  // A fit that cannot judge days may have no distance term at all: there is no slope to cluster.
  if (days.length === 0) return NOT_COMPARED;
  const weekNames = data.day.map(weekOf);
  const dated = weekNames.every((week) => week !== null);
  const weeks = dated ? new Set(weekNames).size : 0;
  const standardErrorRatio =
    weeks < 2
      ? null
      : Math.sqrt(slopeVariance(data, weekNames as string[], A, B) / slopeVariance(data, data.day, A, B));
  const cluster =
    weeks >= FEWEST_WEEKS && standardErrorRatio !== null && standardErrorRatio > WIDER ? 'week' : 'day';
  const { correlation, pairs } = lagOne(days);
  return {
    cluster,
    weeks,
    standardErrorRatio,
    lagOneCorrelation: pairs < FEWEST_PAIRS ? null : correlation,
    pairs,
    notes:
      cluster === 'week' ? [weekNote(standardErrorRatio!, pairs < FEWEST_PAIRS ? null : correlation)] : [],
  };
}

const NOT_COMPARED: DayDependence = {
  cluster: 'day',
  weeks: 0,
  standardErrorRatio: null,
  lagOneCorrelation: null,
  pairs: 0,
  notes: [],
};

const slopeVariance = (data: FitData, clusters: readonly string[], A: number, B: number): number =>
  covariance(clusterTerms(data, clusters, A, B, 'root-sum-square'), 'CR3')[2];

/** The Monday of a day's week, YYYY-MM-DD; null for a name that is no date. */
export function weekOf(day: string): string | null {
  const ms = Date.parse(`${day}T00:00:00Z`);
  if (!/^\d{4}-\d\d-\d\d$/.test(day) || Number.isNaN(ms)) return null;
  const sinceMonday = (((ms / DAY_MS + MONDAY_OFFSET_DAYS) % 7) + 7) % 7;
  return new Date(ms - sinceMonday * DAY_MS).toISOString().slice(0, 10);
}

function lagOne(days: readonly DayEstimate[]): { correlation: number; pairs: number } {
  const logs = days.map(({ factor }) => Math.log(factor.estimate));
  const mean = logs.reduce((a, b) => a + b, 0) / logs.length;
  const square = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / logs.length;
  let [total, pairs] = [0, 0];
  for (let d = 1; d < days.length; d++) {
    if (!near(days[d - 1]!.day, days[d]!.day)) continue;
    total += (logs[d]! - mean) * (logs[d - 1]! - mean);
    pairs += 1;
  }
  return { correlation: square > 0 && pairs > 0 ? total / pairs / square : 0, pairs };
}

function weekNote(ratio: number, correlation: number | null): Message {
  const alike =
    correlation === null ? '' : ` (correlation of the log factors of neighbours ${correlation.toFixed(2)})`;
  return message(
    'warning',
    'days-alike',
    `Days that follow each other are alike${alike}: by weeks the error of the ppm is ${ratio.toFixed(2)} times that by days, so the intervals by days are too narrow. Take the limits of the ppm this much wider.`,
  );
}
