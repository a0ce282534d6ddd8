import { type Random, shuffle } from '../stats/index.js';
import type { CampaignDay } from './calendar.js';
import { wholeBetween } from './draw.js';
import type { CampaignMark } from './marks.js';
import type { CampaignBase, CampaignSettings } from './options.js';

/** A visit as planned: who goes to which mark when. */
export interface PlannedVisit {
  readonly dayIndex: number;
  readonly day: string;
  readonly crew: string;
  readonly rover: string;
  readonly base: string;
  /** As seen from the base. */
  readonly mark: CampaignMark;
  readonly setup: string;
  /** Second of the first fixed position, UTC milliseconds. */
  readonly startMs: number;
}

/** Starts of two visits of a rover lie at least this share of the mean spacing apart. */
export const SMALLEST_SPACING = 0.4;

/** A base on duty and the marks as seen from it. */
export interface BaseOnDuty {
  readonly base: CampaignBase;
  readonly marks: readonly CampaignMark[];
}

/** All planned visits in order of time (of rover names at equal times). */
export function planVisits(
  settings: CampaignSettings,
  days: readonly CampaignDay[],
  onDuty: (dayIndex: number) => BaseOnDuty,
  random: Random,
): PlannedVisit[] {
  const visits: PlannedVisit[] = [];
  for (const [dayIndex, day] of days.entries()) {
    const range = settings.habitual?.occupationsPerDay ?? settings.occupationsPerDay;
    const counts = dealOut(wholeBetween(random, range.from, range.to), settings.crews.length, random);
    const rovers = shuffle(settings.rovers, random);
    const { base, marks } = onDuty(dayIndex);
    for (const [i, crew] of settings.crews.entries()) {
      const stops = stopsOf(settings, marks, counts[i]!, random);
      const starts = startsMs(settings, day, stops.length, random);
      for (const [j, mark] of stops.entries()) {
        const startMs = starts[j]!;
        const setup = setupName(settings, base, day, startMs);
        visits.push({
          dayIndex,
          day: day.day,
          crew,
          rover: rovers[i]!,
          base: base.name,
          mark,
          setup,
          startMs,
        });
      }
    }
  }
  return visits.sort((a, b) => a.startMs - b.startMs || (a.rover < b.rover ? -1 : 1));
}

/** A day's visits shared out evenly; chance decides who gets the odd ones. */
function dealOut(visits: number, crews: number, random: Random): number[] {
  const even = Math.floor(visits / crews);
  return shuffle(
    Array.from({ length: crews }, (_, i) => even + (i < visits % crews ? 1 : 0)),
    random,
  );
}

function stopsOf(
  settings: CampaignSettings,
  marks: readonly CampaignMark[],
  count: number,
  random: Random,
): CampaignMark[] {
  const { habitual } = settings;
  if (habitual === null) return routeStops(settings, marks, count, random);
  const near = marks.filter((mark) => mark.baselineKm <= habitual.nearKm);
  const far = marks.filter((mark) => mark.baselineKm > habitual.nearKm);
  return Array.from({ length: count }, () => {
    const choice = random() < habitual.nearShare ? near : far;
    return choice[wholeBetween(random, 0, choice.length - 1)]!;
  });
}

/** A route through one mark of each distance class, gone over in rounds; several visits may follow at one stop. */
function routeStops(
  settings: CampaignSettings,
  marks: readonly CampaignMark[],
  count: number,
  random: Random,
): CampaignMark[] {
  const { from, to } = settings.marksPerCrew;
  const classes = Math.min(wholeBetween(random, from, to), marks.length);
  const byDistance = [...marks].sort((a, b) => a.baselineKm - b.baselineKm);
  const chosen = Array.from({ length: classes }, (_, i) => {
    const first = Math.floor((i * marks.length) / classes);
    const last = Math.floor(((i + 1) * marks.length) / classes) - 1;
    return byDistance[wholeBetween(random, first, last)]!;
  });
  // A random order keeps distance and hour of the day apart.
  const round = shuffle(chosen, random);
  const route = Array.from({ length: settings.roundsPerDay }, () => round).flat();
  return Array.from({ length: count }, (_, j) => route[Math.floor((j * route.length) / count)]!);
}

/** Whole seconds within the working hours, one in each equal part of them. */
function startsMs(settings: CampaignSettings, day: CampaignDay, count: number, random: Random): number[] {
  const { from, to } = settings.workHours;
  const spacingMs = ((to - from) * 3_600_000) / count;
  const phase = SMALLEST_SPACING * random();
  return Array.from({ length: count }, (_, j) => {
    const offsetMs = (j + phase + (1 - SMALLEST_SPACING) * random()) * spacingMs;
    return day.midnightMs + from * 3_600_000 + Math.floor(offsetMs / 1000) * 1000;
  });
}

function setupName(
  settings: CampaignSettings,
  { name, mounting, setupsPerDay }: CampaignBase,
  day: CampaignDay,
  startMs: number,
): string {
  if (mounting === 'pillar') return name;
  const { from, to } = settings.workHours;
  const hour = (startMs - day.midnightMs) / 3_600_000;
  const part = Math.min(setupsPerDay - 1, Math.floor(((hour - from) / (to - from)) * setupsPerDay));
  return part === 0 ? `${name} ${day.day}` : `${name} ${day.day} (${part + 1})`;
}
