import { DAY_MS, daysFromDate, daysInMonth } from './calendarDates.js';

/** A time with an offset or Z: UTC milliseconds since 1970. */
export interface InstantTime {
  readonly kind: 'instant';
  readonly utcMs: number;
}

/** A time without an offset: milliseconds since 1970-01-01T00:00 of the same unknown clock. */
export interface LocalTime {
  readonly kind: 'local';
  readonly wallMs: number;
}

/** A date alone; `wallMs` is its midnight, as in LocalTime. */
export interface DateOnly {
  readonly kind: 'date';
  readonly wallMs: number;
}

/** No such time. */
export interface InvalidTime {
  readonly kind: 'invalid';
}

export type IsoTime = InstantTime | LocalTime | DateOnly | InvalidTime;

const INVALID: InvalidTime = { kind: 'invalid' };
/** Digits of a fraction that matter: femtoseconds, exact in a double. */
const MAX_FRACTION_DIGITS = 15;
const DASH = 45;
const COLON = 58;
const PLUS = 43;

/** Two digits at `at`, or −1. */
function twoDigits(text: string, at: number): number {
  const tens = text.charCodeAt(at) - 48;
  const ones = text.charCodeAt(at + 1) - 48;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? 10 * tens + ones : -1;
}

/** Milliseconds of the date at the start of the text, or NaN. */
function dateMs(text: string): number {
  const century = twoDigits(text, 0);
  const yearOfCentury = twoDigits(text, 2);
  const month = twoDigits(text, 5);
  const day = twoDigits(text, 8);
  if (century < 0 || yearOfCentury < 0 || text.charCodeAt(4) !== DASH || text.charCodeAt(7) !== DASH)
    return Number.NaN;
  const year = 100 * century + yearOfCentury;
  if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return Number.NaN;
  return daysFromDate(year, month, day) * DAY_MS;
}

/** Offset of a zone written ±hh or ±hh:mm from `at` to the end, ms; NaN when malformed. */
function offsetMs(text: string, at: number): number {
  const sign = text.charCodeAt(at) === PLUS ? 1 : -1;
  const hours = twoDigits(text, at + 1);
  const rest = text.length - at;
  if (hours < 0 || hours > 23) return Number.NaN;
  if (rest === 3) return sign * hours * 3_600_000;
  const minutes = twoDigits(text, at + 4);
  if (rest !== 6 || text.charCodeAt(at + 3) !== COLON || minutes < 0 || minutes > 59) return Number.NaN;
  return sign * (hours * 60 + minutes) * 60_000;
}

/**
 * Reads a time in the extended format of ISO 8601: `2025-03-01`, `2025-03-01T10:11`, `…T10:11:12.3Z`, `…+01:00`, `…+01`;
 * a blank may stand for the T, a comma for the point, and seconds may be missing. A fraction of any length is kept as
 * part of a millisecond. 24:00, second 60 and dates that do not exist are invalid, and so is text before or after.
 * Made for a million rows a second: characters are looked at once and no Date is made.
 */
export function parseIsoTime(text: string): IsoTime {
  const date = dateMs(text);
  if (Number.isNaN(date)) return INVALID;
  const length = text.length;
  if (length === 10) return { kind: 'date', wallMs: date };
  const separator = text.charCodeAt(10);
  if (separator !== 84 && separator !== 116 && separator !== 32) return INVALID;
  const hour = twoDigits(text, 11);
  const minute = twoDigits(text, 14);
  if (hour < 0 || hour > 23 || text.charCodeAt(13) !== COLON || minute < 0 || minute > 59) return INVALID;
  let wallMs = date + (hour * 60 + minute) * 60_000;
  let at = 16;
  if (text.charCodeAt(at) === COLON) {
    const second = twoDigits(text, 17);
    if (second < 0 || second > 59) return INVALID;
    wallMs += second * 1000;
    at = 19;
    const mark = text.charCodeAt(at);
    if (mark === 46 || mark === 44) {
      const from = at + 1;
      let digits = 0;
      let scale = 1;
      for (at = from; at < length; at += 1) {
        const digit = text.charCodeAt(at) - 48;
        if (digit < 0 || digit > 9) break;
        if (at - from < MAX_FRACTION_DIGITS) {
          digits = 10 * digits + digit;
          scale *= 10;
        }
      }
      if (at === from) return INVALID;
      // divided last: .3 and .123 come out as whole milliseconds
      wallMs += (digits * 1000) / scale;
    }
  }
  if (at === length) return { kind: 'local', wallMs };
  const zone = text.charCodeAt(at);
  if (zone === 90 || zone === 122) return at + 1 === length ? { kind: 'instant', utcMs: wallMs } : INVALID;
  if (zone !== PLUS && zone !== DASH) return INVALID;
  const offset = offsetMs(text, at);
  return Number.isNaN(offset) ? INVALID : { kind: 'instant', utcMs: wallMs - offset };
}
