import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import type { OccupationError } from '../../src/errors/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { longestSupportedKm, noRule, type Rule } from '../../src/rule/index.js';
import type { ComponentFits } from '../../src/study/fitComponents.js';
import { ruleMoves } from '../../src/study/ruleMoves.js';

const { rows, truth } = simulateErrors({ seed: 4, days: 20 });
const errors = rows as unknown as OccupationError[];
const basis = fitErrorModel(rows, { component: 'horizontal' });
const components = [
  { component: 'horizontal', basis, fits: [{ model: basis, composed: false }] },
] as unknown as ComponentFits[];
const supportedKm = longestSupportedKm(rows, 'horizontal')!;
const tolerance = {
  component: 'horizontal',
  limitMm: 40,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
} as const;
const rule = (maximumBaselineKm: number): Rule => ({
  ...noRule([], tolerance, 'none'),
  maximumBaselineKm,
  longestSupportedKm: supportedKm,
});
/** A rule that ends where the data do, whatever they are. */
const moves = (stated: Rule) =>
  ruleMoves(errors, null, components, [stated], (ground) => [
    { ...stated, maximumBaselineKm: longestSupportedKm(ground.errors, 'horizontal') },
  ]);

describe('how a rule moves', () => {
  it('that ends with the data is seen without each of the two farthest marks', () => {
    const farthest = [...truth.marks].sort((a, b) => b.baselineKm - a.baselineKm).slice(0, 2);
    const found = moves(rule(supportedKm));
    for (const { mark } of farthest) {
      const without = found.find(({ subject }) => subject === mark)!;
      expect(['without a mark', 'without a far mark']).toContain(without.kind);
      expect(without.maximumBaselineKm!).toBeLessThan(supportedKm);
    }
    expect(found.some(({ kind }) => kind === 'without a far mark')).toBe(true);
  });
  it('that ends before the data do hangs on no far mark alone', () => {
    expect(moves(rule(supportedKm / 2)).map(({ kind }) => kind)).not.toContain('without a far mark');
  });
});
