import { DAY_MS } from './calendarDates.js';
import { expectedZone, fixedOffsetMs, looksLikeOffset } from './fixedOffset.js';
import { quoted } from './quoted.js';

/** A stretch of time, from `startMs` up to but not at `endMs` (UTC), in which a zone's offset is the same. */
export interface OffsetSpan {
  readonly startMs: number;
  readonly endMs: number;
  readonly offsetMs: number;
}

const FIRST_YEAR = 1900;
const LAST_YEAR = 2199;

interface Zone {
  /** Null where the offset is always `fixedMs`. */
  readonly format: Intl.DateTimeFormat | null;
  readonly fixedMs: number;
  readonly years: Map<number, readonly OffsetSpan[]>;
}

/** Tables worked out so far. They hold facts that do not change, so sharing them disturbs nobody. */
const zones = new Map<string, Zone>();

/** Whether this is a time zone: an IANA name such as `Europe/Oslo` or `UTC`, or an offset from UTC such as `+02:00`. */
export function isTimeZone(name: string): boolean {
  return zoneOf(name) !== undefined;
}

function zoneOf(name: string): Zone | undefined {
  const known = zones.get(name);
  if (known) return known;
  if (looksLikeOffset(name)) {
    const fixedMs = fixedOffsetMs(name);
    if (fixedMs === null) return undefined;
    const fixed: Zone = { format: null, fixedMs, years: new Map() };
    zones.set(name, fixed);
    return fixed;
  }
  try {
    const format = new Intl.DateTimeFormat('en-US', {
      timeZone: name,
      calendar: 'gregory',
      numberingSystem: 'latn',
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
    const zone: Zone = { format, fixedMs: Number.NaN, years: new Map() };
    zones.set(name, zone);
    return zone;
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

/** Offset at a whole second, from the clock reading that Intl prints. */
function printedOffsetMs(format: Intl.DateTimeFormat, utcMs: number): number {
  const field: Partial<Record<Intl.DateTimeFormatPartTypes, number>> = {};
  for (const part of format.formatToParts(utcMs)) field[part.type] = Number(part.value);
  const { year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0 } = field;
  return Date.UTC(year, month - 1, day, hour, minute, second) - utcMs;
}

/** Spans of one UTC year: offsets at daily steps, changes between them bisected to the second. */
function spansOfYear({ format, fixedMs }: Zone, year: number): readonly OffsetSpan[] {
  const yearStart = Date.UTC(year, 0, 1);
  const yearEnd = Date.UTC(year + 1, 0, 1);
  if (format === null) return [{ startMs: yearStart, endMs: yearEnd, offsetMs: fixedMs }];
  const spans: OffsetSpan[] = [];
  let startMs = yearStart;
  let offsetMs = printedOffsetMs(format, yearStart);
  for (let day = yearStart; day < yearEnd; day += DAY_MS) {
    const next = printedOffsetMs(format, day + DAY_MS);
    if (next === offsetMs) continue;
    let low = day / 1000;
    let high = (day + DAY_MS) / 1000;
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2);
      if (printedOffsetMs(format, middle * 1000) === offsetMs) low = middle;
      else high = middle;
    }
    spans.push({ startMs, endMs: high * 1000, offsetMs });
    startMs = high * 1000;
    offsetMs = next;
  }
  if (startMs < yearEnd) spans.push({ startMs, endMs: yearEnd, offsetMs });
  return spans;
}

/**
 * The span of constant offset that holds `utcMs` in a zone, within its UTC year. A year costs some milliseconds once.
 * @throws RangeError for an unknown zone, or a time outside the years 1900 to 2199.
 */
export function offsetSpanAt(timeZone: string, utcMs: number): OffsetSpan {
  const zone = zoneOf(timeZone);
  if (!zone) throw new RangeError(`timeZone: expected ${expectedZone(timeZone)}, came ${quoted(timeZone)}`);
  const year = new Date(utcMs).getUTCFullYear();
  if (!(year >= FIRST_YEAR && year <= LAST_YEAR))
    throw new RangeError(
      `utcMs: expected a time in the years ${FIRST_YEAR} to ${LAST_YEAR}, received ${utcMs}`,
    );
  let spans = zone.years.get(year);
  if (!spans) {
    spans = spansOfYear(zone, year);
    zone.years.set(year, spans);
  }
  const span = spans.find((candidate) => utcMs < candidate.endMs);
  if (!span) throw new Error(`no offset known for ${timeZone} at ${utcMs}`);
  return span;
}
