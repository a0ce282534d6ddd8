import { describe, expect, it } from 'vitest';
import { usesLogScale, varianceLimits } from '../../src/fit/intervals.js';

describe('limits of a variance', () => {
  // The 97.5 % point of Student's t with 10 degrees of freedom is 2.228139 (any table).
  it('are on the log scale beyond two standard errors only', () => {
    expect(usesLogScale({ value: 2.01, standardError: 1, degreesOfFreedom: 10 })).toBe(true);
    expect(usesLogScale({ value: 2, standardError: 1, degreesOfFreedom: 10 })).toBe(false);
    const [low, high] = varianceLimits({ value: 4, standardError: 1, degreesOfFreedom: 10 }, 0.95);
    expect(low).toBeCloseTo(4 * Math.exp(-2.228139 / 4), 5);
    expect(high).toBeCloseTo(4 * Math.exp(2.228139 / 4), 5);
  });
  it('are cut at 0 below, and above never less than what chance alone allows', () => {
    const [low, high] = varianceLimits({ value: 1, standardError: 3, degreesOfFreedom: 10 }, 0.95);
    expect(low).toBe(0);
    expect(high).toBeCloseTo(1 + 3 * 2.228139, 5);
    const negative = varianceLimits({ value: -50, standardError: 3, degreesOfFreedom: 10 }, 0.95);
    expect(negative[0]).toBe(0);
    expect(negative[1]).toBeCloseTo(3 * 2.228139, 5);
  });
});
