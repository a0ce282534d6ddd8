import type { SquaredErrors } from './estimate.js';

/**
 * How much the data say of the distance term apart from the constant: Σ w B² (l - l̄)²/μ², about the number of shots that
 * speak of distance.
 * @param A,B displayed estimates, mm² and ppm²
 */
export function informationNumber({ y, l, w }: SquaredErrors, A: number, B: number): number {
  let [s0, s1] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    const v = w[i]! / (A + B * l[i]!) ** 2;
    s0 += v;
    s1 += v * l[i]!;
  }
  const center = s1 / s0;
  let number = 0;
  for (let i = 0; i < y.length; i++) {
    number += (w[i]! * (B * (l[i]! - center)) ** 2) / (A + B * l[i]!) ** 2;
  }
  return number;
}
