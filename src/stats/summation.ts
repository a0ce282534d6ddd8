/**
 * Compensated sum (Neumaier 1974, ZAMM 54): the rounding of each addition is carried along, so that the result hardly
 * depends on the order of the values. No values: 0. Infinities and NaN come out as in a plain sum.
 */
export function sum(values: ArrayLike<number>): number {
  let total = 0;
  let lost = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    const next = total + value;
    lost += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total;
    total = next;
  }
  return Number.isFinite(total) ? total + lost : total;
}

/** Splits a double into two halves of 26 bits (Veltkamp); values beyond about 1e300 would overflow. */
const SPLITTER = 2 ** 27 + 1;

/**
 * Compensated dot product, as if computed with twice the digits and then rounded (Ogita, Rump & Oishi 2005, SIAM J.
 * Sci. Comput. 26, algorithm Dot2).
 * @throws RangeError when the lengths differ.
 */
export function dot(a: Float64Array, b: Float64Array): number {
  if (a.length !== b.length)
    throw new RangeError(`b: expected ${a.length} values as in a, received ${b.length}`);
  let total = 0;
  let lost = 0;
  for (let i = 0; i < a.length; i += 1) {
    const x = a[i]!;
    const y = b[i]!;
    const product = x * y;
    const xs = SPLITTER * x;
    const xHigh = xs - (xs - x);
    const xLow = x - xHigh;
    const ys = SPLITTER * y;
    const yHigh = ys - (ys - y);
    const yLow = y - yHigh;
    const productError = xLow * yLow - (product - xHigh * yHigh - xLow * yHigh - xHigh * yLow);
    const next = total + product;
    const z = next - total;
    lost += total - (next - z) + (product - z) + productError;
    total = next;
  }
  return total + lost;
}
