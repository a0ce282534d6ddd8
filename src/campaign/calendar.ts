import { normalDeviates, type Random, shuffle, uniformBetween } from '../stats/index.js';
import { wholeBetween } from './draw.js';
import type { BadDayOptions, CampaignSettings } from './options.js';

/** A working day of a campaign. */
export interface CampaignDay {
  /** Local calendar day, `YYYY-MM-DD`. */
  readonly day: string;
  /** Its local midnight, UTC milliseconds. */
  readonly midnightMs: number;
  /** What the ppm is multiplied by on this day, without the daily course. */
  readonly factor: number;
  /** Whether the day belongs to a run of bad days. */
  readonly bad: boolean;
}

const DAY_MS = 86_400_000;

/** The working days one after the other, with their factors; `random` is used for the factors alone. */
export function campaignDays(settings: CampaignSettings, random: Random): CampaignDay[] {
  const normal = normalDeviates(random);
  const ordinary = Array.from({ length: settings.days }, () => Math.exp(settings.dayFactorLogSd * normal()));
  const extra = badDayFactors(settings, random);
  return workingDates(settings).map((utcMidnightMs, i) => ({
    day: new Date(utcMidnightMs).toISOString().slice(0, 10),
    midnightMs: utcMidnightMs - settings.utcOffsetHours * 3_600_000,
    factor: ordinary[i]! * (extra.get(i) ?? 1),
    bad: extra.has(i),
  }));
}

function workingDates(settings: CampaignSettings): number[] {
  const dates: number[] = [];
  for (let ms = Date.parse(`${settings.startDate}T00:00:00Z`); dates.length < settings.days; ms += DAY_MS) {
    const weekday = new Date(ms).getUTCDay();
    if (!settings.weekdaysOnly || (weekday !== 0 && weekday !== 6)) dates.push(ms);
  }
  return dates;
}

/** Factors of the bad days by index; runs do not touch, and every arrangement of them is possible. */
function badDayFactors(settings: CampaignSettings, random: Random): Map<number, number> {
  const factors = new Map<number, number>();
  if (settings.badDays === null) return factors;
  const { singles, factor } = settings.badDays;
  const given = runLengths(settings.badDays);
  const lengths = singles === 0 ? given : shuffle(given, random);
  const spare = settings.days - daysNeeded(lengths);
  const gaps = lengths.map(() => wholeBetween(random, 0, spare)).sort((a, b) => a - b);
  let taken = 0;
  for (const [run, gap] of gaps.entries()) {
    for (let i = 0; i < lengths[run]!; i++)
      factors.set(gap + taken + i, uniformBetween(random, factor.from, factor.to));
    taken += lengths[run]! + 1;
  }
  return factors;
}

/** The lengths of all runs of bad days, single days among them. */
export function runLengths({ runs, runLength, singles }: BadDayOptions): number[] {
  return [...new Array<number>(runs).fill(runLength), ...new Array<number>(singles).fill(1)];
}

/** The fewest days in which the runs fit with one ordinary day between two of them. */
export function daysNeeded(lengths: readonly number[]): number {
  return lengths.reduce((sum, length) => sum + length, 0) + Math.max(0, lengths.length - 1);
}
