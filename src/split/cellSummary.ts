import type { ErrorColumns } from '../errors/index.js';
import { quantile, sum } from '../stats/index.js';
import { clusteredMean, type Interval, rootMeanSquare } from './clusteredMean.js';

/** What is known of the occupations in one cell of a split. Lengths in km, errors in mm. */
export interface CellSummary {
  readonly occupations: number;
  readonly days: number;
  /** Root-mean-square baseline of the cell; NaN without occupations. */
  readonly baselineKm: number;
  /** Radial RMS with the limits of its day-clustered interval; null when no plan error is known. */
  readonly horizontalRms: Interval | null;
  readonly verticalRms: Interval | null;
  /** Radial errors that 68 % and 95 % of the occupations did not exceed; null when none is known. */
  readonly horizontal68: number | null;
  readonly horizontal95: number | null;
  /** The same of sizes of height errors. */
  readonly vertical68: number | null;
  readonly vertical95: number | null;
  /** Mean errors; NaN when not known. */
  readonly meanEast: number;
  readonly meanNorth: number;
  readonly meanUp: number;
  /** Day-clustered standard errors of the means; NaN with fewer than two days. */
  readonly seEast: number;
  readonly seNorth: number;
  readonly seUp: number;
  /**
   * Fewer than 10 occupations or 3 days: the figures describe these occupations and nothing more. In a split by day or
   * setup, whose cells are single days by their nature, the occupations alone count.
   */
  readonly tooFew: boolean;
}

const FEWEST_OCCUPATIONS = 10;
export const FEWEST_DAYS = 3;

/** The columns that a cell is summarised from. */
export interface ErrorValues {
  readonly east: Float64Array;
  readonly north: Float64Array;
  readonly up: Float64Array;
  readonly baselineKm: Float64Array;
  readonly days: readonly string[];
}

/** @throws InputError when a column is missing */
export function errorValues(columns: ErrorColumns, neededFor: string): ErrorValues {
  const numbers = (name: string): Float64Array => columns.numbers(name, neededFor);
  return {
    east: numbers('east'),
    north: numbers('north'),
    up: numbers('up'),
    baselineKm: numbers('baselineKm'),
    days: columns.texts('day', neededFor),
  };
}

/**
 * @param members rows of the cell; may be none
 * @param fewestDays days below which a cell holds too few
 */
export function cellSummary(
  { east, north, up, baselineKm, days }: ErrorValues,
  members: readonly number[],
  confidence: number,
  fewestDays: number = FEWEST_DAYS,
): CellSummary {
  const plan = members.filter((i) => !Number.isNaN(east[i]!) && !Number.isNaN(north[i]!));
  const heights = members.filter((i) => !Number.isNaN(up[i]!));
  const radial = plan.map((i) => Math.hypot(east[i]!, north[i]!));
  const sizes = heights.map((i) => Math.abs(up[i]!));
  const daysOf = (rows: readonly number[]): string[] => rows.map((i) => days[i]!);
  const rms = (values: readonly number[], rows: readonly number[]): Interval | null =>
    rootMeanSquare(
      values.map((value) => value * value),
      daysOf(rows),
      confidence,
    );
  const share = (values: readonly number[], p: number): number | null =>
    values.length === 0 ? null : quantile(values, p);
  const mean = (values: Float64Array, rows: readonly number[]) =>
    rows.length === 0
      ? { mean: Number.NaN, standardError: Number.NaN }
      : clusteredMean(
          rows.map((i) => values[i]!),
          daysOf(rows),
        );
  const [e, n, u] = [mean(east, plan), mean(north, plan), mean(up, heights)];
  const dayCount = new Set(daysOf(members)).size;
  return {
    occupations: members.length,
    days: dayCount,
    baselineKm:
      members.length === 0
        ? Number.NaN
        : Math.sqrt(sum(members.map((i) => baselineKm[i]! ** 2)) / members.length),
    horizontalRms: rms(radial, plan),
    verticalRms: rms(sizes, heights),
    horizontal68: share(radial, 0.68),
    horizontal95: share(radial, 0.95),
    vertical68: share(sizes, 0.68),
    vertical95: share(sizes, 0.95),
    meanEast: e.mean,
    meanNorth: n.mean,
    meanUp: u.mean,
    seEast: e.standardError,
    seNorth: n.standardError,
    seUp: u.standardError,
    tooFew: members.length < FEWEST_OCCUPATIONS || dayCount < fewestDays,
  };
}
