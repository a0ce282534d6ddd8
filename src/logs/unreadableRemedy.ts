import { guessTimeFormats } from '../time/index.js';

const CORRECT = 'Correct the rows or export them again.';
/** Formats that are offered where a text may be meant in several ways. */
const MOST_FORMATS = 3;

/**
 * What to do about rows that cannot be read, by the detail of the first of them: a line of the layout where the whole
 * file is probably written that way.
 */
export function unreadableRemedy(detail: string): string {
  if (detail.includes(DECIMAL_COMMA))
    return 'If all numbers are written so, add "decimal: comma" to the layout of these logs.';
  if (detail.includes(NO_ZONE)) {
    return 'For these logs alone the layout may say it, such as "time: {zone: +02:00}", with the format if there is one.';
  }
  const came = /^expected a (?:time|serial number|year and day)\b.*, came ("(?:[^"\\]|\\.)*")$/.exec(
    detail,
  )?.[1];
  const formats = came === undefined ? [] : formatsOf(JSON.parse(came) as string);
  if (formats.length === 0) return CORRECT;
  const lines = formats.map((format) => `"time: {format: ${yamlText(format)}}"`).join(' or ');
  const which = formats.length === 1 ? '' : ', whichever is meant,';
  return `If all times are written so, add ${lines}${which} to the layout of these logs.`;
}

/** Parts of details that these remedies complete. */
export const DECIMAL_COMMA = 'with a decimal comma';
const NO_ZONE = 'name the timeZone of such times';

/** Formats that read a text as a date, or date and time; plain numbers may be anything. */
function formatsOf(text: string): string[] {
  const dated = guessTimeFormats([text]).filter(
    ({ kind, format }) => kind !== 'time-of-day' && format !== 'excel' && format !== 'iso',
  );
  return dated.slice(0, MOST_FORMATS).map(({ format }) => format);
}

/** As a value between braces: plain where YAML reads it so. */
const yamlText = (format: string): string =>
  /^[A-Za-z][A-Za-z0-9 .:/'-]*$/.test(format) ? format : `'${format.replaceAll("'", "''")}'`;
