import { describe, expect, it } from 'vitest';
import { spreadMm } from '../../src/fit/index.js';
import { circularUncertainty95, lengthWithin, toleranceFactor } from '../../src/rule/index.js';
import {
  chiSquareCdf,
  chiSquareQuantile,
  fQuantile,
  normalQuantile,
  radialQuantile,
} from '../../src/stats/index.js';

/*
 * Figures in public use that rules and standards rest on; each was computed independently in double precision from the
 * definition named beside it.
 */

describe('radial errors of two equal normals (Rayleigh)', () => {
  const within = (radius: number): number => 1 - Math.exp(-(radius ** 2) / 2);
  it('within one DRMS and two', () => {
    // DRMS = √2 σ. Our factor of that share must give back the radius.
    expect(within(Math.SQRT2)).toBeCloseTo(0.6321205588, 10);
    expect(within(2 * Math.SQRT2)).toBeCloseTo(0.9816843611, 10);
    expect(toleranceFactor('horizontal', 0.6321205588)).toBeCloseTo(1, 8);
    expect(toleranceFactor('horizontal', 0.9816843611)).toBeCloseTo(2, 7);
  });
  it('at 50, 90, 95 and 99 %', () => {
    for (const [share, radius] of [
      [0.5, 1.1774100226],
      [0.9, 2.1459660263],
      [0.95, 2.4477468307],
      [0.99, 3.0348542588],
    ] as const) {
      expect(Math.SQRT2 * toleranceFactor('horizontal', share)).toBeCloseTo(radius, 9);
      expect(radialQuantile(1, 1, share)).toBeCloseTo(radius, 9);
    }
    expect(radialQuantile(1, 1, 0.95) / radialQuantile(1, 1, 0.5)).toBeCloseTo(2.0789247449, 9);
    expect((2 * Math.SQRT2) / radialQuantile(1, 1, 0.95)).toBeCloseTo(1.15552274, 8);
  });
});

it('three equal normals hold 50, 90, 95 and 99 % within 1.538172, 2.500278, 2.795483 and 3.368214 σ', () => {
  for (const [share, radius] of [
    [0.5, 1.5381722545],
    [0.9, 2.500278],
    [0.95, 2.795483],
    [0.99, 3.368214],
  ] as const) {
    expect(Math.sqrt(chiSquareQuantile(share, 3))).toBeCloseTo(radius, 6);
    expect(chiSquareCdf(radius ** 2, 3)).toBeCloseTo(share, 6);
  }
});

it('the median of the absolute error becomes σ by 1.4826', () => {
  expect(1 / normalQuantile(0.75)).toBeCloseTo(1.4826022185, 9);
});

// The cubic of circular positional uncertainty (Leenhouts 1985, from memory; coefficients of Australian geodesists), and
// the mean-axis rule, against the exact radius: per cent of error of the mean rule.
it.each([
  [0, 1.96079, -37.6],
  [0.1, 1.962711, -31.4],
  [0.2, 1.969148, -25.5],
  [0.3, 1.98233, -19.8],
  [0.4, 2.004487, -14.55],
  [0.5, 2.037848, -9.83],
  [0.6, 2.084643, -5.92],
  [0.7, 2.147102, -3.05],
  [0.8, 2.227455, -1.23],
  [0.9, 2.327932, -0.28],
  [1, 2.450762, 0],
])('the circular uncertainty of axes 1 and %f is %f', (ratio, cubic, meanRule) => {
  expect(circularUncertainty95(1, ratio)).toBeCloseTo(cubic, 5);
  const exact = radialQuantile(1, ratio, 0.95);
  expect(100 * ((2.4477468307 * 0.5 * (1 + ratio)) / exact - 1)).toBeCloseTo(meanRule, 1);
});

// L = (T/1.7308 - a)/b and √((T/1.7308)² - a²)/b with a = 8 mm and b = 1 ppm as radial RMS.
it.each([
  [20, 8.3382, 3.5554],
  [25, 12.0264, 6.4442],
  [30, 15.3764, 9.333],
  [50, 27.7586, 20.8884],
])('a limit of %d mm ends 8 mm + 1 ppm at %f km, or %f km added linearly', (limitMm, squared, linear) => {
  const allowed = limitMm / 1.7308183826;
  expect(lengthWithin(64, 1, allowed)).toBeCloseTo(squared, 3);
  expect(lengthWithin(8, 1, allowed, 'linear-sum')).toBeCloseTo(linear, 3);
});

it('orders of relative positioning add constant and proportional part as squares (FGCC 1988/89, from memory)', () => {
  // s = √(e² + (0.1 p d)²), s and e in cm: e = 1, p = 10, d = 10 and e = 0.8, p = 1, d = 20.
  expect(spreadMm('root-sum-square', 10, 10, 10) / 10).toBeCloseTo(10.04987562, 8);
  expect(spreadMm('root-sum-square', 8, 1, 20) / 10).toBeCloseTo(2.15406592, 8);
});

it('has the limits of two-sample tests of a field test, and their inverses', () => {
  for (const [df, high, low] of [
    [56, 1.69756024, 0.58908071],
    [28, 2.12992429, 0.46950026],
    [14, 2.97858752, 0.3357296],
  ] as const) {
    expect(fQuantile(0.975, df, df)).toBeCloseTo(high, 7);
    expect(fQuantile(0.025, df, df)).toBeCloseTo(low, 7);
  }
  for (const [df, quantile, factor] of [
    [56, 74.46832416, 1.15316586],
    [28, 41.33713815, 1.21504171],
    [14, 23.6847913, 1.30068091],
    [8, 15.50731306, 1.39227],
  ] as const) {
    expect(chiSquareQuantile(0.95, df)).toBeCloseTo(quantile, 6);
    expect(Math.sqrt(chiSquareQuantile(0.95, df) / df)).toBeCloseTo(factor, 5);
  }
});
