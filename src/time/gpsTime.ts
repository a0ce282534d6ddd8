import { LEAP_SECONDS } from './leapSeconds.js';
import { isYearRead, LAST_YEAR_READ } from './yearsRead.js';

export { LEAP_SECONDS, LEAP_SECONDS_KNOWN_UNTIL, type LeapSecond } from './leapSeconds.js';

/** GPS time ran level with UTC at its epoch, where TAI − UTC was 19 s. */
const TAI_MINUS_GPS_SECONDS = 19;
const GPS_EPOCH_MS = Date.UTC(1980, 0, 6);
const WEEK_MS = 604_800_000;

/** Weeks after which the ten-bit week number of the navigation message begins again at 0. */
export const GPS_WEEKS_PER_ERA = 1024;

/** What a GPS week and second of week came to. */
export type GpsWeekOutcome =
  | { readonly kind: 'instant'; readonly utcMs: number }
  /** The week may have been counted from any rollover. */
  | { readonly kind: 'ambiguous' }
  | { readonly kind: 'invalid'; readonly detail: string };

/** GPS − UTC in milliseconds at a time given on one of the two scales. */
function differenceMs(timeMs: number, name: string, isOnGpsScale: boolean): number {
  for (let i = LEAP_SECONDS.length - 1; i >= 0; i -= 1) {
    const { utcMs, taiMinusUtcSeconds } = LEAP_SECONDS[i]!;
    const differenceMs = (taiMinusUtcSeconds - TAI_MINUS_GPS_SECONDS) * 1000;
    if (timeMs >= (isOnGpsScale ? utcMs + differenceMs : utcMs)) return differenceMs;
  }
  throw new RangeError(`${name}: expected a time from 1980-01-01 on, received ${timeMs}`);
}

/**
 * GPS time minus UTC, whole seconds, at a UTC time in milliseconds: 0 in 1980, 18 since 2017. After
 * LEAP_SECONDS_KNOWN_UNTIL the last known value is assumed to hold.
 * @throws RangeError for a time before 1980-01-01, or NaN.
 */
export function gpsMinusUtcSeconds(utcMs: number): number {
  return differenceMs(utcMs, 'utcMs', false) / 1000;
}

/**
 * UTC milliseconds of a calendar date and time shown on the GPS scale (`gpsWallMs`: milliseconds since 1970-01-01T00:00
 * of that clock). Milliseconds of UTC have no room for an inserted second: like POSIX time, it gets the milliseconds of
 * the second after it.
 * @throws RangeError for a time before 1980-01-01, or NaN.
 */
export function gpsToUtcMs(gpsWallMs: number): number {
  return gpsWallMs - differenceMs(gpsWallMs, 'gpsWallMs', true);
}

/**
 * UTC milliseconds of a GPS week (counted from 1980-01-06) and second of week. The rule for the rollover: a week from
 * 1024 on is a full week and taken as it is; a week below 1024 may be a full one of 1980 to 1999 or one counted anew
 * from a rollover, and is refused as `ambiguous` unless a reference time (UTC milliseconds) is given; then it is put
 * in the era, full weeks included, in which it falls nearest to the reference. Invalid are weeks that are no whole number from 0 on,
 * seconds below 0 or from 604800 on, and results after the year 2099.
 */
export function gpsWeekToUtcMs(week: number, secondsOfWeek: number, referenceMs?: number): GpsWeekOutcome {
  if (!Number.isInteger(week) || week < 0)
    return { kind: 'invalid', detail: `expected a GPS week, a whole number from 0 on, came ${week}` };
  if (!(secondsOfWeek >= 0 && secondsOfWeek * 1000 < WEEK_MS))
    return {
      kind: 'invalid',
      detail: `expected seconds of the GPS week from 0 to below 604800, came ${secondsOfWeek}`,
    };
  let gpsWallMs = GPS_EPOCH_MS + week * WEEK_MS + secondsOfWeek * 1000;
  if (week < GPS_WEEKS_PER_ERA) {
    if (referenceMs === undefined) return { kind: 'ambiguous' };
    if (!Number.isFinite(referenceMs))
      throw new RangeError(`referenceMs: expected UTC milliseconds, received ${referenceMs}`);
    const eras = Math.round((referenceMs - gpsWallMs) / (GPS_WEEKS_PER_ERA * WEEK_MS));
    gpsWallMs += Math.max(0, eras) * GPS_WEEKS_PER_ERA * WEEK_MS;
  }
  if (!isYearRead(gpsWallMs))
    return { kind: 'invalid', detail: `expected a GPS week up to the year ${LAST_YEAR_READ}, came ${week}` };
  return { kind: 'instant', utcMs: gpsToUtcMs(gpsWallMs) };
}
