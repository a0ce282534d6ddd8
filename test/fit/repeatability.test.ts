import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import {
  composeAbsolute,
  contrastEstimate,
  errorCurve,
  fitErrorModel,
  markComponent,
  referenceData,
  screenWrongFixes,
  sigmaUpperLimitMm,
  varianceLimits,
} from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';
import { referenceErrors, referenceFits, referenceWrongFixes } from './reference.js';

// Source of every expected number: an independent implementation in R 4.2 (fixtures/fits/marks.R), which a second one
// met within 1e-11.
const rows = referenceErrors('ref4_marks');
const fits = referenceFits('ref4_marks');
const without = (flagged: readonly number[]): Float64Array =>
  Float64Array.from(rows, (_, i) => (flagged.includes(i + 1) ? 0 : 1));

const BLOCKS = [
  ['known', without(referenceWrongFixes('ref4_marks')), 1e-9],
  ['em', screenWrongFixes(rows, { residuals: 'mark-medians' }).weights, 1e-6],
] as const;
const COMPONENTS = [
  ['U', 'vertical', 1],
  ['H', 'horizontal', 2],
] as const;

describe.each(BLOCKS)('repeatability with weights "%s"', (block, weights, tolerance) => {
  const close = (actual: number, expected: number): void => {
    expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(tolerance);
  };
  describe.each(COMPONENTS)('component %s', (letter, component, axes) => {
    const reference = fits[block][letter].repeatability;
    const model = fitErrorModel(rows, { component, reference: 'repeatability', weights });

    it('equals R in constant, ppm, correlation and intervals', () => {
      expect(model.occupations).toBe(reference.rows_used);
      close(model.fitted.p / axes, reference.A);
      close(model.fitted.q / axes, reference.B);
      close(model.repeatability!.rho, reference.rho);
      close(model.repeatability!.sharedMeans!.constant, reference.targets.A.phi);
      close(model.repeatability!.sharedMeans!.ppm, reference.targets.B.phi);
      const { terms, covariance } = model.uncertainty!;
      const contrasts = { A: [1, 0], B: [0, 1], s2_5: [1, 25], s2_10: [1, 100] } as const;
      for (const [target, contrast] of Object.entries(contrasts)) {
        const expected = reference.targets[target];
        const estimate = contrastEstimate(model.fitted.p, model.fitted.q, terms, covariance, contrast);
        close(estimate.standardError / axes, expected.se_CR3 * Math.sqrt(expected.phi));
        close(estimate.degreesOfFreedom, expected.df_used);
        const [low, high] = varianceLimits(estimate, 0.95);
        close(low / axes, expected.ci[0]);
        close(high / axes, expected.ci[1]);
      }
      close(model.ppm.low! ** 2 / axes, reference.targets.B.ci[0]);
      close(model.constantMm.high! ** 2 / axes, reference.targets.A.ci[1]);
    });

    it('equals R in the errors of the marks', () => {
      const { marks, sigmaMm, marksUsed, standing } = markComponent(model);
      const byName = [...marks].sort((a, b) => (a.mark < b.mark ? -1 : 1));
      expect(byName.map(({ mark }) => mark)).toEqual(reference.marks.mark);
      expect(byName.map(({ days }) => days)).toEqual(reference.marks.days);
      const means = letter === 'U' ? { U: reference.marks.mean } : reference.marks.mean;
      byName.forEach(({ meanMm, tauMm }, k) => {
        close(tauMm, reference.marks.se_model[k]);
        Object.values(means as Record<string, number[]>).forEach((column, c) => {
          expect(Math.abs(meanMm[c]! - column[k]!)).toBeLessThanOrEqual(Math.max(1e-3, tolerance) * tauMm);
        });
      });
      expect([marksUsed, standing]).toEqual([reference.K_marks, 'given']);
      close(sigmaMm.estimate! ** 2, reference.s_mark2);
      close(sigmaMm.low! ** 2, reference.s_mark2_ci[0]);
      close(sigmaMm.high! ** 2, reference.s_mark2_ci[1]);
    });

    it('equals R in the composed absolute model', () => {
      const composed = composeAbsolute(model).model!;
      const perAxis = (value: number | null): number => value! / Math.sqrt(axes);
      close(perAxis(composed.constantMm.estimate), reference.absolute.a);
      close(perAxis(composed.constantMm.low), reference.absolute.a_ci[0]);
      close(perAxis(composed.constantMm.high), reference.absolute.a_ci[1]);
      const [point] = errorCurve(composed, [10]);
      close(perAxis(point!.lowMm), reference.absolute.sigma10_ci[0]);
      close(perAxis(point!.highMm), reference.absolute.sigma10_ci[1]);
      expect(composed.ppm).toEqual(model.ppm);
      expect(composed.reference).toBe('absolute');
      expect(sigmaUpperLimitMm(composed, 10, 0.95)!).toBeLessThan(point!.highMm!);
      expect(sigmaUpperLimitMm(composed, 10, 0.95)!).toBeGreaterThan(point!.sigmaMm);
    });
  });
});

