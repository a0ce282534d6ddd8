import { gpsWeekToUtcMs, type TimeLayout, type TimeOutcome, timeReader } from '../time/index.js';
import { quoted } from './messages.js';
import type { ColumnRole } from './roles.js';
import type { RowCells, TextOf } from './rowCells.js';
import type { NumberReaders } from './rowNumbers.js';

/** When a row was measured: a moment, a day without a time of day, nothing at all, or a text that is no time. */
export type RowTime = TimeOutcome | { readonly kind: 'missing' };

/** Reads the time of a row, and names the column to blame when there is none. */
export interface TimePlan {
  readonly column: ColumnRole;
  readonly read: (cells: RowCells) => RowTime;
}

/**
 * Chooses how time is written by the columns that are there: week and seconds of GPS, date and time of day apart, one
 * time, the start of an averaged shot, a date alone, or nothing.
 * @throws Error for a format or zone that is not understood
 */
export function timePlan(
  has: (role: ColumnRole) => boolean,
  textOf: TextOf,
  numberReader: NumberReaders,
  layout: TimeLayout,
  defaultZone: string | null,
): TimePlan {
  if (has('gpsWeek') && has('gpsSeconds')) return gpsPlan(textOf, numberReader);
  const read = timeReader(layout, defaultZone);
  const single = (role: ColumnRole): TimePlan => ({
    column: role,
    read: (cells) => readText(textOf(role, cells), read),
  });
  if (has('date') && has('timeOfDay')) {
    const dateLayout = layout.format === undefined ? {} : { format: dateFormat(layout.format) };
    return jointPlan(textOf, read, timeReader(dateLayout, defaultZone));
  }
  for (const role of ['time', 'start', 'date'] as const) if (has(role)) return single(role);
  return { column: 'time', read: () => ({ kind: 'missing' }) };
}

function readText(text: string, read: (text: string) => TimeOutcome): RowTime {
  return text === '' ? { kind: 'missing' } : read(text);
}

/** Date and time of day joined by one blank; a row without a time of day keeps its date. */
function jointPlan(
  textOf: TextOf,
  read: (text: string) => TimeOutcome,
  readDate: (text: string) => TimeOutcome,
): TimePlan {
  return {
    column: 'timeOfDay',
    read: (cells) => {
      const [date, timeOfDay] = [textOf('date', cells), textOf('timeOfDay', cells)];
      if (date === '') return { kind: 'missing' };
      return timeOfDay === '' ? readDate(date) : read(`${date} ${timeOfDay}`);
    },
  };
}

/** The part of a format in front of the time of day: it ends at the first token of hours, minutes or seconds. */
function dateFormat(format: string): string {
  if (WORD_FORMATS.has(format)) return format;
  for (const token of format.matchAll(/'(?:[^']|'')*'|[A-Za-z]/g)) {
    if (/^[HhmsSa]$/.test(token[0])) return format.slice(0, token.index).trimEnd();
  }
  return format;
}

/** Formats that are not made of tokens; they read dates with and without a time of day. */
const WORD_FORMATS = new Set(['iso', 'day-of-year', 'excel']);

function gpsPlan(textOf: TextOf, numberReader: NumberReaders): TimePlan {
  const [readWeek, readSeconds] = [numberReader('gpsWeek'), numberReader('gpsSeconds')];
  return {
    column: 'gpsSeconds',
    read: (cells) => {
      const [week, seconds] = [readWeek(cells), readSeconds(cells)];
      if (week === null || seconds === null) {
        const came = quoted(`${textOf('gpsWeek', cells)} ${textOf('gpsSeconds', cells)}`);
        return { kind: 'invalid', detail: `expected a GPS week and its seconds, came ${came}` };
      }
      if (Number.isNaN(week) || Number.isNaN(seconds)) return { kind: 'missing' };
      const outcome = gpsWeekToUtcMs(week, seconds);
      if (outcome.kind !== 'ambiguous') return outcome;
      return {
        kind: 'invalid',
        detail: `expected a full GPS week of at least 1024, came ${week}, which may mean several eras; add the multiple of 1024 that was left out`,
      };
    },
  };
}
