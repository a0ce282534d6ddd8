/** `horizontal` is the radial error √(E² + N²), `vertical` the height error. */
export type Component = 'horizontal' | 'vertical';

/** How the spread of errors grows with baseline length: σ² = a² + b² L², or σ = a + b L. */
export type Form = 'root-sum-square' | 'linear-sum';

/**
 * Spread at a baseline length by a form, in mm.
 * @param constantMm a
 * @param ppm b, mm per km
 */
export function spreadMm(form: Form, constantMm: number, ppm: number, baselineKm: number): number {
  return form === 'root-sum-square'
    ? Math.hypot(constantMm, ppm * baselineKm)
    : constantMm + ppm * baselineKm;
}
