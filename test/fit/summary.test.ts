import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import {
  coefficientTable,
  compareForms,
  composeAbsolute,
  type ErrorModel,
  type FitComponent,
  fitErrorModel,
  formatFit,
  jackknifeByDay,
  screenWrongFixes,
  sigmaAtMm,
} from '../../src/fit/index.js';

const { rows } = simulateErrors({
  seed: 3,
  days: 16,
  markSigmaMm: { east: 5, north: 5, up: 5 },
  wrongFixes: { shareAt1Km: 0.01, shareAt12Km: 0.01 },
  base: { mounting: 'tripod' },
});
const references = ['absolute', 'repeatability', 'relative'] as const;
const forms = ['root-sum-square', 'linear-sum'] as const;
const components = ['horizontal', 'vertical', 'east'] as const;

const models: ErrorModel<FitComponent>[] = components.flatMap((component) =>
  references.flatMap((reference) =>
    forms.map((form) => fitErrorModel(rows, { component, reference, form, screen: true })),
  ),
);
const repeatable = fitErrorModel(rows, { component: 'horizontal', reference: 'repeatability', screen: true });
const composed = composeAbsolute(repeatable).model!;

describe('a fit is a value', () => {
  it('that comes back from JSON as it was, in every reference and form', () => {
    for (const model of [...models, composed]) expect(JSON.parse(JSON.stringify(model))).toEqual(model);
  });
  it('that states the options it was made with', () => {
    const model = fitErrorModel(rows, {
      component: 'vertical',
      reference: 'relative',
      form: 'linear-sum',
      confidence: 0.9,
      screen: true,
    });
    expect(model).toMatchObject({
      component: 'vertical',
      reference: 'relative',
      form: 'linear-sum',
      confidence: 0.9,
      screened: true,
    });
  });
  it('that draws nothing at random: equal errors give equal bytes', () => {
    const again = fitErrorModel([...rows].reverse(), {
      component: 'horizontal',
      reference: 'repeatability',
      screen: true,
    });
    expect(JSON.stringify(again)).toBe(JSON.stringify(repeatable));
  });
});

describe('the table of a fit', () => {
  it('holds its numbers and their limits', () => {
    for (const model of [...models, composed]) {
      const table = coefficientTable(model);
      expect(table[0]).toEqual({ name: 'constant', unit: 'mm', ...model.constantMm });
      expect(table[1]).toEqual({ name: 'ppm', unit: 'mm per km', ...model.ppm });
      const at10 = table.find(({ name }) => name === 'spread at 10 km')!;
      expect(at10.estimate).toBe(sigmaAtMm(model, 10));
      for (const { estimate, low, high } of table) {
        if (estimate !== null && low !== null && high !== null) {
          expect(low).toBeLessThanOrEqual(estimate);
          expect(high).toBeGreaterThanOrEqual(estimate);
        }
      }
    }
  });
  it('states no spread where no shots were', () => {
    const near = fitErrorModel(
      rows.filter(({ baselineKm }) => baselineKm < 9),
      { component: 'vertical' },
    );
    const names = coefficientTable(near).map(({ name }) => name);
    expect(names).toContain('spread at 5 km');
    expect(names).not.toContain('spread at 10 km');
  });
});

describe('a fit in words', () => {
  it('says what it is counted from, its form, its data, its intervals, its marks and its notes', () => {
    const { weights } = screenWrongFixes(rows);
    const text = formatFit(composed, {
      comparison: compareForms(rows, { component: 'horizontal', weights }),
      jackknife: jackknifeByDay(rows, { component: 'horizontal', weights }),
    });
    const line = text.replaceAll(/\s+/g, ' ');
    expect(text.split('\n')[0]).toBe('Horizontal error model, radial RMS');
    expect(line).toContain('the published coordinates (absolute); constant from repeatability');
    expect(line).toContain('spread² = constant² + (ppm × km)² (root-sum-square)');
    expect(line).toContain(
      `${composed.occupations} occupations on 16 days and 14 marks, ${composed.shortestKm.toFixed(1)} to`,
    );
    const { estimate, low, high } = composed.ppm;
    expect(line).toContain(
      `ppm, mm per km ${estimate!.toFixed(2)} ${low!.toFixed(2)} to ${high!.toFixed(2)} spread`,
    );
    expect(line).toContain('95 % interval');
    expect(line).toContain('suspected ones count less');
    expect(line).toContain('They count days, not shots');
    expect(line).toMatch(/errors of marks, mm per axis \d/);
    expect(line).toMatch(/correlate by 0\.\d\d\. Days share the means of marks/);
    expect(line).toMatch(/left out/);
    expect(line).toContain('The day that moves the ppm most is 2025-');
    for (const { text: note } of composed.notes) expect(line).toContain(note);
  });
  it('fits a terminal and never says undefined, null or NaN, however thin the data', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 9 }), fc.integer({ min: 1, max: 14 }), (days, marks) => {
        const someDays = [...new Set(rows.map(({ day }) => day))].slice(0, days);
        const someMarks = [...new Set(rows.map(({ mark }) => mark))].sort().slice(-marks);
        const some = rows.filter(({ day, mark }) => someDays.includes(day) && someMarks.includes(mark));
        fc.pre(some.length > 0);
        for (const form of forms) {
          const text = formatFit(fitErrorModel(some, { component: 'horizontal', form }));
          expect(text).not.toMatch(/undefined|null|NaN|Infinity/);
          for (const one of text.split('\n')) expect(one.length).toBeLessThanOrEqual(100);
        }
      }),
      { seed: 5, numRuns: 40 },
    );
  });
  it('gives an upper limit where no more can be said', () => {
    const few = rows.filter(({ baselineKm, wrongFix }) => baselineKm < 4 && !wrongFix);
    const model = fitErrorModel(few, { component: 'vertical' });
    expect(model.ppm.estimate).toBeNull();
    expect(formatFit(model)).toMatch(/ppm, mm per km +— +below \d+\.\d\d/);
  });
});
