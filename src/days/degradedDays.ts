import type { DayEstimate } from './dayEstimates.js';

/** The share of days named wrongly, among all that are named, that must not be exceeded. */
export const FALSE_SHARE = 0.1;
/**
 * What the posterior must promise for that. It takes constant, ppm and the worth of a shot for known, so that it is too
 * sure: of simulated campaigns of 60 days 9 to 11 % of the days named are wrong where it promises 10 %, and 7 to 8 %
 * where it promises this (docs/evidence-days.md).
 */
const PROMISED_SHARE = 0.08;
/** A weekend between two days of work does not end an event. */
const LONGEST_GAP_DAYS = 3;
const DAY_MS = 86_400_000;

/**
 * The largest set of days whose mean probability of being ordinary is at most 8 %: Bayesian false discovery rate
 * (Newton et al. 2004; from memory), chosen so that at most 10 % are named wrongly.
 * @param promisedShare other than 8 %
 * @returns names in order
 */
export function degradedDays(days: readonly DayEstimate[], promisedShare: number = PROMISED_SHARE): string[] {
  const sorted = [...days].sort(
    (a, b) => b.probabilityDegraded - a.probabilityDegraded || (a.day < b.day ? -1 : 1),
  );
  let [ordinary, named] = [0, 0];
  sorted.forEach(({ probabilityDegraded }, k) => {
    ordinary += 1 - probabilityDegraded;
    if (ordinary <= promisedShare * (k + 1)) named = k + 1;
  });
  return sorted
    .slice(0, named)
    .map(({ day }) => day)
    .sort();
}

/** Degraded days in a row, which most likely have one cause. */
export interface DegradedEvent {
  readonly from: string;
  readonly to: string;
  readonly days: readonly string[];
}

/**
 * Groups degraded days that follow each other: no ordinary day of work lies between, and no more than a weekend.
 * @param days all days in order
 */
export function degradedEvents(days: readonly string[], degraded: readonly string[]): DegradedEvent[] {
  const bad = new Set(degraded);
  const runs: string[][] = [];
  let previous: string | null = null;
  for (const day of days) {
    if (bad.has(day)) {
      if (previous !== null && bad.has(previous) && near(previous, day)) runs.at(-1)!.push(day);
      else runs.push([day]);
    }
    previous = day;
  }
  return runs.map((run) => ({ from: run[0]!, to: run.at(-1)!, days: run }));
}

/** Whether two days lie close by the calendar; names that are no dates are close when they are neighbours. */
export function near(day: string, next: string): boolean {
  const gap = (Date.parse(next) - Date.parse(day)) / DAY_MS;
  return !(gap > LONGEST_GAP_DAYS);
}
