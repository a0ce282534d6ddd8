import { FORM_CURVES, type Form } from './forms.js';
import type { SquaredErrors } from './scoring.js';

/**
 * How much the data say of the distance term apart from the constant, about the number of shots that speak of distance:
 * Σ w B² (l - l̄)²/μ² for root-sum-square, and the same information on log b² for linear-sum.
 * @param p first displayed parameter of the form
 * @param q second displayed parameter of the form
 */
export function informationNumber(
  { y, l, w }: SquaredErrors,
  p: number,
  q: number,
  form: Form = 'root-sum-square',
): number {
  const curve = FORM_CURVES[form];
  const weight = (i: number, eta: number): number => w[i]! * (curve.slope(eta) / curve.variance(eta)) ** 2;
  let [s0, s1] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    const x = curve.regressor(l[i]!);
    const v = weight(i, p + q * x);
    s0 += v;
    s1 += v * x;
  }
  const center = s1 / s0;
  // In linear-sum q is b, and a change of log b² is half of one of log b.
  const scale = form === 'root-sum-square' ? q : q / 2;
  let number = 0;
  for (let i = 0; i < y.length; i++) {
    const x = curve.regressor(l[i]!);
    number += weight(i, p + q * x) * (scale * (x - center)) ** 2;
  }
  return number;
}
