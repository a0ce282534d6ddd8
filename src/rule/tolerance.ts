import type { Component } from '../fit/index.js';
import { normalQuantile } from '../stats/index.js';

/** What a client demands: on `dayShare` of the days, `share` of that day's positions within `limitMm`. */
export interface Tolerance {
  readonly component: Component;
  /** Radial for the horizontal component. */
  readonly limitMm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly confidence: number;
}

/**
 * How many σ hold a share p of Gaussian errors: √(-ln(1 - p)) times the radial RMS (Rayleigh, equal axes), or the
 * normal quantile at (1 + p)/2 times the vertical RMS.
 * @param unequalAxes east and north differ: the normal quantile, which is safe for any ratio of the axes
 */
export function toleranceFactor(component: Component, share: number, unequalAxes = false): number {
  return component === 'horizontal' && !unequalAxes
    ? Math.sqrt(-Math.log1p(-share))
    : normalQuantile((1 + share) / 2);
}
