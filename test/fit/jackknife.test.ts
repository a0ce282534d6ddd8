import { describe, expect, it } from 'vitest';
import {
  fitErrorModel,
  fitWithoutEachDay,
  fitWithoutEachMark,
  jackknifeByDay,
  screenWrongFixes,
} from '../../src/fit/index.js';
import { studentTQuantile } from '../../src/stats/index.js';
import { referenceErrors, referenceFits } from './reference.js';

// Source: R 4.2 (fixtures/fits, with recipe), 1e-8 relative on B, 1e-6 on the standard error.
describe.each(['ref1_mild15', 'ref3_linear_base10'])('jackknife of %s', (name) => {
  const rows = referenceErrors(name);
  const reference = referenceFits(name);
  it.each([
    ['U', 'vertical'],
    ['E', 'east'],
    ['N', 'north'],
  ] as const)('component %s has the standard error of R', (letter, component) => {
    const { rss, jackknife: expected } = reference[letter];
    const { ppm, standardErrorOfLog, influence, notes } = jackknifeByDay(rows, { component });
    // R takes the logarithm of b².
    expect((2 * standardErrorOfLog!) / expected.se_logB).toBeCloseTo(1, 6);
    const half = studentTQuantile(0.975, rss.targets.B.df_used) * (expected.se_logB / 2);
    expect(ppm.estimate! / Math.sqrt(rss.B)).toBeCloseTo(1, 8);
    expect(ppm.low! / (Math.sqrt(rss.B) * Math.exp(-half))).toBeCloseTo(1, 6);
    expect(ppm.high! / (Math.sqrt(rss.B) * Math.exp(half))).toBeCloseTo(1, 6);
    expect(notes).toEqual([]);
    const changes: number[] = expected.B.map((B: number) => Math.abs(Math.sqrt(B / rss.B) - 1));
    expect(influence).toHaveLength(expected.day.length);
    expect(influence[0]!.day).toBe(expected.day[changes.indexOf(Math.max(...changes))]);
    influence.forEach(({ day, ppmWithout }) => {
      expect(ppmWithout / Math.sqrt(expected.B[expected.day.indexOf(day)])).toBeCloseTo(1, 8);
    });
  });
});

describe('leaving out', () => {
  const rows = referenceErrors('ref2_heavy25_gross');
  const { weights } = screenWrongFixes(rows, { residuals: 'errors' });
  it.each(['root-sum-square', 'linear-sum'] as const)(
    'a day or a mark is fitting without its rows, %s',
    (form) => {
      const options = { component: 'vertical', form, weights } as const;
      const days = fitWithoutEachDay(rows, options);
      const marks = fitWithoutEachMark(rows, options);
      expect(marks).toHaveLength(new Set(rows.map(({ mark }) => mark)).size);
      for (const [left, key] of [
        [days[3]!.day, 'day'],
        [days[11]!.day, 'day'],
        [marks[2]!.mark, 'mark'],
      ] as const) {
        const kept = [...rows.keys()].filter((k) => rows[k]![key] !== left);
        const fit = fitErrorModel(
          kept.map((k) => rows[k]!),
          { ...options, weights: Float64Array.from(kept, (k) => weights[k]!) },
        );
        const without =
          key === 'day' ? days.find(({ day }) => day === left)! : marks.find(({ mark }) => mark === left)!;
        expect(without.constantMm! / fit.constantMm.estimate!).toBeCloseTo(1, 8);
        expect(without.ppm! / fit.ppm.estimate!).toBeCloseTo(1, 8);
      }
    },
  );
  it('gives no interval where one day alone makes the distance term positive, and says so', () => {
    const near = Array.from({ length: 60 }, (_, k) => ({
      day: `d${k % 6}`,
      baselineKm: 0.5 + (k % 10) / 2,
      up: k % 2 === 0 ? 8 : -8,
    }));
    const far = [7, 8, 9, 10].map((baselineKm) => ({ day: 'far', baselineKm, up: 3 * baselineKm }));
    const { ppm, notes, standardErrorOfLog } = jackknifeByDay([...near, ...far], { component: 'vertical' });
    expect(ppm.estimate).toBeGreaterThan(0);
    expect(ppm).toMatchObject({ low: null, high: null });
    expect(standardErrorOfLog).toBeNull();
    expect(notes[0]).toMatchObject({ code: 'no-jackknife-interval' });
    expect(notes[0]!.text).toContain('without day far');
    expect(
      jackknifeByDay(
        near.map((row) => ({ ...row, baselineKm: 5 })),
        { component: 'vertical' },
      ).notes[0]!.text,
    ).toContain('too alike');
  });
  it('names a missing column', () => {
    expect(() => fitWithoutEachMark([{ day: 'd', baselineKm: 1, up: 1 }], { component: 'vertical' })).toThrow(
      'Expected a column "mark"',
    );
  });
});
