import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { prepareErrors } from '../../src/fit/prepareErrors.js';
import { separateSetups } from '../../src/fit/reference/separateSetups.js';
import { azimuthSpread, visitsOf } from '../../src/fit/reference/visits.js';
import { randomStream, shuffle } from '../../src/stats/index.js';
import { referenceErrors, referenceFits } from './reference.js';

// Source: R 4.2; `shots` is nlme's gls by REML with fixed setup effects, `visits` an independent implementation
// (fixtures/fits/fits.R, setup_fit).
describe('setups of ref3_linear_base10 against R', () => {
  const rows = referenceErrors('ref3_linear_base10');
  const { setup: fits } = referenceFits('ref3_linear_base10');
  const close = (actual: number, expected: number, relative: number): void => {
    expect(Math.abs(actual - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));
  };
  describe.each([
    ['U', 'up'],
    ['E', 'east'],
  ] as const)('component %s', (letter, column) => {
    const data = prepareErrors(
      rows.map((row) => ({ ...row, up: row[column] })),
      'vertical',
    );
    const input = {
      setup: data.setup!,
      mark: data.mark!,
      rover: null,
      startMs: Float64Array.from(data.rows, (row) => rows[row]!.startMs),
    };
    it.each(['visits', 'shots'] as const)('%s', (mode) => {
      const expected = fits[letter][mode];
      const visits =
        mode === 'visits'
          ? visitsOf(input)
          : { visitOf: Int32Array.from(data.setup!.keys()), count: data.y.length };
      const ours = separateSetups(data, data.setup!, visits, null);
      expect(ours.converged).toBe(true);
      close(Math.sqrt(ours.A), expected.a, 1e-8);
      close(Math.sqrt(ours.B), expected.b, 1e-8);
      expect(ours.rho).toBeCloseTo(expected.rho, 8);
      (expected.setup as string[]).forEach((name, s) => {
        const k = ours.setups.indexOf(name);
        expect(ours.offsetMm[0]![k]!).toBeCloseTo(expected.bias[s], 7);
        close(ours.standardErrorMm[k]!, expected.se_bias[s], 1e-8);
      });
    });
    it('shots equal nlme', () => {
      const { a, b } = fits[letter].nlme_REML_fixed_setup;
      const every = { visitOf: Int32Array.from(data.setup!.keys()), count: data.y.length };
      const ours = separateSetups(data, data.setup!, every, null);
      close(Math.sqrt(ours.A), a, 1e-5);
      close(Math.sqrt(ours.B), b, 1e-5);
    });
  });
});

const tripod = (seed: number, markMm: number, sigmaMm = 15) =>
  simulateErrors({
    seed,
    days: 30,
    base: { mounting: 'tripod', setupsPerDay: 1 },
    setupSigmaMm: { east: sigmaMm, north: sigmaMm, up: sigmaMm },
    markSigmaMm: { east: markMm, north: markMm, up: markMm },
  });
const OPTIONS = { component: 'vertical', reference: 'relative' } as const;
const { rows } = tripod(5, 6);
const codes = (errors: readonly object[]): string[] =>
  fitErrorModel(errors, OPTIONS).notes.map(({ code }) => code);

