import { normalDeviates, type Random, uniformBetween } from '../stats/index.js';
import { wholeBetween } from './draw.js';
import type { CampaignSettings } from './options.js';

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
  const { runs, runLength, factor } = settings.badDays;
  const spare = settings.days - daysNeeded(runs, runLength);
  const gaps = Array.from({ length: runs }, () => wholeBetween(random, 0, spare)).sort((a, b) => a - b);
  for (const [run, gap] of gaps.entries())
    for (let i = 0; i < runLength; i++)
      factors.set(gap + run * (runLength + 1) + i, uniformBetween(random, factor.from, factor.to));
  return factors;
}

/** The fewest days in which so many runs fit with one ordinary day between two of them. */
export function daysNeeded(runs: number, runLength: number): number {
  return runs * runLength + Math.max(0, runs - 1);
}
