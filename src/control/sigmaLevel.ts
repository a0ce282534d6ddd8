import { normalQuantile } from '../stats/index.js';

/** Shares of errors that stated precisions may hold, each for one axis. */
export const SIGMA_LEVELS = ['rms', '68', '95'] as const;
export type SigmaLevel = (typeof SIGMA_LEVELS)[number];

/** The level that a cell names: `rms` (one standard deviation), `68`, `95`, with or without a percent sign; else null. */
export function sigmaLevel(cell: string): SigmaLevel | null {
  const plain = cell.toLowerCase().replace(/[\s%]/g, '');
  return SIGMA_LEVELS.find((level) => level === plain) ?? null;
}

/** Standard deviations that a stated value of one axis comes to: 68 % are 0.994 and 95 % are 1.960 of them. */
export function sigmasIn(level: SigmaLevel): number {
  return level === 'rms' ? 1 : normalQuantile(0.5 + Number(level) / 200);
}
