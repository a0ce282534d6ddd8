import { DAY_MS } from './calendarDates.js';

/** Day 0 of the spreadsheet serial numbers as they run from 1900-03-01 (serial 61) on: 1899-12-30. */
const DAY_ZERO_MS = Date.UTC(1899, 11, 30);
/** Below it the count holds a 29 February 1900, which did not exist. */
const FIRST_SERIAL = 61;
/** 9999-12-31, the last day that spreadsheets know. */
const LAST_SERIAL = 2_958_465;
const SERIAL = /^(\d{1,7})(?:[.,](\d+))?$/;

/**
 * Clock milliseconds since 1970-01-01T00:00 of a spreadsheet serial number: days from 1899-12-30, the fraction (after
 * a point or comma) being the time of day, rounded to the millisecond. `isWhole` tells that no fraction was written.
 * Returns null for text that is no such number, below 61 and beyond the year 9999. Serials that count from 1904
 * cannot be told from these and are read four years early.
 */
export function parseSerialDays(text: string): { readonly wallMs: number; readonly isWhole: boolean } | null {
  const match = SERIAL.exec(text);
  if (!match) return null;
  const day = Number(match[1]);
  if (day < FIRST_SERIAL || day > LAST_SERIAL) return null;
  const fraction = match[2];
  const timeOfDayMs = fraction === undefined ? 0 : Math.round(Number(`0.${fraction}`) * DAY_MS);
  return { wallMs: DAY_ZERO_MS + day * DAY_MS + timeOfDayMs, isWhole: fraction === undefined };
}
