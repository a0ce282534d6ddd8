import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { fitErrorModel, screenWrongFixes } from '../../src/fit/index.js';
import { screeningNotes } from '../../src/fit/screening/screeningNotes.js';
import { normalDeviates, randomStream, shuffle } from '../../src/stats/index.js';
import { referenceErrors, referenceFits } from './reference.js';

// Source of expected numbers: an independent implementation in R 4.2 (fixtures/fits, with recipe); flagged rows exactly,
// other figures 1e-5 relative. R counts rows from 1.
const close = (actual: number, expected: number, relative = 1e-5): void => {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));
};
const rowsFrom1 = (rows: readonly number[]): number[] => rows.map((row) => row + 1);
const total = (weights: Float64Array): number => weights.reduce((sum, w) => sum + w, 0);
const SETS = ['ref1_mild15', 'ref2_heavy25_gross', 'ref3_linear_base10'];
const AXES = { U: 'up', E: 'east', N: 'north' } as const;

describe.each(SETS)('screening of %s', (name) => {
  const rows = referenceErrors(name);
  const reference = referenceFits(name);
  it('of all components together flags the rows that R flags', () => {
    const { em, gross_rate: share, U, H_component: H } = reference.pipeline;
    const screening = screenWrongFixes(rows, { residuals: 'errors' });
    expect(screening.converged).toBe(true);
    expect(screening.refused).toBe(false);
    expect(rowsFrom1(screening.suspected)).toEqual(em.rows_flagged);
    close(total(screening.weights), em.sum_w);
    close(screening.share!.estimate, share.rate, share.rate > 1e-4 ? 1e-4 : 0.2);
    if (share.rate > 1e-4) {
      close(screening.share!.designEffect, share.deff, 1e-4);
      close(screening.share!.low, share.ci[0], 1e-4);
      close(screening.share!.high, share.ci[1], 1e-4);
    }
    for (const [component, expected, scale] of [
      ['vertical', U, 1],
      ['horizontal', H, 2],
    ] as const) {
      const model = fitErrorModel(rows, { component, screen: true });
      expect(model.screened).toBe(true);
      close(model.variance!.A, scale * expected.A);
      close(model.variance!.B, scale * expected.B);
      const root = Math.sqrt(scale);
      close(model.ppm.low!, root * expected.targets.B.ci_sqrt[0], 1e-4);
      close(model.ppm.high!, root * expected.targets.B.ci_sqrt[1], 1e-4);
      close(model.constantMm.high!, root * expected.targets.A.ci_sqrt[1], 1e-4);
    }
  });
  it.each(Object.entries(AXES))('of %s alone flags the rows that R flags', (letter, column) => {
    const { em } = reference[letter];
    const alone = rows.map((row) => ({ day: row.day, baselineKm: row.baselineKm, up: row[column] }));
    const screening = screenWrongFixes(alone);
    expect(screening.components).toEqual(['up']);
    expect(rowsFrom1(screening.suspected)).toEqual(em.rows_flagged);
    close(total(screening.weights), em.sum_w);
    const model = fitErrorModel(alone, { component: 'vertical', weights: screening.weights });
    close(model.variance!.A, em.weighted_fit.A);
    close(model.variance!.B, em.weighted_fit.B);
  });
});

describe('screening where marks are in error', () => {
  const rows = referenceErrors('ref4_marks');
  const { em_on_mark_residuals: onMarks, em_on_absolute_errors: onErrors } = referenceFits('ref4_marks');
  it('takes each mark from its own median, by itself', () => {
    const screening = screenWrongFixes(rows);
    expect(screening.residuals).toBe('mark-medians');
    expect(rowsFrom1(screening.suspected)).toEqual(onMarks.rows_flagged);
    close(total(screening.weights), onMarks.sum_w, 1e-7);
    close(screening.share!.estimate, onMarks.eps, 1e-4);
    expect(screening.share!.events).toBe(5);
    expect(screening.notes.map(({ code }) => code)).toContain('marks-of-one-day');
  });
  it('takes the errors themselves when asked to', () => {
    const screening = screenWrongFixes(rows, { residuals: 'errors' });
    expect(rowsFrom1(screening.suspected)).toEqual(onErrors.rows_flagged);
    close(screening.share!.estimate, onErrors.eps, 1e-4);
  });
  it('takes the errors themselves where marks are hardly visited again', () => {
    const lone = rows.map((row, k) => ({ ...row, mark: `P${k}` }));
    expect(screenWrongFixes(lone).residuals).toBe('errors');
    const { mark: _, ...unnamed } = rows[0]!;
    expect(unnamed).not.toHaveProperty('mark');
    expect(screenWrongFixes(rows.map(({ mark, ...rest }) => rest)).residuals).toBe('errors');
  });
  it('finds wrong fixes on a mark 200 mm off only from its median', () => {
    const off = rows.map((row) => (row.mark === 'M03' ? { ...row, up: row.up + 200 } : row));
    expect(screenWrongFixes(off).suspected).toEqual(screenWrongFixes(rows).suspected);
    expect(screenWrongFixes(off, { residuals: 'errors' }).refused).toBe(true);
  });
});