const simulated = simulateErrors({ seed: 8, days: 24, markSigmaMm: { east: 5, north: 5, up: 8 } }).rows;
const OPTIONS = { component: 'vertical', reference: 'repeatability' } as const;
const numbers = ({ constantMm, ppm }: ReturnType<typeof fitErrorModel>): (number | null)[] => [
  constantMm.estimate,
  constantMm.low,
  constantMm.high,
  ppm.estimate,
  ppm.low,
  ppm.high,
];

describe('laws of repeatability', () => {
  const model = fitErrorModel(simulated, OPTIONS);
  const marks = [...new Set(simulated.map(({ mark }) => mark))];

  it('does not see what is the same on a mark every day', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -500, max: 500, noNaN: true }), {
          minLength: marks.length,
          maxLength: marks.length,
        }),
        (shifts) => {
          const shifted = simulated.map((row) => ({ ...row, up: row.up + shifts[marks.indexOf(row.mark)]! }));
          numbers(fitErrorModel(shifted, OPTIONS)).forEach((value, k) => {
            expect(value! / numbers(model)[k]!).toBeCloseTo(1, 7);
          });
        },
      ),
      { seed: 3, numRuns: 10 },
    );
  });

  it('does not depend on the order of rows, to the last bit', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const shuffled = fitErrorModel(shuffle(simulated, randomStream(seed)), OPTIONS);
        expect(numbers(shuffled)).toEqual(numbers(model));
        expect(composeAbsolute(shuffled).model!.constantMm).toEqual(composeAbsolute(model).model!.constantMm);
      }),
      { seed: 4, numRuns: 10 },
    );
  });

  it('doubles when errors double', () => {
    const doubled = simulated.map((row) => ({ ...row, up: 2 * row.up }));
    numbers(fitErrorModel(doubled, OPTIONS)).forEach((value, k) => {
      expect(value! / numbers(model)[k]!).toBeCloseTo(2, 8);
    });
  });

  it('with one occupation a day on each mark is the spread about the mark, n - 1 in the denominator', () => {
    const once = [1, 4, 9].flatMap((baselineKm, m) =>
      [0, 1, 2, 3, 4, 5].map((d) => ({
        day: `2025-01-0${d + 1}`,
        mark: `M${m}`,
        baselineKm,
        up: 10 * m + ((7 * d + 5 * m) % 11) * (m + 1),
      })),
    );
    const { data, repeatability } = referenceData(once, OPTIONS);
    expect(repeatability!.rho).toBe(0);
    for (const m of [0, 1, 2]) {
      const own = once.filter(({ mark }) => mark === `M${m}`).map(({ up }) => up);
      const mean = own.reduce((a, b) => a + b) / own.length;
      const variance = own.reduce((sum, up) => sum + (up - mean) ** 2, 0) / (own.length - 1);
      const ours = Array.from(data.y).filter((_, i) => data.mark![i] === `M${m}`);
      expect(ours.reduce((a, b) => a + b) / ours.length).toBeCloseTo(variance, 8);
    }
  });

  it('counts an error of a base as scatter from day to day where there are several', () => {
    const bases = simulated.map((row) => {
      const second = row.day > '2025-03-18';
      return { ...row, base: second ? 'B2' : 'B1', up: row.up + (second ? 60 : 0) };
    });
    const two = fitErrorModel(bases, OPTIONS).constantMm.estimate!;
    expect(two).toBeGreaterThan(30);
    expect(model.constantMm.estimate!).toBeLessThan(20);
  });

  it('holds the true constant and ppm where marks are in error, and the direct fit does not', () => {
    let [repeated, direct, composed, studies] = [0, 0, 0, 0];
    for (let seed = 1; seed <= 12; seed++) {
      const { rows: errors, truth } = simulateErrors({
        seed,
        days: 40,
        markSigmaMm: { east: 8, north: 8, up: 12 },
        marks: { count: 8, nearestKm: 0.5, farthestKm: 14 },
      });
      const { constantMm, longRunPpm } = truth.components.vertical;
      const holds = ({ low, high }: { low: number | null; high: number | null }, value: number): number =>
        Number(value >= low! && value <= high!);
      const own = fitErrorModel(errors, OPTIONS);
      repeated += holds(own.constantMm, constantMm) + holds(own.ppm, longRunPpm);
      direct += holds(
        fitErrorModel(errors, { component: 'vertical' }).constantMm,
        Math.hypot(constantMm, 12),
      );
      composed += holds(composeAbsolute(own).model!.constantMm, Math.hypot(constantMm, 12));
      studies += 1;
    }
    // Documented coverage about 0.95: of 24 and 12 fewer than 20 and 9 would be chance of about 1 in 200.
    expect(repeated).toBeGreaterThanOrEqual(20);
    expect(composed).toBeGreaterThanOrEqual(9);
    expect(direct).toBeLessThan(composed);
    expect(studies).toBe(12);
  });
});

