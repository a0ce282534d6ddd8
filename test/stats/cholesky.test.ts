import { describe, expect, it } from 'vitest';
import { choleskyFactor, choleskySolve } from '../../src/stats/index.js';

describe('Cholesky', () => {
  it('solves a system worked by hand, and finds what is not definite', () => {
    // [[4, 2], [2, 3]] x = [10, 9] has x = (1.5, 2).
    const factor = choleskyFactor([
      [4, 2],
      [2, 3],
    ])!;
    const [first, second] = choleskySolve(factor, [10, 9]);
    expect(first).toBeCloseTo(1.5, 14);
    expect(second).toBeCloseTo(2, 14);
    expect(
      choleskyFactor([
        [1, 2],
        [2, 4],
      ]),
    ).toBeNull();
    expect(
      choleskyFactor([
        [1, 2],
        [2, 1],
      ]),
    ).toBeNull();
    expect(() => choleskySolve(factor, [1])).toThrow(RangeError);
  });
});
