import { blankFields, kindOfFormat, type TimeKind, wallMsOf } from './formatFields.js';
import { formatSteps } from './formatSteps.js';
import { formatPieces } from './formatTokens.js';
import { parseSerialDays } from './serialDays.js';

/** A reading of a clock that says nothing of its zone. */
export interface ParsedWallTime {
  readonly kind: TimeKind;
  /** Milliseconds since 1970-01-01T00:00 of the clock; midnight of a date, and since midnight for a time of day. */
  readonly wallMs: number;
}

export type TimeFormatReader = (text: string) => ParsedWallTime | null;

/** Year and day of year, as `day-of-year` reads them: parted by one mark (or nothing), time of day optional. */
const DAY_OF_YEAR =
  /^(\d{4})[-/:.,_\s]?(\d{3})(?:(?:[-/:.,_tT]|\s+)(\d{2})[-:.\s]?(\d{2})(?:[-:.\s]?(\d{2})(?:[.,](\d+))?)?)?$/;

function readDayOfYear(text: string): ParsedWallTime | null {
  const match = DAY_OF_YEAR.exec(text);
  if (!match) return null;
  const [, year, dayOfYear, hour, minute, second, fraction] = match;
  const values = blankFields();
  values.year = Number(year);
  values.dayOfYear = Number(dayOfYear);
  values.hour = Number(hour ?? 0);
  values.minute = Number(minute ?? 0);
  values.second = Number(second ?? 0);
  values.fraction = fraction === undefined ? 0 : Number(`0.${fraction}`) * 1000;
  const kind = hour === undefined ? 'date' : 'date-time';
  const wallMs = wallMsOf(values, kind, true, false);
  return Number.isNaN(wallMs) ? null : { kind, wallMs };
}

function readSerial(text: string): ParsedWallTime | null {
  const serial = parseSerialDays(text);
  return serial && { kind: serial.isWhole ? 'date' : 'date-time', wallMs: serial.wallMs };
}

/**
 * A reader of times written in one format; it returns null for text in another and for dates and times that do not
 * exist (31 April, 24:00, second 60).
 *
 * Tokens: `yyyy` year of four digits; `'20'yy` year of two digits of a stated century (the text holds only the two);
 * `MM` month, `MMM` English month name of three letters or full in any case; `dd` day; `DDD` day of the year; `HH`
 * hour 0–23; `hh` hour 1–12 with `a`, AM or PM in any case with or without points; `mm`; `ss`; `SSS` fraction of a
 * second of any length. The separator written before `SSS` and the fraction may be missing together, as whole seconds
 * often come without. `M d H h m s` and, where no other number touches, `MM dd HH hh mm ss` read one or two digits.
 * A blank matches any run of blanks; `'text'` and marks match themselves. Two whole words are formats too:
 * `day-of-year`, a year and a three-digit day with or without a time (`2025-061 10:15:00`, `2025 061 10 15 00`), and
 * `excel`, a spreadsheet serial number as of parseSerialDays (without a fraction: a date alone).
 * @throws Error for a format that cannot be meant, naming what was expected and what came.
 */
export function compileTimeFormat(format: string): TimeFormatReader {
  if (format === 'day-of-year') return readDayOfYear;
  if (format === 'excel') return readSerial;
  const pieces = formatPieces(format);
  const kind = kindOfFormat(pieces, format);
  const steps = formatSteps(pieces);
  const byDayOfYear = pieces.some((piece) => piece.kind === 'number' && piece.field === 'dayOfYear');
  const halved = pieces.some((piece) => piece.kind === 'halfDay');
  // every step sets its field anew before wallMsOf looks at it
  const values = blankFields();
  return (text) => {
    let at = 0;
    for (let i = 0; i < steps.length; i += 1) {
      at = steps[i]!(text, at, values);
      if (at < 0) return null;
    }
    if (at !== text.length) return null;
    const wallMs = wallMsOf(values, kind, byDayOfYear, halved);
    return Number.isNaN(wallMs) ? null : { kind, wallMs };
  };
}
