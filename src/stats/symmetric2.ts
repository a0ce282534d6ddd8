/** Symmetric 2 × 2 matrix as [m00, m01, m11]. */
export type Symmetric2 = readonly [number, number, number];

/** Pair of numbers: a vector of the plane. */
export type Vector2 = readonly [number, number];

/** Eigenvalues in ascending order and the unit vectors that belong to them. */
export interface Eigen2 {
  readonly values: readonly [number, number];
  /** Each is turned so that x > 0, or x = 0 and y = 1. */
  readonly vectors: readonly [Vector2, Vector2];
}

function requireFinite(m: Symmetric2): void {
  if (!m.every(Number.isFinite))
    throw new RangeError(`m: expected finite numbers, received [${m.join(', ')}]`);
}

function turned(x: number, y: number): Vector2 {
  if (x === 0) return [0, Math.abs(y)];
  // + 0 turns a negative zero into a plain one
  return x < 0 ? [-x, -y + 0] : [x, y + 0];
}

/**
 * Eigenvalues and eigenvectors in closed form. The value smaller in size is taken from the determinant, which avoids
 * the cancellation of mean ± radius. A multiple of the unit matrix gives the axes themselves.
 * @throws RangeError when an element is not finite.
 */
export function eigenSymmetric2(m: Symmetric2): Eigen2 {
  requireFinite(m);
  const [a, b, c] = m;
  const sum = a + c;
  const root = Math.hypot(a - c, 2 * b);
  let large: number;
  let small: number;
  if (sum === 0) {
    large = root / 2;
    small = 0 - root / 2;
  } else {
    const dominant = (sum + Math.sign(sum) * root) / 2;
    const [big, little] = Math.abs(a) > Math.abs(c) ? [a, c] : [c, a];
    const other = (big / dominant) * little - (b / dominant) * b;
    large = Math.max(dominant, other);
    small = Math.min(dominant, other);
  }
  const along = majorAxis(a, b, c);
  const across = turned(-along[1], along[0]);
  return { values: [small, large], vectors: [across, along] };
}

/** Unit vector of the larger eigenvalue. */
function majorAxis(a: number, b: number, c: number): Vector2 {
  if (b === 0) return a > c ? [1, 0] : [0, 1];
  const angle = Math.atan2(2 * b, a - c) / 2;
  return turned(Math.cos(angle), Math.sin(angle));
}

/**
 * Power of a symmetric matrix through its eigenvalues (−½ whitens, ½ is the root, −1 inverts). Eigenvalues below
 * `eigenvalueFloor` are raised to it first.
 * @throws RangeError when the power of an eigenvalue is not a finite real number (0 to a negative power, a fraction of
 * a negative value).
 */
export function powerSymmetric2(m: Symmetric2, power: number, eigenvalueFloor?: number): Symmetric2 {
  const { values, vectors } = eigenSymmetric2(m);
  let result: Symmetric2 = [0, 0, 0];
  values.forEach((value, i) => {
    const raised = (eigenvalueFloor === undefined ? value : Math.max(value, eigenvalueFloor)) ** power;
    if (!Number.isFinite(raised))
      throw new RangeError(`m: expected eigenvalues that can be raised to ${power}, received ${value}`);
    const [x, y] = vectors[i]!;
    result = [result[0] + raised * x * x, result[1] + raised * x * y, result[2] + raised * y * y];
  });
  return result;
}

/**
 * Inverse of a symmetric matrix.
 * @throws RangeError when the matrix is singular to within a rounding or not finite.
 */
export function invertSymmetric2(m: Symmetric2): Symmetric2 {
  const { values } = eigenSymmetric2(m);
  const size = Math.max(Math.abs(values[0]), Math.abs(values[1]));
  if (Math.min(Math.abs(values[0]), Math.abs(values[1])) <= size * Number.EPSILON)
    throw new RangeError(`m: expected an invertible matrix, received [${m.join(', ')}]`);
  const determinant = values[0] * values[1];
  return [m[2] / determinant, -m[1] / determinant, m[0] / determinant];
}

/** Matrix times vector. */
export function multiplySymmetric2Vector(m: Symmetric2, v: Vector2): Vector2 {
  return [m[0] * v[0] + m[1] * v[1], m[1] * v[0] + m[2] * v[1]];
}
