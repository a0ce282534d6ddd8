import { localToUtc, parseIsoTime, zoneOffsetMs } from '../time/index.js';

/** A day of a study as a span of UTC milliseconds, start in and end out. */
export interface DaySpan {
  /** YYYY-MM-DD */
  readonly day: string;
  readonly startMs: number;
  readonly endMs: number;
}

const DAY_MS = 86_400_000;

/**
 * A local day. Where the clock skips midnight the day begins when the clock goes on, and where midnight comes twice,
 * with the earlier one.
 * @throws RangeError for a text that is no date, or an unknown zone
 */
export function localDaySpan(day: string, timeZone: string): DaySpan {
  const midnight = midnightMs(day);
  return { day, startMs: clockMs(timeZone, midnight), endMs: clockMs(timeZone, midnight + DAY_MS) };
}

/**
 * A day of local mean solar time at a longitude.
 * @throws RangeError for a text that is no date
 */
export function solarDaySpan(day: string, longitudeDeg: number): DaySpan {
  const startMs = midnightMs(day) - (longitudeDeg / 360) * DAY_MS;
  return { day, startMs, endMs: startMs + DAY_MS };
}

function midnightMs(day: string): number {
  const parsed = /^\d{4}-\d{2}-\d{2}$/.test(day) ? parseIsoTime(day) : null;
  if (parsed === null || parsed.kind === 'invalid')
    throw new RangeError(`day: expected a date as YYYY-MM-DD, received ${day}`);
  return Date.parse(`${day}T00:00:00Z`);
}

/** First instant at which a clock shows `wallMs`, or the instant at which it skips it. */
function clockMs(timeZone: string, wallMs: number): number {
  const found = localToUtc(timeZone, wallMs);
  if (found.kind === 'one') return found.utcMs;
  if (found.kind === 'overlap') return found.earlierUtcMs;
  let [before, after] = [wallMs - DAY_MS, wallMs + DAY_MS];
  while (after - before > 1) {
    const middle = Math.floor((before + after) / 2);
    if (middle + zoneOffsetMs(timeZone, middle) >= wallMs) after = middle;
    else before = middle;
  }
  return after;
}
