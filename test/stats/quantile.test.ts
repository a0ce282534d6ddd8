import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { median, quantile } from '../../src/stats/quantile.js';
import { dot, sum } from '../../src/stats/summation.js';

const values = Object.freeze([7, 15, 36, 39, 40, 41]);

describe('quantile, type 7', () => {
  // R 4.2.2: quantile(c(7, 15, 36, 39, 40, 41), p, type = 7)
  it.each([
    [0, 7],
    [0.1, 11],
    [0.25, 20.25],
    [0.5, 37.5],
    [0.75, 39.75],
    [0.95, 40.75],
    [1, 41],
  ])('%d of six values', (p, expected) => {
    expect(quantile(values, p)).toBeCloseTo(expected, 13);
  });
  it('takes values in any order and leaves them so', () => {
    const mixed = Object.freeze([40, 7, 41, 15, 39, 36]);
    expect(quantile(mixed, 0.25)).toBeCloseTo(20.25, 13);
    const typed = Float64Array.of(3, 1, 2);
    expect(median(typed)).toBe(2);
    expect([...typed]).toEqual([3, 1, 2]);
  });
  it('sorts by number, not by text, and takes infinities', () => {
    expect(median([10, 9, -100])).toBe(9);
    expect(median([Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY])).toBe(Number.POSITIVE_INFINITY);
    expect(quantile([1, Number.POSITIVE_INFINITY, 0], 0.5)).toBe(1);
  });
  it('one value is every quantile', () => {
    expect([quantile([4], 0), quantile([4], 0.3), median([4])]).toEqual([4, 4, 4]);
  });
  it.each([
    [() => quantile([], 0.5), 'values: expected at least one number, received none'],
    [() => median([]), 'values: expected at least one number, received none'],
    [() => median([1, Number.NaN, 2]), 'values: expected numbers, received NaN'],
    [() => quantile([1], 1.1), 'p: expected a number from 0 to 1, received 1.1'],
    [() => quantile([1], Number.NaN), 'p: expected a number from 0 to 1, received NaN'],
  ])('misuse (%#)', (call, message) => {
    expect(call).toThrow(new RangeError(message));
  });
  it('grows with p and stays within the values', () => {
    const number = fc.double({ min: -1e6, max: 1e6, noNaN: true });
    const p = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.array(number, { minLength: 1 }), p, p, (set, a, b) => {
        const low = quantile(set, Math.min(a, b));
        const high = quantile(set, Math.max(a, b));
        expect(high).toBeGreaterThanOrEqual(low);
        expect(low).toBeGreaterThanOrEqual(Math.min(...set));
        expect(high).toBeLessThanOrEqual(Math.max(...set));
      }),
      { seed: 7 },
    );
  });
});

describe('sum', () => {
  it('keeps what a plain sum loses', () => {
    // Neumaier's own example
    expect(sum([1, 1e100, 1, -1e100])).toBe(2);
    expect(sum(new Array<number>(10).fill(0.1))).toBe(1);
    expect(sum([])).toBe(0);
    expect(sum([1, Number.POSITIVE_INFINITY, 2])).toBe(Number.POSITIVE_INFINITY);
    expect(sum([1, Number.NaN])).toBeNaN();
  });
  it('hardly depends on the order', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -1e9, max: 1e9, noNaN: true })), (set) => {
        const size = set.reduce((total, value) => total + Math.abs(value), 0);
        const sorted = [...set].sort((a, b) => a - b);
        const expected = sum(set);
        // one rounding of the result, and second-order terms of the size
        const limit = 2 ** -52 * Math.abs(expected) + 1e-28 * size;
        expect(Math.abs(sum([...set].reverse()) - expected)).toBeLessThanOrEqual(limit);
        expect(Math.abs(sum(sorted) - expected)).toBeLessThanOrEqual(limit);
      }),
      { seed: 8 },
    );
  });
});

describe('dot', () => {
  it('is right where a plain sum of products is lost', () => {
    // (1 + 2^-30)(1 − 2^-30) − 1 = −2^-60 exactly
    const d = 2 ** -30;
    expect(dot(Float64Array.of(1 + d, 1), Float64Array.of(1 - d, -1))).toBe(-(2 ** -60));
    expect(dot(new Float64Array(0), new Float64Array(0))).toBe(0);
    expect(() => dot(Float64Array.of(1), new Float64Array(2))).toThrow(
      new RangeError('b: expected 1 values as in a, received 2'),
    );
  });
});
