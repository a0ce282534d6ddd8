import { DAY_MS, daysFromDate, daysInMonth } from './calendarDates.js';
import type { FormatPiece, TimeField } from './formatTokens.js';

/** What a format gives: a date with a time of day, a date alone, or a time of day alone. */
export type TimeKind = 'date-time' | 'date' | 'time-of-day';

/** The numbers read from one text; those that the format has no token for keep the value of `blankFields`. */
export type FieldValues = Record<TimeField, number>;

/** Values before reading: midnight of a day that does not exist. `fraction` is in milliseconds, `halfDay` 0 or 12 h. */
export function blankFields(): FieldValues {
  return {
    year: 0,
    month: 0,
    day: 0,
    dayOfYear: 0,
    hour: 0,
    hour12: 0,
    minute: 0,
    second: 0,
    fraction: 0,
    halfDay: 0,
  };
}

function fieldOf(piece: FormatPiece): TimeField | null {
  if (piece.kind === 'number') return piece.field;
  if (piece.kind === 'monthName') return 'month';
  return piece.kind === 'fraction' || piece.kind === 'halfDay' ? piece.kind : null;
}

/**
 * What the pieces of a format give together.
 * @throws Error when a part is named twice, or parts are missing (a day without a month, `hh` without `a`).
 */
export function kindOfFormat(pieces: readonly FormatPiece[], format: string): TimeKind {
  const fields = pieces.map(fieldOf).filter((field) => field !== null);
  const has = (field: TimeField): boolean => fields.includes(field);
  const must = (holds: boolean, expected: string): void => {
    if (!holds) throw new Error(`format: expected ${expected}, came ${JSON.stringify(format)}`);
  };
  must(new Set(fields).size === fields.length, 'every part of a time once');
  const date = has('year') || has('month') || has('day') || has('dayOfYear');
  if (date) {
    must(has('year'), 'a year yyyy in a date');
    must(
      has('dayOfYear') ? !has('month') && !has('day') : has('month') && has('day'),
      'either month and day or the day of the year DDD beside the year',
    );
  }
  must(has('hour12') === has('halfDay'), 'AM or PM (a) with the 12-hour clock (hh), and neither with HH');
  must(!(has('hour') && has('hour12')), 'either HH or hh');
  const time = has('hour') || has('hour12');
  must(time || !has('minute'), 'an hour beside the minute');
  must(has('minute') || !has('second'), 'a minute beside the second');
  must(has('second') || !has('fraction'), 'a second beside its fraction');
  must(date || time, 'a date or an hour');
  return date ? (time ? 'date-time' : 'date') : 'time-of-day';
}

/** Clock milliseconds since 1970-01-01T00:00 (of a time of day: since midnight), or NaN for what does not exist. */
export function wallMsOf(values: FieldValues, kind: TimeKind, byDayOfYear: boolean, halved: boolean): number {
  let days = 0;
  if (kind !== 'time-of-day') {
    const { year, month, day, dayOfYear } = values;
    if (byDayOfYear) {
      if (dayOfYear < 1 || dayOfYear > 337 + daysInMonth(year, 2)) return Number.NaN;
      days = daysFromDate(year, 1, 1) + dayOfYear - 1;
    } else {
      if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return Number.NaN;
      days = daysFromDate(year, month, day);
    }
  }
  let { hour } = values;
  if (halved) {
    const { hour12 } = values;
    if (hour12 < 1 || hour12 > 12) return Number.NaN;
    // 12 AM is midnight, 12 PM noon
    hour = (hour12 === 12 ? 0 : hour12) + values.halfDay;
  }
  const { minute, second } = values;
  if (hour > 23 || minute > 59 || second > 59) return Number.NaN;
  return days * DAY_MS + ((hour * 60 + minute) * 60 + second) * 1000 + values.fraction;
}
