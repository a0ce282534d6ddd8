import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { fitErrorModel, fittedSigmaMm, sigmaAtMm, spreadMm } from '../../src/fit/index.js';
import {
  lengthWithin,
  longestSupportedKm,
  maximumBaseline,
  specSheetSigmaMm,
  type Tolerance,
  toleranceFactor,
  toleranceFactorAt,
} from '../../src/rule/index.js';

const tolerance = (limitMm: number, more: Partial<Tolerance> = {}): Tolerance => ({
  component: 'horizontal',
  limitMm,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
  ...more,
});

describe('factors', () => {
  // Rayleigh distribution, exact: R95 = 1.7308183826 DRMS; one Gaussian component: 1.9599639845.
  it('equal the Rayleigh and normal quantiles', () => {
    expect(toleranceFactor('horizontal', 0.95)).toBeCloseTo(1.7308183826, 9);
    expect(toleranceFactor('vertical', 0.95)).toBeCloseTo(1.9599639845, 9);
    expect(toleranceFactor('horizontal', 0.95) * Math.SQRT2).toBeCloseTo(2.4477468307, 9);
    expect(toleranceFactor('horizontal', 0.5)).toBeCloseTo(0.8325546112, 9);
  });
});

describe('the point value', () => {
  // Arithmetic of L = sqrt((T/1.7308)² - a²)/b with a = 8 mm, b = 1 ppm (derived independently, 4 decimals).
  it.each([
    [20, 8.3382],
    [25, 12.0264],
    [30, 15.3764],
    [50, 27.7586],
  ])('for %d mm is %d km', (limitMm, km) => {
    expect(lengthWithin(64, 1, limitMm / toleranceFactor('horizontal', 0.95))).toBeCloseTo(km, 3);
  });
  it('does not exist when the constant alone exceeds the limit', () => {
    expect(lengthWithin(64, 1, 13 / toleranceFactor('horizontal', 0.95))).toBeNull();
  });
});

describe('facts of the trade (common practice)', () => {
  it('1 ppm is 1 mm per km, about half a hundredth of a foot per mile', () => {
    expect(spreadMm('root-sum-square', 0, 1, 1)).toBe(1);
    const feetPerMile = spreadMm('root-sum-square', 0, 1, 1.609344) / 304.8;
    expect(feetPerMile).toBeGreaterThan(0.0045);
    expect(feetPerMile).toBeLessThan(0.0055);
  });
  it('with 8 mm + 1 ppm in root-sum-square distance hardly shows at 1 and 2 miles, starts to at 4, matters at 8, is too much at 16', () => {
    const growth = (miles: number): number => spreadMm('root-sum-square', 8, 1, miles * 1.609344) / 8 - 1;
    expect(growth(1)).toBeLessThan(0.03);
    expect(growth(2)).toBeLessThan(0.1);
    expect(growth(4)).toBeGreaterThan(0.2);
    expect(growth(4)).toBeLessThan(0.5);
    expect(growth(8)).toBeGreaterThan(0.8);
    // 16 miles: more than three times the constant, about 0.09 ft.
    expect(growth(16)).toBeGreaterThan(2);
    expect(spreadMm('root-sum-square', 8, 1, 16 * 1.609344) / 304.8).toBeGreaterThan(0.08);
  });
  it('linear and root-sum-square differ: 8 mm + 1 ppm at 10 km is 18 or 12.80624847 mm', () => {
    expect(spreadMm('linear-sum', 8, 1, 10)).toBe(18);
    expect(spreadMm('root-sum-square', 8, 1, 10)).toBeCloseTo(12.80624847, 8);
  });
});

