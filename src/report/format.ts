import type { EstimateWithLimits } from '../fit/index.js';

/** Shown where a value cannot be given; a note beside it says why. */
export const NOT_GIVEN = '—';

const fixed = (value: number, digits: number): string => {
  const text = value.toFixed(digits);
  // −0.0 is 0.0, and a true minus sign lines up with plus.
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '−');
};

/** A signed number with its sign; what rounds to nothing has none. */
export function signed(value: number, digits: number): string {
  const text = fixed(value, digits);
  return Number(value.toFixed(digits)) > 0 ? `+${text}` : text;
}

export const mm = (value: number | null): string => (value === null ? NOT_GIVEN : fixed(value, 1));

export const ppm = (value: number | null): string => (value === null ? NOT_GIVEN : fixed(value, 2));

/** Lengths of marks and classes, rounded. */
export const km = (value: number | null): string => (value === null ? NOT_GIVEN : fixed(value, 1));

/** A maximum baseline, rounded down: rounding up would promise what was not shown. */
export const kmDown = (value: number): string => (Math.floor(value * 10 + 1e-9) / 10).toFixed(1);

/** `95 %`, which does not part at the end of a line. */
export const percent = (share: number): string => `${Number((100 * share).toFixed(1))}\u00a0%`;

export const count = (value: number): string => value.toLocaleString('en-US').replaceAll(',', '\u202f');

export const plural = (value: number, one: string, many = `${one}s`): string =>
  `${count(value)} ${value === 1 ? one : many}`;

/** `8.1 (7.6 to 8.6)`, or what of it can be given. */
export function withLimits(
  { estimate, low, high }: EstimateWithLimits,
  show: (value: number | null) => string,
): string {
  if (estimate === null && high === null) return NOT_GIVEN;
  if (estimate === null) return `below ${show(high)}`;
  if (low === null || high === null) return show(estimate);
  return `${show(estimate)} (${show(low)} to ${show(high)})`;
}
