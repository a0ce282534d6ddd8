/**
 * Radius that holds 95 % of the errors of an ellipse with these standard deviations, by the cubic in use for circular
 * positional uncertainty (Leenhouts 1985, from memory; coefficients as published by Australian government geodesists):
 * within 0.18 % of the exact radius.
 * @param majorMm standard deviation along one axis, in any unit
 * @param minorMm standard deviation along the other axis, in the same unit
 */
export function circularUncertainty95(majorMm: number, minorMm: number): number {
  const major = Math.max(majorMm, minorMm);
  if (major === 0) return 0;
  const c = Math.min(majorMm, minorMm) / major;
  return major * (1.96079 + 0.004071 * c + 0.114276 * c ** 2 + 0.371625 * c ** 3);
}
