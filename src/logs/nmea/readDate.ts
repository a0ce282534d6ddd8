import { parseIsoTime } from '../../time/index.js';
import { type TellUnread, twoDigits } from './fields.js';

/** Two-digit years from this on belong to the twentieth century: satellite positioning began in 1980. */
const FIRST_YEAR_OF_CENTURY = 80;

/**
 * Midnight of the date that an RMC or ZDA sentence (NMEA 0183) states, UTC milliseconds. RMC has `ddmmyy`, the years
 * 1980 to 2079, and a status: unless it is A (valid) the date is not believed, for receivers send their first day
 * before they know the date. ZDA has day, month and year.
 * @param tell called for a date that does not exist
 * @returns NaN when there is no date
 */
export function readDate(type: 'RMC' | 'ZDA', fields: readonly string[], tell: TellUnread): number {
  if (type === 'RMC' && fields[2] !== 'A') return Number.NaN;
  const parts = type === 'RMC' ? shortDate(fields[9] ?? '') : fields.slice(2, 5);
  if (parts.join('') === '') return Number.NaN;
  const [day, month, year] = parts;
  const date = parseIsoTime(`${year}-${month}-${day}`);
  if (date.kind === 'date') return date.wallMs;
  tell('date', type === 'RMC' ? fields[9]! : parts.join(','));
  return Number.NaN;
}

/** Day, month and year of `ddmmyy`. */
function shortDate(text: string): string[] {
  const century = twoDigits(text, 4) < FIRST_YEAR_OF_CENTURY ? '20' : '19';
  return text === '' ? [] : [text.slice(0, 2), text.slice(2, 4), century + text.slice(4)];
}