describe('laws of the relative fit', () => {
  const model = fitErrorModel(rows, OPTIONS);
  it('does not see an offset common to a setup', () => {
    const setups = [...new Set(rows.map(({ setup }) => setup))];
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), (seed) => {
        const random = randomStream(seed);
        const shifts = setups.map(() => 200 * random() - 100);
        const shifted = rows.map((row) => ({ ...row, up: row.up + shifts[setups.indexOf(row.setup)]! }));
        const fit = fitErrorModel(shifted, OPTIONS);
        // The turns between marks and setups end when constant and ppm stand to ten digits.
        expect(fit.constantMm.estimate! / model.constantMm.estimate!).toBeCloseTo(1, 4);
        expect(fit.ppm.estimate! / model.ppm.estimate!).toBeCloseTo(1, 4);
      }),
      { seed: 5, numRuns: 5 },
    );
  });
  it('does not depend on the order of rows, to the last bit', () => {
    const shuffled = fitErrorModel(shuffle(rows, randomStream(3)), OPTIONS);
    expect(shuffled.constantMm).toEqual(model.constantMm);
    expect(shuffled.ppm).toEqual(model.ppm);
    expect(shuffled.setups).toEqual(model.setups);
  });
  it('finds the spread of the setups, and a constant without it', () => {
    expect(model.setups!.marksTakenOut).toBe(true);
    expect(model.setups!.sigmaBaseMm).toBeGreaterThan(9);
    expect(model.setups!.sigmaBaseMm).toBeLessThan(22);
    expect(model.constantMm.estimate!).toBeGreaterThan(9.5);
    expect(model.constantMm.estimate!).toBeLessThan(12.5);
    expect(fitErrorModel(rows, { component: 'vertical' }).constantMm.estimate!).toBeGreaterThan(14);
  });
  it('finds hardly a spread where there is none', () => {
    const none = fitErrorModel(tripod(7, 0, 0).rows, OPTIONS);
    expect(none.setups!.sigmaBaseMm).toBeLessThan(3);
  });
});

describe('what the relative fit needs', () => {
  it.each(['mark', 'setup', 'startMs', 'azimuthDeg'])('names the missing column %s', (column) => {
    const lacking = rows.map((row) =>
      Object.fromEntries(Object.entries(row).filter(([name]) => name !== column)),
    );
    expect(() => fitErrorModel(lacking, OPTIONS)).toThrow(
      `Expected a column "${column}" in the errors, needed for reference "relative"`,
    );
  });
  it('sets setups with fewer than three visits aside and says so', () => {
    const [first] = rows;
    const thin = rows.filter(({ setup, mark }) => setup !== first!.setup || mark === first!.mark);
    const note = fitErrorModel(thin, OPTIONS).notes.find(({ code }) => code === 'setups-not-separable')!;
    expect(note.text).toContain('fewer than 3');
    const told = fitErrorModel(thin, OPTIONS).setups!.setups.find(({ setup }) => setup === first!.setup)!;
    expect(told).toMatchObject({ separable: false, offsetMm: null, standardErrorMm: null });
  });
  it('refuses marks on one side of the base', () => {
    const oneSided = rows.map((row) => ({ ...row, azimuthDeg: row.azimuthDeg / 5 }));
    expect(() => fitErrorModel(oneSided, OPTIONS)).toThrow(
      'an error of the base cannot be told from errors of the marks',
    );
  });
  it('warns of setups with three or four visits', () => {
    const seen = new Map<string, string[]>();
    const few = rows.filter(({ setup, mark }) => {
      const marks = seen.get(setup) ?? [];
      seen.set(setup, marks);
      if (marks.includes(mark)) return false;
      marks.push(mark);
      return marks.length <= 4;
    });
    expect(codes(few)).toContain('setups-with-few-visits');
  });
  it('tells that marks were taken out', () => {
    expect(codes(rows)).toContain('marks-taken-out');
  });
});

describe('directions and visits', () => {
  it.each([
    [[], 0],
    [[10], 0],
    [[350, 10], 20],
    [[0, 120, 240], 240],
    [[0, 90, 180, 270], 270],
  ])('%j span %d degrees', (azimuths, spread) => {
    expect(azimuthSpread(azimuths)).toBe(spread);
  });
  it('keeps rovers in one setup apart', () => {
    const { visitOf, count } = visitsOf({
      setup: ['s', 's', 's', 's'],
      mark: ['A', 'B', 'A', 'B'],
      rover: ['1', '2', '1', '2'],
      startMs: Float64Array.of(1, 2, 3, 4),
    });
    expect(count).toBe(2);
    expect(visitOf[0]).toBe(visitOf[2]);
    expect(visitOf[1]).toBe(visitOf[3]);
  });
});