describe('what repeatability needs', () => {
  it('names the missing column and what asked for it', () => {
    const plain = simulated.map(({ day, baselineKm, up }) => ({ day, baselineKm, up }));
    expect(() => fitErrorModel(plain, OPTIONS)).toThrow(
      'Expected a column "mark" in the errors, needed for reference "repeatability", came "day", "baselineKm", "up". Add the column or change the option.',
    );
  });
  it('refuses marks that were never visited again', () => {
    const once = simulated.map((row) => ({ ...row, mark: `${row.mark} ${row.day}` }));
    expect(() => fitErrorModel(once, OPTIONS)).toThrow('no mark was visited on two days');
  });
  it('refuses a log that repeats one position on each mark', () => {
    const still = simulated.map((row) => ({ ...row, up: marksIndex(row.mark) + 1 }));
    expect(() => fitErrorModel(still, OPTIONS)).toThrow('came the same error on every day');
  });
  it('counts occupations on marks visited on one day', () => {
    const lone = { ...simulated[0]!, mark: 'lone' };
    const { occupations, notes, repeatability } = fitErrorModel([...simulated, lone], OPTIONS);
    expect(occupations).toBe(simulated.length);
    expect(repeatability!.setAside).toBe(1);
    expect(notes.find(({ code }) => code === 'marks-on-one-day')!.text).toMatch(/^1 occupation on marks/);
  });
  it('composes nothing from fewer than three marks, and calls three to five indicative', () => {
    const only = (count: number) => {
      const kept = [...new Set(simulated.map(({ mark }) => mark))].slice(0, count);
      return composeAbsolute(
        fitErrorModel(
          simulated.filter(({ mark }) => kept.includes(mark)),
          OPTIONS,
        ),
      );
    };
    expect(only(2).model).toBeNull();
    expect(only(2).notes.map(({ code }) => code)).toContain('mark-component-unknown');
    expect(only(4).model).not.toBeNull();
    expect(only(4).notes.map(({ code }) => code)).toContain('mark-component-indicative');
  });
  it('composes only the root-sum-square form', () => {
    const linear = fitErrorModel(simulated, { ...OPTIONS, form: 'linear-sum' });
    expect(linear.repeatability!.rho).toBe(fitErrorModel(simulated, OPTIONS).repeatability!.rho);
    expect(() => composeAbsolute(linear)).toThrow('the errors of marks add to its square only');
  });
  it('composes only from repeatability', () => {
    expect(() => composeAbsolute(fitErrorModel(simulated, { component: 'vertical' }))).toThrow(
      'Expected a fit of reference "repeatability"',
    );
  });
  it('tells of marks whose errors grow with distance', () => {
    for (const [component, stretch] of [
      ['horizontal', { east: 1, north: 1, up: 0 }],
      ['vertical', { east: 0, north: 0, up: 1 }],
    ] as const) {
      const stretched = simulated.map((row) => {
        const direction = (row.azimuthDeg * Math.PI) / 180;
        const along = 4 * row.baselineKm;
        return {
          ...row,
          east: row.east + stretch.east * along * Math.sin(direction),
          north: row.north + stretch.north * along * Math.cos(direction),
          up: row.up + stretch.up * along + 30,
        };
      });
      const found = markComponent(fitErrorModel(stretched, { component, reference: 'repeatability' }));
      expect(found.trend!.significant).toBe(true);
      expect(found.trend!.low).toBeLessThan(4.5);
      expect(found.trend!.high).toBeGreaterThan(3.5);
      const note = found.notes.find(({ code }) => code === 'marks-off-with-distance')!;
      expect(note.text).toMatch(/by \+[34]\.\d\d mm per km and the same on every day/);
    }
  });
});

const marksIndex = (mark: string): number => [...new Set(simulated.map((row) => row.mark))].indexOf(mark);
