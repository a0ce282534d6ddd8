import type { Control } from '../control/index.js';
import { calendarDay, solarDay, zoneOffsetMs } from '../time/index.js';

/** UTC milliseconds and base → local day, `YYYY-MM-DD`. */
export type DayOf = (utcMs: number, base: string) => string;

const DAY_MS = 86_400_000;
const MS_PER_DEGREE = DAY_MS / 360;

/**
 * The day of a moment: the calendar day in `timeZone`, or without one the local mean solar day at the base.
 * Moments of the same day are answered from memory, since logs ask millions of times.
 */
export function dayFunction(control: Control, timeZone: string | null): DayOf {
  let [lastNumber, lastDay] = [Number.NaN, ''];
  return (utcMs, base) => {
    const longitudeDeg = control.bases.get(base)!.position.longitudeDeg;
    const offsetMs = timeZone === null ? longitudeDeg * MS_PER_DEGREE : zoneOffsetMs(timeZone, utcMs);
    const number = Math.floor((utcMs + offsetMs) / DAY_MS);
    if (number !== lastNumber) {
      lastNumber = number;
      lastDay = timeZone === null ? solarDay(utcMs, longitudeDeg) : calendarDay(utcMs, offsetMs);
    }
    return lastDay;
  };
}
