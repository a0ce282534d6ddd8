import { familyAdjusted, weightedQuantiles } from '../../days/index.js';
import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { axesOf, COMPONENT_COLUMNS, type Component } from '../../fit/index.js';
import type { MarkMean } from '../../split/index.js';
import { chiSquareCdf, median } from '../../stats/index.js';
import type { WatchBasis } from './watchBasis.js';

/** How far the mean error of a mark lies from that of the days that were fitted. */
export interface MarkShift {
  readonly component: Component;
  readonly mark: string;
  readonly base: string;
  readonly baselineKm: number;
  /** New days at the mark. */
  readonly days: number;
  /** East and north, or up, mm: less what all marks of the base have in common. */
  readonly shiftMm: readonly number[];
  /** Standard error of one axis, mm. */
  readonly seMm: number;
  /** Chance of as much without a move, for as many marks as were looked at (Holm 1979); null with too few days. */
  readonly pValue: number | null;
  readonly verdict: 'moved' | 'not shown to have moved' | 'too few days';
}

/** Fewer new days leave a mark to the weather of single days. */
const FEWEST_DAYS = 3;
/** With fewer marks of a base none is told from a move of the base. */
const FEWEST_COMMON = 4;
const LEVEL = 0.01;
/** Variance of a median over that of a mean, for many days of normal errors; for few days it is less. */
const OF_MEDIAN = Math.PI / 2;

/**
 * Marks that may have moved: the median over the new days of a mark's mean error of the day, less the mean over the days
 * fitted, against the variance that the model gives for days to come. A day counts as one shot, however many it holds,
 * since shots of a day share setup and sky.
 * @param errors new ones; days that the model was fitted to are left out
 * @param earlier means of the days fitted
 * @param weights one for each error; of those below one half nothing is used
 * @returns marks known from the same base, nearest first
 * @throws InputError when a column is missing
 */
export function markShifts(
  errors: ErrorsInput,
  earlier: readonly MarkMean[],
  basis: WatchBasis,
  weights?: Float64Array,
): MarkShift[] {
  const { component, lastDay } = basis;
  const columns = errorColumns(errors);
  const [days, marks, bases] = (['day', 'mark', 'base'] as const).map((name) =>
    columns.texts(name, 'watching marks'),
  ) as [string[], string[], string[]];
  const axes = COMPONENT_COLUMNS[component];
  const values = axes.map((axis) => columns.numbers(axis, 'watching marks'));
  const rows = Array.from(days.keys()).filter(
    (i) =>
      days[i]! > lastDay && (weights?.[i] ?? 1) >= 0.5 && values.every((column) => !Number.isNaN(column[i]!)),
  );
  const places = groupIndices(rows.map((i) => `${marks[i]}\u0000${bases[i]}`));
  const found = earlier.flatMap((known): MarkShift[] => {
    const means = axes.map((axis) => known[axis]);
    const members = places.get(`${known.mark}\u0000${known.base}`);
    if (members === undefined || means.some((mean) => mean === null)) return [];
    const byDay = [...groupIndices(members.map((k) => days[rows[k]!]!)).values()];
    const shiftMm = values.map((column, axis) => {
      const daily = byDay.map((shots) => meanOf(shots.map((k) => column[rows[members[k]!]!]!)));
      return median(daily) - means[axis]!;
    });
    const variance = varianceAt(basis, known.baselineKm);
    const seMm = Math.sqrt(OF_MEDIAN * (variance / byDay.length) + variance / known.days);
    const { mark, base, baselineKm } = known;
    const verdict = 'too few days';
    return [{ component, mark, base, baselineKm, days: byDay.length, shiftMm, seMm, pValue: null, verdict }];
  });
  return judged(lessCommon(found), axes.length).sort((a, b) => a.baselineKm - b.baselineKm);
}

const meanOf = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

/** Variance of one axis on days to come, mm². */
function varianceAt({ A, B, logFactors, probabilities, component }: WatchBasis, baselineKm: number): number {
  const factor = logFactors.reduce((sum, theta, k) => sum + probabilities[k]! * Math.exp(2 * theta), 0);
  return (A + B * factor * baselineKm ** 2) / axesOf(component);
}

/**
 * Takes out what the other marks of a base share: another setting of the base moves them all. Their median, each with the
 * inverse of its standard error as weight, has an error of its own, which is added.
 */
function lessCommon(shifts: readonly MarkShift[]): MarkShift[] {
  return shifts.map((shift) => {
    const others = shifts.filter((other) => other !== shift && other.base === shift.base);
    if (others.length + 1 < FEWEST_COMMON) return shift;
    const weights = Float64Array.from(others, ({ seMm }) => 1 / seMm);
    const shiftMm = shift.shiftMm.map((value, axis) => {
      const values = Float64Array.from(others, (other) => other.shiftMm[axis]!);
      return value - weightedMedian(values, weights);
    });
    const ofCommon = OF_MEDIAN / weights.reduce((sum, weight) => sum + weight ** 2, 0);
    return { ...shift, shiftMm, seMm: Math.sqrt(shift.seMm ** 2 + ofCommon) };
  });
}

/** The same from above and from below, where two values share the middle. */
function weightedMedian(values: Float64Array, weights: Float64Array): number {
  const [below] = weightedQuantiles(values, weights, [0.5]);
  const [above] = weightedQuantiles(
    values.map((value) => -value),
    weights,
    [0.5],
  );
  return (below! - above!) / 2;
}

function judged(shifts: readonly MarkShift[], axes: number): MarkShift[] {
  const enough = shifts.filter(({ days }) => days >= FEWEST_DAYS);
  const adjusted = familyAdjusted(
    enough.map(
      ({ shiftMm, seMm }) =>
        1 -
        chiSquareCdf(
          shiftMm.reduce((sum, value) => sum + (value / seMm) ** 2, 0),
          axes,
        ),
    ),
  );
  return shifts.map((shift) => {
    const k = enough.indexOf(shift);
    if (k < 0) return shift;
    const pValue = adjusted[k]!;
    return { ...shift, pValue, verdict: pValue < LEVEL ? 'moved' : 'not shown to have moved' };
  });
}