/** A campaign in which a share of the occupations is replaced by errors of decimetres. */
function withWrongFixes(seed: number, share: number, days = 20) {
  const random = randomStream(seed, 'wrong');
  const wrong: number[] = [];
  const rows = simulateErrors({ seed, days }).rows.map((row, k) => {
    if (random() >= share) return row;
    wrong.push(k);
    const size = (): number => (random() < 0.5 ? -1 : 1) * 100 * 5 ** random();
    return { ...row, east: size(), north: size(), up: size() };
  });
  return { rows, wrong };
}

describe('laws of screening', () => {
  const { rows, wrong } = withWrongFixes(21, 0.01);
  const screening = screenWrongFixes(rows);
  it('finds the wrong ones and leaves the others whole', () => {
    expect(wrong.length).toBeGreaterThan(5);
    const found = new Set(screening.suspected);
    expect(wrong.filter((row) => found.has(row)).length).toBeGreaterThanOrEqual(0.9 * wrong.length);
    expect(screening.suspected.filter((row) => !wrong.includes(row)).length).toBeLessThanOrEqual(1);
    const codes = screening.notes.map(({ code }) => code);
    expect(codes).toContain('suspected-wrong-fixes');
  });
  it('does not depend on the order of rows, to the last bit', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const places = shuffle([...rows.keys()], randomStream(seed));
        const shuffled = screenWrongFixes(places.map((k) => rows[k]!));
        places.forEach((k, j) => {
          expect(shuffled.weights[j]).toBe(screening.weights[k]);
        });
        expect(shuffled.share).toEqual(screening.share);
        expect(shuffled.iterations).toBe(screening.iterations);
      }),
      { seed: 3, numRuns: 8 },
    );
  });
  it('never doubts an error within the guard, and gives one probability to a vector', () => {
    const [first] = rows.filter((_, k) => !wrong.includes(k));
    const small = [...rows, { ...first!, east: 0, north: 0, up: 0 }];
    expect(screenWrongFixes(small, { residuals: 'errors' }).weights.at(-1)).toBe(1);
    for (const [k, pi] of screening.responsibilities.entries()) {
      expect(pi).toBeGreaterThanOrEqual(0);
      expect(screening.weights[k]).toBe(1 - pi);
    }
  });
  it('judges a row by the components that are known of it', () => {
    const target = wrong.find((row) => screening.suspected.includes(row))!;
    const partly = rows.map((row, k) => {
      if (k === target || k % 3 === 0) return { ...row, up: Number.NaN };
      return k % 3 === 1 && !wrong.includes(k) ? { ...row, east: Number.NaN, north: Number.NaN } : row;
    });
    const found = screenWrongFixes(partly);
    expect(found.suspected).toContain(target);
    expect(found.responsibilities.every((pi) => !Number.isNaN(pi))).toBe(true);
    const planOnly = screenWrongFixes(rows.map(({ up, ...rest }) => rest));
    expect(planOnly.components).toEqual(['east', 'north']);
    expect(planOnly.suspected).toContain(target);
    expect(planOnly.notes.map(({ code }) => code)).toContain('screened-on-fewer-components');
  });
  it('leaves out rows without a length or any component, with weight 1', () => {
    const more = [
      ...rows,
      { ...rows[0]!, baselineKm: 0 },
      { ...rows[0]!, east: Number.NaN, north: Number.NaN, up: Number.NaN },
    ];
    const found = screenWrongFixes(more);
    expect([...found.weights.slice(-2)]).toEqual([1, 1]);
    expect(found.responsibilities.slice(-2).every(Number.isNaN)).toBe(true);
    expect([...found.weights.slice(0, -2)]).toEqual([...screening.weights]);
  });
});

