import type { Control } from '../control/index.js';
import { calendarDay, solarDay, zoneOffsetMs } from '../time/index.js';

/** UTC milliseconds and base → local day. */
export type DayOf = (utcMs: number, base: string) => string;

/**
 * The day of a moment: the calendar day in `timeZone`, or without one the local mean solar day at the base.
 * Consecutive moments of one minute are answered from memory, since logs ask millions of times.
 */
export function dayFunction(control: Control, timeZone: string | null): DayOf {
  let [lastSlot, lastBase, lastDay] = [Number.NaN, '', ''];
  return (utcMs, base) => {
    // No zone changes its offset, and no calendar day begins, within a minute; a solar day may.
    const slot = Math.floor(utcMs / 60_000);
    if (slot === lastSlot && base === lastBase) return lastDay;
    const day =
      timeZone === null
        ? solarDay(utcMs, control.bases.get(base)!.position.longitudeDeg)
        : calendarDay(utcMs, zoneOffsetMs(timeZone, utcMs));
    if (timeZone !== null) [lastSlot, lastBase, lastDay] = [slot, base, day];
    return day;
  };
}
