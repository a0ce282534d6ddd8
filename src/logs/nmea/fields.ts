import { parseNumber } from '../numbers.js';

const POINT = 46;

const digitAt = (text: string, at: number): number => {
  const digit = text.charCodeAt(at) - 48;
  return digit >= 0 && digit <= 9 ? digit : Number.NaN;
};

/** The two digits at a place as a number; NaN when they are none. */
export const twoDigits = (text: string, at: number): number => 10 * digitAt(text, at) + digitAt(text, at + 1);

/** Whether all characters from `from` to the end are digits. */
function digitsFrom(text: string, from: number): boolean {
  for (let at = from; at < text.length; at++) if (Number.isNaN(digitAt(text, at))) return false;
  return true;
}

/** Milliseconds since midnight of `hhmmss` or `hhmmss.sss`; NaN for all that is no time of day. */
export function timeOfDayMs(text: string): number {
  const hour = twoDigits(text, 0);
  const minute = twoDigits(text, 2);
  const second = twoDigits(text, 4);
  if (!(hour < 24 && minute < 60 && second < 60)) return Number.NaN;
  const whole = 3_600_000 * hour + 60_000 * minute + 1000 * second;
  if (text.length === 6) return whole;
  if (text.charCodeAt(6) !== POINT || !digitsFrom(text, 7)) return Number.NaN;
  // divided last: .3 and .123 come out as whole milliseconds
  return whole + (1000 * Number(text.slice(7))) / 10 ** (text.length - 7);
}

/**
 * Degrees of `ddmm.mmm` (latitude, 2 digits of degrees) or `dddmm.mmm` (longitude, 3); NaN for other text, for 60
 * minutes and more, and beyond the pole or half the circle.
 */
export function degreesOf(text: string, degreeDigits: 2 | 3): number {
  const point = degreeDigits + 2;
  const hundreds = degreeDigits === 2 ? 0 : digitAt(text, 0);
  const degrees = 100 * hundreds + twoDigits(text, degreeDigits - 2);
  if (!(twoDigits(text, degreeDigits) < 60)) return Number.NaN;
  if (text.length > point && (text.charCodeAt(point) !== POINT || !digitsFrom(text, point + 1))) {
    return Number.NaN;
  }
  const value = degrees + Number(text.slice(degreeDigits)) / 60;
  return value <= (degreeDigits === 2 ? 90 : 180) ? value : Number.NaN;
}

/** Digits after the decimal point. */
export function decimalsOf(text: string): number {
  const point = text.indexOf('.');
  return point < 0 ? 0 : text.length - point - 1;
}

/** Called with a value that cannot be read: the row is used without it. */
export type TellUnread = (column: string, text: string) => void;

/** A number ≥ 0; NaN for a blank or missing field, and, after telling, for one that is no such number. */
export function covariate(text: string | undefined, column: string, tell: TellUnread): number {
  if (text === undefined || text === '') return Number.NaN;
  const value = parseNumber(text);
  if (value !== null && !(value < 0)) return value;
  tell(column, text);
  return Number.NaN;
}
