/*
 * Complementary error function by the rational Chebyshev approximations of Cody (1969, Mathematics of Computation 23),
 * coefficients from memory; the tests hold them against R and against the incomplete gamma function.
 */

/** Coefficients as Horner's scheme takes them; a `LEAD` comes before all others of its numerator. y ≤ 0.46875. */
const NEAR = [3.1611237438705655, 113.86415415105016, 377.485237685302, 3209.3775891384694] as const;
const NEAR_LEAD = 0.18577770618460315;
const NEAR_BELOW = [23.601290952344122, 244.02463793444417, 1282.6165260773723, 2844.236833439171] as const;
/** 0.46875 < y ≤ 4. */
const MIDDLE = [
  0.5641884969886701, 8.883149794388377, 66.11919063714163, 298.6351381974001, 881.952221241769,
  1712.0476126340707, 2051.0783778260716, 1230.3393547979972,
] as const;
const MIDDLE_LEAD = 2.1531153547440383e-8;
const MIDDLE_BELOW = [
  15.744926110709835, 117.6939508913125, 537.1811018620099, 1621.3895745666903, 3290.7992357334597,
  4362.619090143247, 3439.3676741437216, 1230.3393548037495,
] as const;
/** y > 4, in 1/y². */
const FAR = [
  0.30532663496123236, 0.36034489994980445, 0.12578172611122926, 0.016083785148742275, 0.0006587491615298378,
] as const;
const FAR_LEAD = 0.016315387137302097;
const FAR_BELOW = [
  2.568520192289822, 1.8729528499234604, 0.5279051029514285, 0.06051834131244132, 0.0023352049762686918,
] as const;
const INVERSE_SQRT_PI = 0.5641895835477563;

/** erfc y = 2/√π ∫ from y to infinity of e^-t² dt, for y ≥ 0; relative error below about 1e-15 (1e-13 beyond y = 20). */
export function erfc(y: number): number {
  if (y <= 0.46875) return 1 - y * ratio(y * y, NEAR_LEAD, NEAR, NEAR_BELOW);
  if (y > 28) return 0;
  // e^-y² in two factors: the rounding of y² would be magnified.
  const rounded = Math.trunc(y * 16) / 16;
  const decay = Math.exp(-rounded * rounded) * Math.exp(-(y - rounded) * (y + rounded));
  if (y <= 4) return decay * ratio(y, MIDDLE_LEAD, MIDDLE, MIDDLE_BELOW);
  const x = 1 / (y * y);
  return (decay * (INVERSE_SQRT_PI - x * ratio(x, FAR_LEAD, FAR, FAR_BELOW))) / y;
}

/** Quotient of two polynomials; the one below begins with 1. */
function ratio(x: number, lead: number, above: readonly number[], below: readonly number[]): number {
  let numerator = lead * x;
  let denominator = x;
  const last = above.length - 1;
  for (let i = 0; i < last; i++) {
    numerator = (numerator + above[i]!) * x;
    denominator = (denominator + below[i]!) * x;
  }
  return (numerator + above[last]!) / (denominator + below[last]!);
}
