/** A 3 × 3 matrix by rows: 9 numbers. */
export type Matrix3 = readonly number[];

/** Product with a vector. */
export function times3(m: Matrix3, x: number, y: number, z: number): readonly [number, number, number] {
  return [
    m[0]! * x + m[1]! * y + m[2]! * z,
    m[3]! * x + m[4]! * y + m[5]! * z,
    m[6]! * x + m[7]! * y + m[8]! * z,
  ];
}

export function transposed3(m: Matrix3): Matrix3 {
  return [m[0]!, m[3]!, m[6]!, m[1]!, m[4]!, m[7]!, m[2]!, m[5]!, m[8]!];
}

/** Inverse by cofactors; the caller knows that the matrix is near a rotation. */
export function inverse3(m: Matrix3): Matrix3 {
  const [a, b, c, d, e, f, g, h, i] = m as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const [p, q, r] = [e * i - f * h, f * g - d * i, d * h - e * g];
  const determinant = a * p + b * q + c * r;
  return [
    p,
    c * h - b * i,
    b * f - c * e,
    q,
    a * i - c * g,
    c * d - a * f,
    r,
    b * g - a * h,
    a * e - b * d,
  ].map((value) => value / determinant);
}
