import { normalDeviates, type Random } from '../stats/index.js';
import { logBetween } from './draw.js';
import type { Axes, WrongFixOptions } from './options.js';
import type { PlannedVisit } from './schedule.js';
import { shareAtKm } from './shareAtKm.js';

/**
 * The vectors that wrong integers add to occupations, mm, by index into `visits`, which are in time order.
 * A burst starts with the share of its distance over the mean burst and then spoils the rover's next
 * occupations of that day with the same vector, each with probability 1 − 1/meanBurst.
 */
export function wrongFixVectors(
  options: WrongFixOptions,
  visits: readonly PlannedVisit[],
  random: Random,
): Map<number, Axes> {
  const normal = normalDeviates(random);
  const vectors = new Map<number, Axes>();
  const running = new Map<string, Axes>();
  for (const [i, { dayIndex, rover, mark }] of visits.entries()) {
    const key = `${dayIndex} ${rover}`;
    const goesOn = running.has(key) && random() < 1 - 1 / options.meanBurst;
    const starts = random() < shareAtKm(options, mark.baselineKm) / options.meanBurst;
    if (!goesOn) running.delete(key);
    if (!goesOn && starts)
      running.set(key, randomVector(logBetween(random, options.shortestMm, options.longestMm), normal));
    const vector = running.get(key);
    if (vector !== undefined) vectors.set(i, vector);
  }
  return vectors;
}

/** A vector of given length in a direction uniform on the sphere. */
function randomVector(lengthMm: number, normal: () => number): Axes {
  const [east, north, up] = [normal(), normal(), normal()];
  const scale = lengthMm / Math.hypot(east, north, up);
  return { east: east * scale, north: north * scale, up: up * scale };
}
