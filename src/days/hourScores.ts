import type { FitData } from '../fit/index.js';
import { invertSymmetric2 } from '../stats/index.js';
import { dayIndex } from './dayIndex.js';

/** Pseudo-observations that draw a day's factor toward 1, and the tempering of what the day itself says. */
const PRIOR_COUNT = 8;
const TEMPERING = 0.5;
const LEAST_FACTOR = 0.15;
const LARGEST_FACTOR = 50;

/**
 * A factor on the square of each day's ppm, drawn toward 1; one step, so that hours are compared within days.
 * @returns one factor for each day in order
 */
export function hourDayFactors({ y, l, w, day, components }: FitData, A: number, B: number): Float64Array {
  const { days, dayOf } = dayIndex(day);
  const [tops, bottoms] = [new Float64Array(days.length), new Float64Array(days.length)];
  const tempering = TEMPERING * components.length;
  for (let i = 0; i < y.length; i++) {
    const part = B * l[i]!;
    const information = tempering * w[i]! * (part / (A + part)) ** 2;
    tops[dayOf[i]!]! += (information * (y[i]! - A)) / part;
    bottoms[dayOf[i]!]! += information;
  }
  return tops.map((top, d) =>
    Math.min(LARGEST_FACTOR, Math.max(LEAST_FACTOR, (PRIOR_COUNT + top) / (PRIOR_COUNT + bottoms[d]!))),
  );
}

/**
 * Scores of each day for courses of the ppm within the day, freed of constant and ppm: μ = A + B f_d l, tested for
 * factors e^2γz on the second part.
 * @param factors of each day
 * @param courses values z of every row, one array a course (an indicator of a class of hours, a cosine, …)
 * @returns one array a course, with one value a day
 */
export function hourScores(
  { y, l, w, day }: FitData,
  A: number,
  B: number,
  factors: Float64Array,
  courses: readonly Float64Array[],
): Float64Array[] {
  const { days, dayOf } = dayIndex(day);
  const count = days.length;
  const [constant, slope] = [new Float64Array(count), new Float64Array(count)];
  const own = courses.map(() => new Float64Array(count));
  const cross = courses.map(() => [0, 0] as [number, number]);
  let [h11, h12, h22] = [0, 0, 0];
  for (let i = 0; i < y.length; i++) {
    const d = dayOf[i]!;
    const x = factors[d]! * l[i]!;
    const mu = A + B * x;
    const v = w[i]! / mu ** 2;
    const score = v * (y[i]! - mu);
    constant[d]! += score;
    slope[d]! += score * x;
    h11 += v;
    h12 += v * x;
    h22 += v * x * x;
    courses.forEach((course, c) => {
      const z = B * x * course[i]!;
      own[c]![d]! += score * z;
      cross[c]![0] += v * z;
      cross[c]![1] += v * z * x;
    });
  }
  const [i11, i12, i22] = invertSymmetric2([h11, h12, h22]);
  return own.map((scores, c) => {
    const [c1, c2] = cross[c]!;
    const [p1, p2] = [c1 * i11 + c2 * i12, c1 * i12 + c2 * i22];
    return scores.map((score, d) => score - p1 * constant[d]! - p2 * slope[d]!);
  });
}
