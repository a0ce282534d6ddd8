import type { FitData } from '../fit/index.js';
import { leastSquares, type Random } from '../stats/index.js';
import { dayIndex } from './dayIndex.js';
import { flippedScores } from './flippedScores.js';
import { hourScores } from './hourScores.js';

/** With less of the day at work a daily course is nearly the same as a level. */
const ONE_FROM_HOURS = 12;
const TWO_FROM_HOURS = 20;
const MAX_ITERATIONS = 100;
const STEPS_A_DAY = 96;

/** A smooth daily course: log b(t) = level + Σ c_k cos(2π k t/24) + s_k sin(2π k t/24). */
export interface HourHarmonics {
  readonly count: 1 | 2;
  /** c_1, s_1, and with two harmonics c_2, s_2. */
  readonly coefficients: readonly number[];
  /** Largest over smallest ppm of the course within the day. */
  readonly ratio: number;
  /** Solar hour of the largest ppm. */
  readonly highestHour: number;
  /** Test that there is no such course, by flipped signs of days. */
  readonly pValue: number;
}

/**
 * The daily course by one harmonic when the shots span 12 hours, two from 20 hours on; null below, or when the data do
 * not settle on one.
 * @param hours solar time of every row
 */
export function hourHarmonics(
  data: FitData,
  hours: Float64Array,
  spanHours: number,
  A: number,
  B: number,
  factors: Float64Array,
  random: Random,
): HourHarmonics | null {
  if (spanHours < ONE_FROM_HOURS) return null;
  const count = spanHours < TWO_FROM_HOURS ? 1 : 2;
  const courses = harmonicCourses(hours, count);
  const coefficients = fitCourse(data, A, B, factors, courses);
  if (coefficients === null) return null;
  const clock = Float64Array.from({ length: STEPS_A_DAY }, (_, k) => (24 * k) / STEPS_A_DAY);
  const shape = harmonicCourses(clock, count);
  const logs = clock.map((_, k) => shape.reduce((sum, course, c) => sum + coefficients[c]! * course[k]!, 0));
  const highest = logs.reduce((a, b) => Math.max(a, b));
  const lowest = logs.reduce((a, b) => Math.min(a, b));
  return {
    count,
    coefficients,
    ratio: Math.exp(highest - lowest),
    highestHour: clock[logs.indexOf(highest)]!,
    pValue: flippedScores(hourScores(data, A, B, factors, courses), random).pValue,
  };
}

function harmonicCourses(hours: Float64Array, count: 1 | 2): Float64Array[] {
  const angle = (hour: number, k: number): number => (2 * Math.PI * k * hour) / 24;
  return Array.from({ length: count }, (_, k) => [
    hours.map((hour) => Math.cos(angle(hour, k + 1))),
    hours.map((hour) => Math.sin(angle(hour, k + 1))),
  ]).flat();
}

/** Fisher scoring of μ = A + B f_d e^2η l, η = level + Σ c z, with A, B and the day factors held. */
function fitCourse(
  { y, l, w, day }: FitData,
  A: number,
  B: number,
  factors: Float64Array,
  courses: readonly Float64Array[],
): number[] | null {
  const { dayOf } = dayIndex(day);
  const designs = [new Float64Array(y.length).fill(1), ...courses];
  const columns = designs.map(() => new Float64Array(y.length));
  const [rest, weights] = [new Float64Array(y.length), new Float64Array(y.length)];
  const eta = designs.map(() => 0);
  for (let k = 0; k < MAX_ITERATIONS; k++) {
    for (let i = 0; i < y.length; i++) {
      const log = eta.reduce((sum, value, c) => sum + value * designs[c]![i]!, 0);
      const part = B * factors[dayOf[i]!]! * l[i]! * Math.exp(2 * log);
      const mu = A + part;
      rest[i] = y[i]! - mu;
      weights[i] = w[i]! / mu ** 2;
      designs.forEach((design, c) => {
        columns[c]![i] = 2 * part * design[i]!;
      });
    }
    const step = leastSquares(columns, rest, weights).coefficients;
    const longest = step.reduce((a, b) => Math.max(a, Math.abs(b)), 0);
    // A first step can overshoot by far on the log scale.
    const scale = longest > 0.5 ? 0.5 / longest : 1;
    step.forEach((value, c) => {
      eta[c]! += scale * value;
    });
    if (longest < 1e-10) return eta.slice(1);
  }
  return null;
}
