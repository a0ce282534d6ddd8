import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel, sigmaAtMm } from '../../src/fit/index.js';
import { type SpecSheet, testSpecSheet } from '../../src/rule/index.js';

const { rows, truth } = simulateErrors({ seed: 21, days: 40 });
const model = fitErrorModel(rows, { component: 'horizontal' });
const days = dayModel(rows, model);
const { constantMm, longRunPpm } = truth.components.horizontal;
/** A sheet whose figures are the true ones times a factor. */
const sheet = (factor: number, more: Partial<SpecSheet> = {}): SpecSheet => ({
  horizontal: { constantMm: constantMm / factor, ppm: longRunPpm / factor },
  vertical: { constantMm: 1, ppm: 1 },
  form: 'root-sum-square',
  axis: 'radial',
  level: 'rms',
  ...more,
});
const verdict = (factor: number, options = { dayModel: days }) =>
  testSpecSheet(rows, model, sheet(factor), options).verdict;

describe('the spec sheet against the data', () => {
  it('is worse, better, not worse by more than 10 %, or not shown to differ', () => {
    expect(verdict(1.5)).toBe('worse');
    expect(verdict(0.5)).toBe('better');
    expect(verdict(0.82)).toMatch(/^(better|not worse by more than 10 %)$/);
    const few = rows.filter(({ day }) => day < truth.days[12]!.day);
    const fit = fitErrorModel(few, { component: 'horizontal' });
    expect(testSpecSheet(few, fit, sheet(1), { dayModel: dayModel(few, fit) }).verdict).toBe(
      'not shown to differ',
    );
  });
  it('calls nothing better without a model of days to come', () => {
    expect(testSpecSheet(rows, model, sheet(0.5)).verdict).toBe('not shown to differ');
  });
  it('calls nothing better on fewer than 30 days', () => {
    const few = rows.filter(({ day }) => day < truth.days[29]!.day);
    const fit = fitErrorModel(few, { component: 'horizontal' });
    const found = testSpecSheet(few, fit, sheet(0.5), { dayModel: dayModel(few, fit) });
    expect(found.verdict).toBe('not worse by more than 10 %');
    expect(found.sentence).toMatch(/^On the 29 days observed the horizontal errors are not worse/);
  });
  it('says by how many per cent, and at which lengths they are shown to be better', () => {
    const { sentence, ratios } = testSpecSheet(rows, model, sheet(0.5), { dayModel: days });
    for (const { ratio, low, high } of ratios) {
      const [most, least] = [low, high].map((each) => Math.round(100 * (1 - each)));
      expect(sentence).toContain(`${Math.round(100 * (1 - ratio))} % smaller (${least} to ${most} %)`);
    }
    expect(sentence).not.toContain('shown to be better');
    expect(testSpecSheet(rows, model, sheet(1.5), { dayModel: days }).sentence).toContain('% larger (');
    const steep = {
      ...sheet(1),
      horizontal: { constantMm: 0.97 * constantMm, ppm: 3 * longRunPpm },
    };
    const partly = testSpecSheet(rows, model, steep, { dayModel: days });
    expect(partly.verdict).not.toBe('better');
    expect(partly.sentence).toMatch(/At (5 km and )?10 km they are shown to be better\.$/);
  });
  it('compares like with like', () => {
    const { ratios } = testSpecSheet(rows, model, sheet(1), { dayModel: days });
    expect(ratios.map(({ baselineKm }) => baselineKm)).toEqual([1, 5, 10]);
    for (const { ratio, low, high, baselineKm } of ratios) {
      expect(ratio).toBeCloseTo(
        sigmaAtMm(model, baselineKm) / Math.hypot(constantMm, longRunPpm * baselineKm),
        10,
      );
      expect(low).toBeLessThan(ratio);
      expect(high).toBeGreaterThan(ratio);
    }
    // A per-axis figure at 95 % of the same errors: 1.959964/√2 times the radial RMS.
    const factor = 1.959963984540054 / Math.SQRT2;
    const same = testSpecSheet(rows, model, sheet(1 / factor, { axis: 'per-axis', level: '95' }), {
      dayModel: days,
    });
    for (const [k, each] of same.ratios.entries()) expect(each.ratio).toBeCloseTo(ratios[k]!.ratio, 8);
  });
  it('says when it cannot be judged', () => {
    const far = testSpecSheet(rows, model, sheet(1), { lengthsKm: [200] });
    expect(far).toMatchObject({ verdict: 'cannot be judged', ratios: [] });
    expect(far.sentence).toContain('Visit farther marks');
    const first = rows.filter(({ day }) => day < truth.days[3]!.day);
    expect(
      testSpecSheet(first, fitErrorModel(first, { component: 'horizontal' }), sheet(1)).sentence,
    ).toContain('the fit has no intervals');
  });
});
