import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normalQuantile, radialQuantile } from '../../src/stats/index.js';

// Source: numerical integration in independent code, double precision: ratio of the axes, radius of 50, 90 and 95 %.
const TABLE = [
  [0, 0.67449, 1.644854, 1.959964],
  [0.1, 0.681985, 1.647912, 1.96253],
  [0.2, 0.705854, 1.657313, 1.970408],
  [0.3, 0.749935, 1.673829, 1.984196],
  [0.4, 0.807853, 1.699183, 2.005137],
  [0.5, 0.870417, 1.73708, 2.035859],
  [0.6, 0.933651, 1.791522, 2.081304],
  [0.7, 0.996207, 1.86253, 2.145981],
  [0.8, 1.057693, 1.947158, 2.230287],
  [0.9, 1.118066, 2.04236, 2.331798],
] as const;

describe('radius of an elliptical error', () => {
  it.each(TABLE)('ratio %f of the axes', (ratio, half, ninety, ninetyFive) => {
    expect(radialQuantile(1, ratio, 0.5)).toBeCloseTo(half, 6);
    expect(radialQuantile(ratio, 1, 0.9)).toBeCloseTo(ninety, 6);
    expect(radialQuantile(1, ratio, 0.95)).toBeCloseTo(ninetyFive, 6);
  });
  it('is Rayleigh for a circle and the normal quantile for a line', () => {
    // R95 = 2.4477468307 σ, R99 = 3.0348542588 σ (exact distribution).
    expect(radialQuantile(3, 3, 0.95)).toBeCloseTo(3 * 2.4477468307, 9);
    expect(radialQuantile(1, 1, 0.99)).toBeCloseTo(3.0348542588, 9);
    expect(radialQuantile(0, 2, 0.95)).toBeCloseTo(2 * 1.9599639845, 9);
  });
  it('holds its share: mean over many directions of a dense grid', () => {
    // Direct sum of the density over polar cells, another formula than the one inside.
    const [sigma1, sigma2] = [1, 0.35];
    const radius = radialQuantile(sigma1, sigma2, 0.8);
    const [rings, spokes] = [2000, 720];
    let inside = 0;
    for (let i = 0; i < rings; i++) {
      const r = ((i + 0.5) * radius) / rings;
      for (let k = 0; k < spokes; k++) {
        const phi = ((k + 0.5) * 2 * Math.PI) / spokes;
        const power = ((r * Math.cos(phi)) / sigma1) ** 2 + ((r * Math.sin(phi)) / sigma2) ** 2;
        inside += r * Math.exp(-power / 2);
      }
    }
    const cell = (radius / rings) * ((2 * Math.PI) / spokes);
    expect((inside * cell) / (2 * Math.PI * sigma1 * sigma2)).toBeCloseTo(0.8, 6);
  });
  it('grows with both axes and the share, and scales', () => {
    const size = fc.double({ min: 0, max: 1, noNaN: true });
    const share = fc.double({ min: 0.01, max: 0.999, noNaN: true });
    fc.assert(
      fc.property(size, share, (ratio, p) => {
        const radius = radialQuantile(1, ratio, p);
        expect(radialQuantile(7, 7 * ratio, p)).toBeCloseTo(7 * radius, 8);
        expect(radius).toBeGreaterThanOrEqual(normalQuantile((1 + p) / 2) * (1 - 1e-12));
        expect(radius).toBeLessThanOrEqual(Math.sqrt(-2 * Math.log1p(-p)) * (1 + 1e-12));
        expect(radialQuantile(1, Math.min(1, ratio + 0.05), p)).toBeGreaterThanOrEqual(radius - 1e-12);
        expect(radialQuantile(1, ratio, p + (1 - p) / 10)).toBeGreaterThan(radius);
      }),
      { seed: 5, numRuns: 60 },
    );
  });
  it('refuses what is no ellipse or no share', () => {
    expect(() => radialQuantile(0, 0, 0.5)).toThrow(RangeError);
    expect(() => radialQuantile(1, -1, 0.5)).toThrow(RangeError);
    expect(() => radialQuantile(1, 1, 1)).toThrow(RangeError);
  });
});
