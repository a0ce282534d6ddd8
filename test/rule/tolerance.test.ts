import { describe, expect, it } from 'vitest';
import { fitErrorModel } from '../../src/fit/index.js';
import { longestSupportedKm, marksBeyond } from '../../src/rule/supportedLength.js';
import { checkTolerance, toleranceFactor, toleranceFactorAt } from '../../src/rule/tolerance.js';

const good = { component: 'horizontal', limitMm: 25, share: 0.95, dayShare: 0.9, confidence: 0.95 } as const;

describe('a tolerance', () => {
  it('is taken when it can be', () => {
    expect(() => checkTolerance(good, 'horizontal')).not.toThrow();
  });
  it.each([
    [{ limitMm: 0 }, 'Expected a number above 0 as limitMm of a tolerance, came 0. Correct the tolerance.'],
    [{ limitMm: -3 }, 'Expected a number above 0 as limitMm of a tolerance, came -3. Correct the tolerance.'],
    [{ limitMm: Number.POSITIVE_INFINITY }, 'Expected a number above 0 as limitMm of a tolerance'],
    [{ limitMm: Number.NaN }, 'Expected a number above 0 as limitMm of a tolerance'],
    ...(['share', 'dayShare', 'confidence'] as const).flatMap((key) =>
      [0, 1, -0.1, 1.1, 95].map(
        (value) =>
          [
            { [key]: value },
            `Expected a number between 0 and 1 as ${key} of a tolerance, came ${value}.`,
          ] as const,
      ),
    ),
  ] as const)('is refused as %j', (wrong, text) => {
    expect(() => checkTolerance({ ...good, ...wrong }, 'horizontal')).toThrow(text);
  });
  it('is refused for another component than the model', () => {
    expect(() => checkTolerance(good, 'vertical')).toThrow(
      'Expected "vertical", that of the model, as component of a tolerance, came "horizontal". Correct the tolerance.',
    );
  });
});

/** Errors of so many occupations, at the lengths that `kmOf` says. */
const shots = (count: number, kmOf: (i: number) => number, days = 6, marks = 3) =>
  Array.from({ length: count }, (_, i) => ({
    day: `2025-03-0${1 + (i % days)}`,
    base: 'B',
    setup: 'B',
    mark: `M${i % marks}`,
    startMs: i * 60_000,
    solarHour: 9 + (i % 8),
    baselineKm: kmOf(i),
    azimuthDeg: 30,
    heightDifferenceM: 0,
    east: 5 * Math.sin(7 * i + 1),
    north: 5 * Math.cos(11 * i),
    up: 8 * Math.sin(5 * i),
  }));

describe('the factor of a share', () => {
  const model = fitErrorModel(
    shots(60, (i) => 1 + (i % 3) * 8),
    { component: 'horizontal', reference: 'absolute', screen: false },
  );
  const note = { code: 'unequal-axes', severity: 'info', text: 'East and north differ.' };
  const unequal = { ...model, notes: [note] } as unknown as typeof model;
  it('is that of Rayleigh for equal axes, and the normal one where axes differ and are not known', () => {
    // √(-ln 0.05) and the 97.5 % point of the normal distribution
    expect(toleranceFactorAt({ ...model, notes: [] }, 0.95, 5)).toBeCloseTo(1.730818, 6);
    expect(toleranceFactorAt({ ...unequal, axes: null }, 0.95, 5)).toBeCloseTo(1.959964, 6);
    expect(toleranceFactor('vertical', 0.95)).toBeCloseTo(1.959964, 6);
  });
  it('is the normal one at the base itself where neither axis has a constant', () => {
    const axis = { ...model.axes!.east, displayP: 0 };
    const bare = { ...unequal, axes: { east: axis, north: axis } } as unknown as typeof model;
    expect(toleranceFactorAt(bare, 0.95, 0)).toBeCloseTo(1.959964, 6);
  });
});

describe('the supported length', () => {
  it('begins with the twentieth occupation from the far end', () => {
    const km = (i: number): number => 40 - i;
    expect(longestSupportedKm(shots(30, km), 'horizontal')).toBe(21);
    expect(longestSupportedKm(shots(20, km), 'horizontal')).toBe(21);
    expect(longestSupportedKm(shots(19, km), 'horizontal')).toBeNull();
  });
  it('needs five days and two marks', () => {
    const km = (i: number): number => 40 - i;
    expect(longestSupportedKm(shots(30, km, 5), 'horizontal')).toBe(21);
    expect(longestSupportedKm(shots(30, km, 4), 'horizontal')).toBeNull();
    expect(longestSupportedKm(shots(30, km, 6, 2), 'horizontal')).toBe(21);
    expect(longestSupportedKm(shots(30, km, 6, 1), 'horizontal')).toBeNull();
  });
  it('says what a missing column is needed for', () => {
    const without = shots(30, (i) => i).map(({ baselineKm, ...rest }) => rest);
    expect(() => longestSupportedKm(without as never, 'horizontal')).toThrow('the supported length');
    expect(() => marksBeyond(without as never, 'horizontal', 3)).toThrow('the supported length');
  });
  it('leaves the marks beyond it, the nearest first', () => {
    const far = shots(9, (i) => [30, 10, 20][i % 3]!);
    expect(marksBeyond(far, 'horizontal', 10)).toEqual([
      { mark: 'M2', baselineKm: 20 },
      { mark: 'M0', baselineKm: 30 },
    ]);
    const same = shots(9, () => 12);
    expect(marksBeyond([...same].reverse(), 'horizontal', 10).map(({ mark }) => mark)).toEqual([
      'M0',
      'M1',
      'M2',
    ]);
  });
});
