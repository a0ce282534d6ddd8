import { apOfKp, kpWords } from '../kp.js';
import { type LineFault, unreadable } from './indexLine.js';

/** NaN for the marks of missing values: negative numbers and rows of nines, which no index but Hp reaches. */
export const knownValue = (value: number): number =>
  value < 0 || value === 999 || value === 999.9 ? Number.NaN : value;

/** Holds Kp and ap of one interval to their table; NaN is a missing value. */
export function kpFault(kp: number, ap: number): LineFault | null {
  if (!Number.isNaN(kp) && kpWords(kp) === null)
    return unreadable(`expected a Kp from 0 to 9 in thirds, came ${kp}`);
  return Number.isNaN(ap) || (ap >= 0 && ap <= 400)
    ? null
    : unreadable(`expected an ap from 0 to 400, came ${ap}`);
}

/** Says when ap is not the one that belongs to Kp. */
export function kpDoubt(kp: number, ap: number): string | null {
  if (Number.isNaN(kp) || Number.isNaN(ap) || apOfKp(kp) === ap) return null;
  return `to Kp ${kpWords(kp)} belongs ap ${apOfKp(kp)}, and the row holds ap ${ap}`;
}

/** Says when Ap is not the mean of a whole day's ap. Rounding half up and half to even both occur. */
export function apDailyDoubt(ap: readonly number[], apDaily: number): string | null {
  const mean = ap.reduce((total, value) => total + value, 0) / ap.length;
  if (Number.isNaN(mean) || Number.isNaN(apDaily) || Math.abs(mean - apDaily) <= 0.5) return null;
  return `the mean of the eight ap is ${mean}, and the row holds Ap ${apDaily}`;
}
