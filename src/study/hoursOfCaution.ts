import type { Control } from '../control/index.js';
import type { OccupationError } from '../errors/index.js';
import type { Component } from '../fit/index.js';
import { zoneOffsetMs } from '../time/index.js';
import type { TimeOfDayResult } from './dayResultTypes.js';
import type { Study } from './study.js';
import { usualBase } from './usualBase.js';

/** The hours at which errors are shown to be larger. */
export interface HoursOfCaution {
  readonly component: Component;
  /** Local mean solar time at the marks. */
  readonly fromHour: number;
  readonly toHour: number;
  /** The same on the clock of the study's zone on its last day, at the base of most shots; null without a zone. */
  readonly clock: { readonly day: string; readonly fromHour: number; readonly toHour: number } | null;
}

/** Between which hours the shots were taken. */
export type ShotHours = Omit<HoursOfCaution, 'component'>;

/** Hours are called different below this chance. */
const LEVEL = 0.05;
const MS_AN_HOUR = 3_600_000;

/** Of each component whose hours differ those with the largest ppm. */
export function hoursOfCaution(
  timeOfDay: readonly TimeOfDayResult[],
  errors: readonly OccupationError[],
  control: Control,
  { timeZone }: Pick<Study, 'timeZone'>,
): HoursOfCaution[] {
  return timeOfDay.flatMap(({ component, pValue, hours }): HoursOfCaution[] => {
    if (pValue === null || pValue >= LEVEL || hours.length === 0) return [];
    const { from, to } = hours.reduce((a, b) => ((b.ppm.estimate ?? 0) > (a.ppm.estimate ?? 0) ? b : a));
    const ahead = clockAhead(errors, control, timeZone);
    return [{ component, fromHour: from, toHour: to, clock: byClock(from, to, ahead) }];
  });
}

/** The earliest and the latest hour of all shots; null where no time of day is known. */
export function shotHours(
  errors: readonly OccupationError[],
  control: Control,
  { timeZone }: Pick<Study, 'timeZone'>,
): ShotHours | null {
  let [from, to] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const { solarHour } of errors) {
    if (solarHour < from) from = solarHour;
    if (solarHour > to) to = solarHour;
  }
  if (from > to) return null;
  return { fromHour: from, toHour: to, clock: byClock(from, to, clockAhead(errors, control, timeZone)) };
}

const byClock = (from: number, to: number, ahead: ReturnType<typeof clockAhead>): ShotHours['clock'] =>
  ahead && { day: ahead.day, fromHour: onClock(from + ahead.hours), toHour: onClock(to + ahead.hours) };

const onClock = (hour: number): number => hour - 24 * Math.floor(hour / 24);

/** By how many hours the clock is ahead of the sun on the last day. */
function clockAhead(
  errors: readonly OccupationError[],
  control: Control,
  timeZone: string | null,
): { readonly day: string; readonly hours: number } | null {
  const usual = usualBase(errors);
  const day = [...new Set(errors.map((error) => error.day))].sort().at(-1) ?? '';
  const noon = Date.parse(`${day}T12:00:00Z`);
  if (timeZone === null || usual === null || Number.isNaN(noon)) return null;
  const { longitudeDeg } = control.bases.get(usual)!.position;
  return { day, hours: zoneOffsetMs(timeZone, noon) / MS_AN_HOUR - longitudeDeg / 15 };
}
