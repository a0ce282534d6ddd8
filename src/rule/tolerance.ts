import { type Component, type ErrorModel, fittedSigmaMm } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import { normalQuantile, radialQuantile } from '../stats/index.js';

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

/**
 * The same at a length, for a model whose east and north errors may differ: then the exact radius at their fitted σ over
 * the radial RMS of both, or the safe factor where the axes could not be fitted.
 */
export function toleranceFactorAt(model: ErrorModel, share: number, baselineKm: number): number {
  const unequal = model.notes.some(({ code }) => code === 'unequal-axes');
  if (!unequal || model.axes === null) return toleranceFactor(model.component, share, unequal);
  const east = fittedSigmaMm(model.axes.east, baselineKm);
  const north = fittedSigmaMm(model.axes.north, baselineKm);
  const radialMm = Math.hypot(east, north);
  // Without a constant there is no ellipse at the base itself.
  return radialMm > 0
    ? radialQuantile(east, north, share) / radialMm
    : toleranceFactor(model.component, share, true);
}

/** @throws InputError for a tolerance that cannot be, or of another component than the model */
export function checkTolerance(tolerance: Tolerance, component: Component): void {
  const fault = (what: string, expected: string, came: unknown): Error =>
    inputError(
      'bad-tolerance',
      `Expected ${expected} as ${what} of a tolerance, came ${JSON.stringify(came)}. Correct the tolerance.`,
    );
  if (tolerance.component !== component) {
    throw fault('component', `"${component}", that of the model,`, tolerance.component);
  }
  if (!(tolerance.limitMm > 0 && Number.isFinite(tolerance.limitMm))) {
    throw fault('limitMm', 'a number above 0', tolerance.limitMm);
  }
  for (const key of ['share', 'dayShare', 'confidence'] as const) {
    const value = tolerance[key];
    if (!(value > 0 && value < 1)) throw fault(key, 'a number between 0 and 1', value);
  }
}
