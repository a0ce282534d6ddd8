import { type ReaderUnit, type ReaderUnits, readerUnits } from '../study/index.js';

/** Shown where a value cannot be given; a note beside it says why. */
export const NOT_GIVEN = '—';

/** What a number on a page is, and so how it is written. */
export type NumberKind =
  | 'error'
  | 'error to a hundredth'
  | 'signed error'
  | 'error on a card'
  | 'error rounded up'
  | 'limit'
  | 'distance'
  | 'distance, rounded down'
  | 'edge of a class'
  | 'height'
  | 'ppm'
  | 'signed ppm'
  | 'share'
  | 'whole share'
  | 'small share'
  | 'count'
  | 'ratio'
  | 'chance'
  | 'hour'
  | 'factor'
  | 'plain';

/** A number in the units of a reader; null is {@link NOT_GIVEN}. */
export function formatNumber(value: number | null, kind: NumberKind, units: ReaderUnits): string {
  if (value === null) return NOT_GIVEN;
  const { error, distance, height } = units;
  switch (kind) {
    case 'error':
      return inUnit(value, error);
    case 'error to a hundredth':
      return inUnit(value, { ...error, decimals: error.decimals + 1 });
    case 'error on a card':
      return inUnit(value, { ...error, decimals: error.decimals - 1 });
    case 'error rounded up':
      return roundedUp(value * error.perOurs, error.decimals - 1);
    case 'signed error':
      return signed(value * error.perOurs, error.decimals);
    case 'limit':
      return shortest(value * error.perOurs, error.decimals);
    case 'distance':
      return inUnit(value, distance);
    case 'distance, rounded down':
      return roundedDown(value * distance.perOurs);
    case 'edge of a class':
      return shortest(value * distance.perOurs, 1);
    case 'height':
      return inUnit(value, height);
    case 'ppm':
      return fixed(value, 2);
    case 'signed ppm':
      return signed(value, 2);
    case 'share':
      return percent(value);
    case 'whole share':
      return fixed(100 * value, 0);
    case 'small share':
      return `${Number((100 * value).toFixed(2))}\u00a0%`;
    case 'count':
      return count(value);
    case 'ratio':
      return fixed(value, 2);
    case 'chance':
      return value < 0.001 ? 'below 0.001' : fixed(value, value < 0.1 ? 3 : 2);
    case 'hour':
      return clock(value);
    case 'factor':
      return fixed(value, 7);
    case 'plain':
      return shortest(value, 3);
  }
}

const METRIC = readerUnits('metric');

const inUnit = (value: number, { perOurs, decimals }: ReaderUnit): string => fixed(value * perOurs, decimals);

const fixed = (value: number, digits: number): string => {
  const text = value.toFixed(digits);
  // −0.0 is 0.0, and a true minus sign lines up with plus.
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '−');
};

/** At most so many decimals, none that are 0. */
const shortest = (value: number, digits: number): string =>
  String(Number(value.toFixed(digits))).replace('-', '−');

/** A signed number with its sign; what rounds to nothing has none. */
export function signed(value: number, digits: number): string {
  const text = fixed(value, digits);
  return Number(value.toFixed(digits)) > 0 ? `+${text}` : text;
}

/** Hours as on a clock: `10:51`. */
function clock(hours: number): string {
  const minutes = Math.round(hours * 60);
  return `${Math.floor(minutes / 60)}:${String(minutes % 60).padStart(2, '0')}`;
}

/** A limit that is promised, rounded up: rounding down would promise what was not shown. */
function roundedUp(value: number, decimals: number): string {
  const step = 10 ** decimals;
  return (Math.ceil(value * step - 1e-9) / step).toFixed(decimals);
}

/** A distance that is promised, rounded down: rounding up would promise what was not shown. */
const roundedDown = (value: number): string => (Math.floor(value * 10 + 1e-9) / 10).toFixed(1);

export const mm = (value: number | null): string => formatNumber(value, 'error', METRIC);

/** A maximum baseline in km. */
export const kmDown = (value: number): string => formatNumber(value, 'distance, rounded down', METRIC);

/** `95 %`, which does not part at the end of a line. */
export const percent = (share: number): string => `${Number((100 * share).toFixed(1))}\u00a0%`;

/** A whole number, or one of which no more should be read. */
export const count = (value: number): string =>
  value.toLocaleString('en-US', { maximumFractionDigits: 0 }).replaceAll(',', '\u202f');

export const plural = (value: number, one: string, many = `${one}s`): string =>
  `${count(value)} ${value === 1 ? one : many}`;
