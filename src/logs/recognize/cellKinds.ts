import { parseDms } from '../dms.js';
import { parseNumber } from '../numbers.js';

const COMMA_NUMBER = /^[-+]?\d*,\d+$/;
const POINT_NUMBER = /^[-+]?\d*\.\d+$/;
/** A date or a time of day in any writing: numbers parted by `-`, `/`, `.` or `:`, perhaps with a month's name. */
const TIME_LIKE = /^\d{1,4}[-/.: ](\d{1,3}|[a-z]{3,9})([-/.: T]|$)|^\d{1,2}:\d{2}/i;

/** Whether a number is written with this comma or with a point as decimal mark. */
export const hasDecimalComma = (cell: string): boolean => COMMA_NUMBER.test(cell);
export const hasDecimalPoint = (cell: string): boolean => POINT_NUMBER.test(cell);

/** A number with marks between thousands, such as `1,234,567.89` or `1.234.567,89`. */
export const hasThousandsMarks = (cell: string): boolean =>
  /^[-+]?\d{1,3}(,\d{3})+\.\d+$|^[-+]?\d{1,3}(\.\d{3})+,\d+$|^[-+]?\d{1,3}(['’\u00a0\u202f]\d{3})+[.,]\d+$/.test(
    cell,
  );

/** The number in a cell, with a decimal point or the other mark; NaN when it is blank or none. */
export function cellNumber(cell: string, decimal: '.' | ','): number {
  if (decimal === ',' && cell.includes('.')) return Number.NaN;
  return parseNumber(decimal === ',' ? cell.replace(',', '.') : cell) ?? Number.NaN;
}

/** Whether a cell holds a value: a number in either writing, a date, a time or an angle. */
export function isValue(cell: string): boolean {
  if (cell === '' || cell.length > 40) return false;
  const number = parseNumber(cell);
  if (number !== null || hasDecimalComma(cell) || hasThousandsMarks(cell)) return true;
  return TIME_LIKE.test(cell) || isDms(cell);
}

/** Degrees, minutes and seconds, with or without letters and symbols. */
export const isDms = (cell: string): boolean => parseDms(cell.replace(',', '.')) !== null && cell !== '';
