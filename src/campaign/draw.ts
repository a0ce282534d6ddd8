import type { Random } from '../stats/index.js';

/** A whole number, each from `from` to `to` (both included) equally likely. */
export function wholeBetween(random: Random, from: number, to: number): number {
  return from + Math.floor(random() * (to - from + 1));
}

/** A number whose log is uniform between those of `from` and `to`, both above 0. */
export function logBetween(random: Random, from: number, to: number): number {
  return from * Math.exp(random() * Math.log(to / from));
}
