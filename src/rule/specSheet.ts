import { type Component, type Form, spreadMm } from '../fit/index.js';
import { toleranceFactor } from './tolerance.js';

/** "a mm + b ppm" of a spec sheet, with what the words mean on that sheet. */
export interface SpecSheet {
  readonly horizontal: { readonly constantMm: number; readonly ppm: number };
  readonly vertical: { readonly constantMm: number; readonly ppm: number };
  readonly form: Form;
  /** Whether the horizontal figure is radial or of one axis. */
  readonly axis: 'radial' | 'per-axis';
  readonly level: 'rms' | '68' | '95';
}

/**
 * The spec sheet's spread at a length on the scale of the error model: radial RMS for the horizontal component,
 * vertical RMS for the vertical one (Gaussian errors, equal axes).
 */
export function specSheetSigmaMm(spec: SpecSheet, component: Component, baselineKm: number): number {
  const { constantMm, ppm } = spec[component];
  const stated = spreadMm(spec.form, constantMm, ppm, baselineKm);
  const radial = component === 'horizontal' && spec.axis === 'radial';
  const share = spec.level === 'rms' ? null : Number(spec.level) / 100;
  const rms = share === null ? stated : stated / toleranceFactor(radial ? 'horizontal' : 'vertical', share);
  return component === 'horizontal' && spec.axis === 'per-axis' ? rms * Math.SQRT2 : rms;
}
