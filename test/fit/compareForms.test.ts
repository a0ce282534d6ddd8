import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { compareForms } from '../../src/fit/index.js';
import { normalDeviates, randomStream } from '../../src/stats/index.js';
import { referenceErrors, referenceFits } from './reference.js';

// Source: R 4.2 (fixtures/fits, with recipe): leave-one-day-out log scores, 1e-8 relative.
describe.each(['ref1_mild15', 'ref3_linear_base10'])('forms of %s', (name) => {
  const rows = referenceErrors(name);
  const reference = referenceFits(name);
  it.each([
    ['U', 'up'],
    ['E', 'east'],
    ['N', 'north'],
  ] as const)('are told apart by component %s as R does', (letter, column) => {
    const { lodo } = reference[letter];
    const alone = rows.map((row) => ({ day: row.day, baselineKm: row.baselineKm, up: row[column] }));
    const comparison = compareForms(alone, { component: 'vertical' });
    expect(comparison.scores.map(({ day }) => day)).toEqual(lodo.day);
    comparison.scores.forEach(({ shots, rootSumSquare, against }, d) => {
      expect(shots).toBe(lodo.n[d]);
      expect(rootSumSquare / lodo.rss[d]).toBeCloseTo(1, 8);
      expect(against / lodo.linear[d]).toBeCloseTo(1, 8);
    });
    expect(comparison.gain! / lodo.mean_day_diff_per_shot).toBeCloseTo(1, 6);
    expect(comparison.se! / lodo.se_day).toBeCloseTo(1, 6);
    const { gain, se, verdict } = comparison;
    expect(verdict).toBe(
      gain! > se! ? 'root-sum-square' : gain! < -se! ? 'linear-sum' : 'cannot be told apart',
    );
  });
});

// Wrong fixes that are not screened make both forms fall back to the constant alone; rounding then named a winner.
it('names no form where both say the same', () => {
  const { rows } = simulateErrors({
    seed: 3,
    days: 16,
    markSigmaMm: { east: 5, north: 5, up: 5 },
    wrongFixes: { shareAt1Km: 0.01, shareAt12Km: 0.01 },
    base: { mounting: 'tripod' },
  });
  const { gain, verdict } = compareForms(rows, { component: 'horizontal' });
  expect(Math.abs(gain!)).toBeLessThan(1e-12);
  expect(verdict).toBe('cannot be told apart');
});

describe('the verdict', () => {
  function made(days: number, sigma: (km: number) => number, seed: number) {
    const normal = normalDeviates(randomStream(seed));
    return Array.from({ length: days }, (_, d) =>
      Array.from({ length: 60 }, (_, k) => 0.3 * 1.08 ** k).map((baselineKm) => {
        const draw = (): number => normal() * sigma(baselineKm);
        return { day: `d${String(d).padStart(3, '0')}`, baselineKm, east: draw(), north: draw(), up: draw() };
      }),
    ).flat();
  }
  it('names the true form where much data tell, in both components', () => {
    const squares = made(60, (km) => Math.hypot(8, km), 1);
    const linear = made(60, (km) => 4 + 0.8 * km, 2);
    for (const component of ['horizontal', 'vertical', 'east'] as const) {
      expect(compareForms(squares, { component })).toMatchObject({ verdict: 'root-sum-square', component });
      expect(compareForms(linear, { component })).toMatchObject({ verdict: 'linear-sum', days: 60 });
    }
  });
  it('of the radial error is that of two axes with one variance', () => {
    const rows = made(8, (km) => Math.hypot(8, km), 4).map((row) => ({
      ...row,
      east: row.up,
      north: row.up,
    }));
    const radial = compareForms(rows, { component: 'horizontal' });
    const single = compareForms(rows, { component: 'vertical' });
    radial.scores.forEach(({ rootSumSquare, against }, d) => {
      expect(rootSumSquare / (2 * single.scores[d]!.rootSumSquare)).toBeCloseTo(1, 9);
      expect(against / (2 * single.scores[d]!.against)).toBeCloseTo(1, 9);
    });
  });
  it('is none below four days, and counts days that cannot be left out', () => {
    const few = compareForms(
      made(3, () => 8, 1),
      { component: 'vertical' },
    );
    expect(few).toMatchObject({ gain: null, se: null, verdict: 'cannot be told apart' });
    expect(few.notes.map(({ code }) => code)).toEqual(['too-few-days-to-compare']);
    const near = Array.from({ length: 6 }, (_, d) => ({ day: `n${d}`, baselineKm: 1 + d / 10, up: 3 + d }));
    const lone = compareForms([...near, { day: 'far', baselineKm: 30, up: 40 }], { component: 'vertical' });
    expect(lone.days).toBe(6);
    expect(lone.notes[0]).toMatchObject({ code: 'days-not-compared' });
    expect(lone.notes[0]!.text).toContain('1 day takes no part');
  });
  it('refuses unknown options', () => {
    expect(() =>
      compareForms(
        made(4, () => 8, 1),
        { component: 'vertical', form: 'x' } as never,
      ),
    ).toThrow('came the option "form"');
  });
});
