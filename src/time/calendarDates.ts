/** Milliseconds in a day of UTC without leap seconds. */
export const DAY_MS = 86_400_000;

/** Days in a month of the Gregorian calendar, month 1 to 12. */
export function daysInMonth(year: number, month: number): number {
  if (month === 2) return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0) ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}

/**
 * Days from 1970-01-01 to a date of the Gregorian calendar, year ≥ 0. Years are counted from 1 March, so that the leap
 * day is the last of its year. No Date is made: this is called for every row of a log.
 */
export function daysFromDate(year: number, month: number, day: number): number {
  const y = month > 2 ? year : year - 1;
  const m = month > 2 ? month - 3 : month + 9;
  const dayOfYear = Math.floor((153 * m + 2) / 5) + day - 1;
  return 365 * y + Math.floor(y / 4) - Math.floor(y / 100) + Math.floor(y / 400) + dayOfYear - 719_468;
}

/**
 * Date of a day counted from 1970-01-01, as YYYY-MM-DD.
 * @throws RangeError for days outside the years 0000 to 9999.
 */
export function isoDate(days: number): string {
  const time = days * DAY_MS;
  const text = Number.isInteger(days) && Math.abs(time) <= 8.64e15 ? new Date(time).toISOString() : '+';
  if (text.charCodeAt(0) === 43 || text.charCodeAt(0) === 45)
    throw new RangeError(
      `days: expected a whole number of days within the years 0000 to 9999, received ${days}`,
    );
  return text.slice(0, 10);
}