describe('a rule', () => {
  const { rows } = simulateErrors({ seed: 12, days: 30 });
  const model = fitErrorModel(rows, { component: 'horizontal' });
  const rule = (limitMm: number, more?: Partial<Tolerance>) =>
    maximumBaseline(rows, model, tolerance(limitMm, more));

  it('is a lower limit: below the best estimate, longer for wider tolerances and less confidence', () => {
    const limits = [20, 22, 25, 28].map((limitMm) => rule(limitMm));
    for (const one of limits) expect(one.maximumBaselineKm!).toBeLessThan(one.bestEstimateKm!);
    const lengths = limits.map(({ maximumBaselineKm }) => maximumBaselineKm!);
    expect(lengths).toEqual([...lengths].sort((a, b) => a - b));
    expect(rule(25, { confidence: 0.6 }).maximumBaselineKm!).toBeGreaterThanOrEqual(
      rule(25).maximumBaselineKm!,
    );
    expect(rule(25, { share: 0.68 }).maximumBaselineKm!).toBeGreaterThan(rule(25).maximumBaselineKm!);
  });
  it('never goes beyond the length that the data support, and says so', () => {
    const capped = rule(500);
    expect(capped.maximumBaselineKm).toBe(longestSupportedKm(rows, 'horizontal'));
    expect(capped.bestEstimateKm).toBe(longestSupportedKm(rows, 'horizontal'));
    expect(capped.reason).toMatch(/because only one mark lies beyond \("M\d+" at [\d.]+ km\)/);
  });
  it('is 0 with a reason when the constant alone exceeds the tolerance', () => {
    const none = rule(5);
    expect(none.maximumBaselineKm).toBe(0);
    expect(none.bestEstimateKm).toBe(0);
    expect(none.reason).toContain('the constant alone exceeds the tolerance');
  });
  it('is null with a reason for a share beyond 95 %, below 15 days, and without far shots', () => {
    expect(rule(40, { share: 0.99 })).toMatchObject({
      maximumBaselineKm: null,
      bestEstimateKm: null,
      allDaysKm: null,
    });
    const days = [...new Set(rows.map(({ day }) => day))].sort();
    const some = (count: number) => rows.filter(({ day }) => day < days[count]!);
    const of = (part: typeof rows) =>
      maximumBaseline(part, fitErrorModel(part, { component: 'horizontal' }), tolerance(30));
    expect(of(some(14)).reason).toBe(
      '14 days are too few: a rule needs 15 days; add 1 with near and far shots',
    );
    expect(of(some(15)).maximumBaselineKm).toBeGreaterThan(0);
    expect(of(rows.filter(({ baselineKm }) => baselineKm < 1.5)).maximumBaselineKm).toBeNull();
  });
  it('rests on the occupations whose error is known in its component', () => {
    const near = rows.map((row) => (row.baselineKm > 9 ? { ...row, up: Number.NaN } : row));
    const vertical = maximumBaseline(
      near,
      fitErrorModel(near, { component: 'vertical' }),
      tolerance(200, { component: 'vertical' }),
    );
    expect(vertical.maximumBaselineKm!).toBeLessThanOrEqual(9);
    expect(vertical.conditions.occupations).toBe(near.filter(({ up }) => !Number.isNaN(up)).length);
    expect(vertical.conditions.marks.length).toBeLessThan(rule(25).conditions.marks.length);
  });
  it('takes the exact radius of an ellipse when east and north differ', () => {
    const oneSided = rows.map((row) => ({ ...row, east: row.east * 0.2 }));
    const fit = fitErrorModel(oneSided, { component: 'horizontal' });
    expect(fit.notes.map(({ code }) => code)).toContain('unequal-axes');
    const { bestEstimateKm } = maximumBaseline(oneSided, fit, tolerance(18));
    // At one ratio of the axes everywhere: the radius of 95 % by numerical integration, 1.970408 at 0.2 and 1.984196 at
    // 0.3 of the longer axis, over √(1 + ratio²).
    const { east, north } = fit.axes!;
    const ratio = fittedSigmaMm(east, bestEstimateKm!) / fittedSigmaMm(north, bestEstimateKm!);
    expect(ratio).toBeGreaterThan(0.18);
    expect(ratio).toBeLessThan(0.24);
    const factor = toleranceFactorAt(fit, 0.95, bestEstimateKm!);
    expect(factor * Math.hypot(1, ratio)).toBeGreaterThan(1.96896);
    expect(factor * Math.hypot(1, ratio)).toBeLessThan(1.9759);
    expect(factor * sigmaAtMm(fit, bestEstimateKm!)).toBeCloseTo(18, 6);
  });
  it('states its conditions', () => {
    const { conditions } = rule(25);
    expect(conditions.days).toBe(30);
    expect(conditions.occupations).toBe(rows.length);
    expect(conditions.from < conditions.to).toBe(true);
  });
});

describe('the supported length', () => {
  const shots = (mark: string, baselineKm: number, count: number, days: number) =>
    Array.from({ length: count }, (_, k) => ({ mark, baselineKm, day: `d${k % days}`, up: 1 }));
  it('needs 20 occupations on 5 days and 2 marks at or beyond it', () => {
    const near = shots('A', 1, 30, 10);
    expect(
      longestSupportedKm([...near, ...shots('B', 10, 10, 5), ...shots('C', 20, 10, 5)], 'vertical'),
    ).toBe(10);
    expect(longestSupportedKm([...near, ...shots('B', 10, 40, 10)], 'vertical')).toBe(1);
    expect(
      longestSupportedKm([...near, ...shots('B', 10, 10, 4), ...shots('C', 20, 10, 4)], 'vertical'),
    ).toBe(1);
    expect(longestSupportedKm(near, 'vertical')).toBeNull();
  });
});

describe('the spec sheet on the scale of the model', () => {
  const sheet = {
    horizontal: { constantMm: 8, ppm: 1 },
    vertical: { constantMm: 15, ppm: 1 },
    form: 'linear-sum',
  } as const;
  // Gaussian conversions: radial 68 % is 1.510 per-axis sigma, 95 % 2.448; per-axis 68 % 0.994, 95 % 1.960.
  it.each([
    ['radial', 'rms', 18],
    ['radial', '95', (18 / 2.4477468) * Math.SQRT2],
    ['radial', '68', (18 / 1.5095922) * Math.SQRT2],
    ['per-axis', 'rms', 18 * Math.SQRT2],
    ['per-axis', '95', (18 / 1.959964) * Math.SQRT2],
    ['per-axis', '68', (18 / 0.9944579) * Math.SQRT2],
  ] as const)('converts %s at level %s', (axis, level, radialRms) => {
    expect(specSheetSigmaMm({ ...sheet, axis, level }, 'horizontal', 10)).toBeCloseTo(radialRms, 5);
  });
  it('takes the vertical figure as one axis', () => {
    expect(specSheetSigmaMm({ ...sheet, axis: 'radial', level: '95' }, 'vertical', 10)).toBeCloseTo(
      25 / 1.959964,
      5,
    );
  });
});
