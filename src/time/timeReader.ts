import { DAY_MS, isoDate } from './calendarDates.js';
import { kindOfFormat } from './formatFields.js';
import { formatPieces } from './formatTokens.js';
import { gpsToUtcMs } from './gpsTime.js';
import { type IsoTime, parseIsoTime } from './isoTime.js';
import { quoted } from './quoted.js';
import { compileTimeFormat } from './timeFormat.js';
import { FIRST_YEAR_READ, isYearRead, LAST_YEAR_READ } from './yearsRead.js';
import { zoneClock } from './zoneClock.js';

/** How the times of a log are written. */
export interface TimeLayout {
  /** As of compileTimeFormat; missing or `iso`: ISO 8601. */
  readonly format?: string | undefined;
  /** Zone of times written without an offset: IANA name, `UTC`, or an offset such as `+02:00` or `-3`. */
  readonly zone?: string | undefined;
  /** `gps`: the clock runs on GPS time, ahead of UTC by the leap seconds since 1980. Default `utc`. */
  readonly scale?: 'utc' | 'gps' | undefined;
}

export type TimeOutcome =
  | { readonly kind: 'instant'; readonly utcMs: number }
  /** A day without time of day, YYYY-MM-DD, of whatever clock the log was written by. */
  | { readonly kind: 'date'; readonly day: string }
  | { readonly kind: 'invalid'; readonly detail: string };

const INVALID: IsoTime = { kind: 'invalid' };

/** A reader of the layout's format in the terms of ISO times, and how to name what it reads. */
function textReader(format: string): { read: (text: string) => IsoTime; expected: string } {
  if (format === 'iso') return { read: parseIsoTime, expected: 'a time like 2025-03-01T10:15:00Z' };
  const parse = compileTimeFormat(format);
  const read = (text: string): IsoTime => {
    const time = parse(text);
    if (time === null) return INVALID;
    return { kind: time.kind === 'date' ? 'date' : 'local', wallMs: time.wallMs };
  };
  if (format === 'excel')
    return { read, expected: 'a serial number of days from 61 (1900-03-01) on like 45717.4271' };
  if (format === 'day-of-year')
    return { read, expected: 'a year and day of the year like 2025-061 10:15:00' };
  if (kindOfFormat(formatPieces(format), format) === 'time-of-day')
    throw new Error(`format: expected one with a date (join the date column to it), came ${quoted(format)}`);
  return { read, expected: `a time written ${format}` };
}

/**
 * A reader of the times of a log, for trimmed cells. Times without an offset are of the layout's zone, else of
 * `defaultZone`; on the GPS scale, which has no zones, of the layout's zone only. With neither, and where a change of
 * clocks skips or repeats a time, the outcome is invalid and says what to do. Years other than 1980 to 2099 are
 * invalid. Made for a million texts a second.
 * @throws Error for a format, zone or scale that cannot be meant, with what was expected and what came.
 */
export function timeReader(layout: TimeLayout, defaultZone: string | null): (text: string) => TimeOutcome {
  const { format = 'iso', scale = 'utc' } = layout;
  if (scale !== 'utc' && scale !== 'gps')
    throw new Error(`scale: expected utc or gps, came ${quoted(String(scale))}`);
  const { read, expected } = textReader(format);
  const isGps = scale === 'gps';
  const zone = layout.zone ?? (isGps ? 'UTC' : defaultZone);
  const toUtc = zone === null ? null : zoneClock(zone);
  const invalid = (text: string, before: string, after = ''): TimeOutcome => ({
    kind: 'invalid',
    detail: `expected ${before}, came ${quoted(text)}${after}`,
  });

  const otherYear = (text: string): TimeOutcome =>
    invalid(text, `a time in the years ${FIRST_YEAR_READ} to ${LAST_YEAR_READ}`);
  const instant = (text: string, utcMs: number): TimeOutcome =>
    isYearRead(utcMs) ? { kind: 'instant', utcMs: isGps ? gpsToUtcMs(utcMs) : utcMs } : otherYear(text);

  return (text) => {
    const time = read(text);
    if (time.kind === 'invalid') return invalid(text, expected);
    if (time.kind === 'instant') return instant(text, time.utcMs);
    if (!isYearRead(time.wallMs)) return otherYear(text);
    if (time.kind === 'date') return { kind: 'date', day: isoDate(time.wallMs / DAY_MS) };
    if (toUtc === null)
      return invalid(
        text,
        'a time with Z or an offset',
        '; name the timeZone of such times in the study file',
      );
    const utc = toUtc(time.wallMs);
    if (utc.kind === 'one') return instant(text, utc.utcMs);
    return utc.kind === 'gap'
      ? invalid(text, `a time that exists in ${zone}`, ', which the change of clocks skips')
      : invalid(
          text,
          `a time that is unique in ${zone}`,
          ', which the change of clocks repeats; write an offset',
        );
  };
}
