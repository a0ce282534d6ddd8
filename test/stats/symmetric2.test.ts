import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  eigenSymmetric2,
  invertSymmetric2,
  multiplySymmetric2Vector,
  powerSymmetric2,
  type Symmetric2,
} from '../../src/stats/symmetric2.js';

describe('eigenSymmetric2', () => {
  it('error ellipse of a published covariance matrix', () => {
    // Test values of a government geodesy library: [[1.44, -1.32], [-1.32, 1.22]], element 1 east, 2 north:
    // semi-axes 1.6292867776 and 0.0736518590, azimuth of the major one 132.6181791546°
    const { values, vectors } = eigenSymmetric2([1.44, -1.32, 1.22]);
    expect(Math.sqrt(values[1])).toBeCloseTo(1.6292867776, 10);
    expect(Math.sqrt(values[0])).toBeCloseTo(0.073651859, 9);
    const [east, north] = vectors[1];
    expect((Math.atan2(east, north) * 180) / Math.PI).toBeCloseTo(132.6181791546, 9);
  });
  it('diagonal matrices and multiples of the unit matrix', () => {
    expect(eigenSymmetric2([5, 0, 2])).toEqual({
      values: [2, 5],
      vectors: [
        [0, 1],
        [1, 0],
      ],
    });
    expect(eigenSymmetric2([2, 0, 5])).toEqual({
      values: [2, 5],
      vectors: [
        [1, 0],
        [0, 1],
      ],
    });
    expect(eigenSymmetric2([3, 0, 3]).values).toEqual([3, 3]);
    expect(eigenSymmetric2([0, 0, 0]).values).toEqual([0, 0]);
    expect(eigenSymmetric2([0, 2, 0]).values).toEqual([-2, 2]);
  });
  it('keeps the small value of a nearly singular matrix', () => {
    const { values } = eigenSymmetric2([1, 0, 1e-20]);
    expect(values).toEqual([1e-20, 1]);
    // determinant 2e-20 − 1e-20, larger value 1: the smaller one is 1e-20; mean minus radius would give 0
    const tilted = eigenSymmetric2([1, 1e-10, 2e-20]);
    expect(tilted.values[0] / 1e-20).toBeCloseTo(1, 9);
  });
  it('refuses what is not finite', () => {
    expect(() => eigenSymmetric2([1, Number.NaN, 2])).toThrow(
      new RangeError('m: expected finite numbers, received [1, NaN, 2]'),
    );
  });
});

const element = fc.double({ min: -1000, max: 1000, noNaN: true });
const close = (a: number, b: number, size: number) =>
  expect(Math.abs(a - b)).toBeLessThanOrEqual(1e-12 * (1 + size));

describe('laws', () => {
  it('vectors are turned by their values only, have length 1 and stand at right angles', () => {
    fc.assert(
      fc.property(element, element, element, (a, b, c) => {
        const m: Symmetric2 = [a, b, c];
        const { values, vectors } = eigenSymmetric2(m);
        const size = Math.abs(a) + Math.abs(b) + Math.abs(c);
        expect(values[0]).toBeLessThanOrEqual(values[1]);
        vectors.forEach((v, i) => {
          const product = multiplySymmetric2Vector(m, v);
          close(product[0], values[i]! * v[0], size);
          close(product[1], values[i]! * v[1], size);
          expect(Math.hypot(...v)).toBeCloseTo(1, 14);
        });
        expect(vectors[0][0] * vectors[1][0] + vectors[0][1] * vectors[1][1]).toBeCloseTo(0, 14);
      }),
      { seed: 5, numRuns: 1000 },
    );
  });
  it('the root squared, and the inverse times the matrix', () => {
    const value = fc.double({ min: 0.01, max: 100, noNaN: true });
    const correlation = fc.double({ min: -0.99, max: 0.99, noNaN: true });
    fc.assert(
      fc.property(value, value, correlation, (s, t, r) => {
        const m: Symmetric2 = [s * s, r * s * t, t * t];
        const root = powerSymmetric2(m, 0.5);
        const first = multiplySymmetric2Vector(root, [root[0], root[1]]);
        const second = multiplySymmetric2Vector(root, [root[1], root[2]]);
        const size = s * s + t * t;
        close(first[0], m[0], size);
        close(first[1], m[1], size);
        close(second[1], m[2], size);
        const inverse = invertSymmetric2(m);
        const unit = multiplySymmetric2Vector(m, [inverse[0], inverse[1]]);
        expect(unit[0]).toBeCloseTo(1, 6);
        const again = powerSymmetric2(m, -1);
        expect(again[2] / inverse[2]).toBeCloseTo(1, 6);
      }),
      { seed: 6 },
    );
  });
});

describe('powers at the edge', () => {
  it('raises small eigenvalues to the floor', () => {
    expect(powerSymmetric2([4, 0, 0], -0.5, 1)).toEqual([0.5, 0, 1]);
    expect(powerSymmetric2([4, 0, -3], 0.5, 0)).toEqual([2, 0, 0]);
  });
  it('refuses a power that does not exist', () => {
    expect(() => powerSymmetric2([4, 0, 0], -1)).toThrow(RangeError);
    expect(() => powerSymmetric2([4, 0, -1], 0.5)).toThrow(
      'm: expected eigenvalues that can be raised to 0.5, received -1',
    );
    expect(() => invertSymmetric2([1, 1, 1])).toThrow('m: expected an invertible matrix, received [1, 1, 1]');
  });
});
