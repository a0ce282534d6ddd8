import { DAY_MS, isoDate } from './calendarDates.js';
import { type OffsetSpan, offsetSpanAt } from './zoneTable.js';

export { isTimeZone } from './zoneTable.js';

/** A clock reading that happened once. */
export interface OneInstant {
  readonly kind: 'one';
  readonly utcMs: number;
}

/** A clock reading that was skipped when the clock was put forward. */
export interface ClockGap {
  readonly kind: 'gap';
}

/** A clock reading that happened twice when the clock was put back. */
export interface ClockOverlap {
  readonly kind: 'overlap';
  readonly earlierUtcMs: number;
  readonly laterUtcMs: number;
}

export type LocalToUtc = OneInstant | ClockGap | ClockOverlap;

/** No offset of a changing zone is larger than 14 hours, and no change of one was nearer than this to another. */
const REACH_MS = 16 * 3_600_000;

let lastZone = '';
let last: OffsetSpan = { startMs: 0, endMs: 0, offsetMs: 0 };

/**
 * Local clock minus UTC, milliseconds, in a time zone (an IANA name or an offset such as `+02:00`) at a time. Rows of a log come in order, so the span of the
 * last answer is tried first; the rest is a table kept for the life of the process.
 * @throws RangeError for an unknown zone, or a time outside the years 1900 to 2199.
 */
export function zoneOffsetMs(timeZone: string, utcMs: number): number {
  if (!(timeZone === lastZone && utcMs >= last.startMs && utcMs < last.endMs)) {
    last = offsetSpanAt(timeZone, utcMs);
    lastZone = timeZone;
  }
  return last.offsetMs;
}

/**
 * The instants at which the clocks of a time zone showed `wallMs` (milliseconds since 1970-01-01T00:00 of that clock):
 * one, none (gap) or two (overlap).
 * @throws RangeError as zoneOffsetMs.
 */
export function localToUtc(timeZone: string, wallMs: number): LocalToUtc {
  const before = zoneOffsetMs(timeZone, wallMs - REACH_MS);
  const after = zoneOffsetMs(timeZone, wallMs + REACH_MS);
  if (before === after) return { kind: 'one', utcMs: wallMs - before };
  // an offset is right if it is the one in force at the instant it leads to
  const first = zoneOffsetMs(timeZone, wallMs - before) === before;
  const second = zoneOffsetMs(timeZone, wallMs - after) === after;
  if (first && second) return { kind: 'overlap', earlierUtcMs: wallMs - before, laterUtcMs: wallMs - after };
  if (first) return { kind: 'one', utcMs: wallMs - before };
  return second ? { kind: 'one', utcMs: wallMs - after } : { kind: 'gap' };
}

/**
 * Calendar day shown by a clock that is `offsetMs` ahead of UTC, YYYY-MM-DD.
 * @throws RangeError when the time is not finite or outside the years 0000 to 9999.
 */
export function calendarDay(utcMs: number, offsetMs: number): string {
  return isoDate(Math.floor((utcMs + offsetMs) / DAY_MS));
}