describe('what screening says', () => {
  const codes = (rows: readonly object[]): string[] => screenWrongFixes(rows).notes.map(({ code }) => code);
  it('refuses when too much looks wrong, and weighs nothing', () => {
    const { rows } = withWrongFixes(5, 0.1);
    const found = screenWrongFixes(rows);
    expect(found.refused).toBe(true);
    expect(found.weights.every((w) => w === 1)).toBe(true);
    expect(found.suspected.length).toBeGreaterThan(0.05 * rows.length);
    const [note] = found.notes;
    expect(note!.code).toBe('screening-refused');
    expect(note!.text).toContain('Check the coordinates of marks and base and the project settings first');
    const model = fitErrorModel(rows, { component: 'vertical', screen: true });
    expect(model.screened).toBe(false);
    expect(model.notes.map(({ code }) => code)).toContain('screening-refused');
    expect(screenWrongFixes(withWrongFixes(6, 0.35).rows).notes[0]!.text).toContain(
      'too many gross errors to model',
    );
  });
  it('warns of a day with three suspects', () => {
    const { rows } = withWrongFixes(9, 0);
    const day = rows[0]!.day;
    let left = 3;
    const crowded = rows.map((row) =>
      row.day === day && left-- > 0 ? { ...row, east: 300, north: -250, up: 400 } : row,
    );
    const found = screenWrongFixes(crowded);
    expect(found.crowdedDays).toEqual([day]);
    expect(found.notes.map(({ code }) => code)).toContain('suspects-on-one-day');
    expect(found.share!.designEffect).toBeGreaterThan(1.5);
  });
  it('says when the search did not converge', () => {
    const found = screenWrongFixes(withWrongFixes(9, 0).rows);
    expect(found.notes.map(({ code }) => code)).not.toContain('screening-not-converged');
    const notes = screeningNotes({ ...found, converged: false }, 100, 0);
    expect(notes[0]).toMatchObject({ code: 'screening-not-converged', severity: 'warning' });
  });
  it('does not screen a handful, and says so', () => {
    const few = withWrongFixes(9, 0).rows.slice(0, 19);
    expect(codes(few)).toEqual(['too-few-to-screen']);
    expect(screenWrongFixes(few)).toMatchObject({ share: null, refused: false, suspected: [] });
  });
  it('takes errors that are half zeros, one length, or one component of zeros alone', () => {
    const normal = normalDeviates(randomStream(4));
    const made = (km: number, value: (k: number) => number) =>
      Array.from({ length: 60 }, (_, k) => ({ day: `d${k % 6}`, baselineKm: km, up: value(k), east: 0 }));
    for (const rows of [
      made(3, (k) => (k % 3 === 0 ? 10 * normal() : 0)),
      made(3, () => 10 * normal()),
      made(3, () => 0),
    ]) {
      const found = screenWrongFixes(rows);
      expect(found.converged).toBe(true);
      expect(found.weights.every((w) => w >= 0 && w <= 1)).toBe(true);
    }
  });
});

describe('misuse of screening and weights', () => {
  const { rows } = withWrongFixes(3, 0.01, 5);
  it.each([
    [{ residuals: 'marks' }, 'Expected "mark-medians" or "errors" as residuals, came "marks".'],
    [{ confidence: 95 }, 'Expected a number between 0.5 and 1 as confidence, came 95.'],
    [{ residual: 'errors' }, 'Expected one of residuals, confidence, came the option "residual".'],
  ])('names the option in %j', (options, text) => {
    expect(() => screenWrongFixes(rows, options as never)).toThrow(text);
  });
  it('names a missing column', () => {
    expect(() => screenWrongFixes([{ day: 'd', baselineKm: 1 }])).toThrow('came none of them');
    expect(() => screenWrongFixes([{ day: 'd', up: 1 }])).toThrow('Expected a column "baselineKm"');
    expect(() =>
      screenWrongFixes([{ day: 'd', baselineKm: 1, up: 1 }], { residuals: 'mark-medians' }),
    ).toThrow('Expected a column "mark"');
  });
  it('refuses weights that are none', () => {
    const fitted = (weights: unknown) => () =>
      fitErrorModel(rows, { component: 'vertical', weights: weights as Float64Array });
    expect(fitted(new Float64Array(3).fill(1))).toThrow('Expected one weight for each of');
    expect(fitted(new Float64Array(rows.length).fill(2))).toThrow(
      'Expected numbers from 0 to 1 as weights, came "2"',
    );
    expect(fitted(rows.map(() => 1))).toThrow('a Float64Array');
    expect(fitted(new Float64Array(rows.length))).toThrow('Expected a weight above 0');
  });
  it('weights of 1 change nothing, of 0 leave rows out', () => {
    const ones = new Float64Array(rows.length).fill(1);
    const plain = fitErrorModel(rows, { component: 'horizontal' });
    const weighted = fitErrorModel(rows, { component: 'horizontal', weights: ones });
    expect(weighted).toEqual({ ...plain, screened: true });
    const kept = rows.filter((_, k) => k % 4 !== 0);
    const zeros = ones.map((_, k) => (k % 4 === 0 ? 0 : 1));
    const without = fitErrorModel(kept, { component: 'horizontal' });
    const left = fitErrorModel(rows, { component: 'horizontal', weights: zeros });
    close(left.ppm.low!, without.ppm.low!, 1e-9);
    close(left.constantMm.high!, without.constantMm.high!, 1e-9);
  });
});
