import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { errorTable } from '../../src/errors/index.js';
import { errorCurve, fitErrorModel, sigmaUpperLimitMm } from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';

const rows = Object.freeze(simulateErrors({ seed: 41, days: 20 }).rows.map((row) => Object.freeze(row)));
const COMPONENTS = ['horizontal', 'vertical'] as const;
const runs = { seed: 7, numRuns: 20 };

describe.each(COMPONENTS)('laws of the %s fit', (component) => {
  const model = fitErrorModel(rows, { component });
  const numbers = (fit: typeof model): number[] => [
    fit.constantMm.estimate!,
    fit.constantMm.low!,
    fit.constantMm.high!,
    fit.ppm.estimate!,
    fit.ppm.low!,
    fit.ppm.high!,
  ];

  it('does not depend on the order of rows, to the last bit', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const shuffled = fitErrorModel(shuffle(rows, randomStream(seed)), { component });
        expect(numbers(shuffled)).toEqual(numbers(model));
      }),
      runs,
    );
  });

  it('does not depend on the names of days', () => {
    const days = [...new Set(rows.map(({ day }) => day))];
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const names = shuffle(days, randomStream(seed));
        const renamed = rows.map((row) => ({ ...row, day: names[days.indexOf(row.day)] }));
        numbers(fitErrorModel(renamed, { component })).forEach((value, k) => {
          expect(value).toBeCloseTo(numbers(model)[k]!, 10);
        });
      }),
      runs,
    );
  });

  it('scales when millimetres scale, and the ppm inversely when kilometres do', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), (factor) => {
        const bigger = rows.map((r) => ({
          ...r,
          east: r.east * factor,
          north: r.north * factor,
          up: r.up * factor,
        }));
        numbers(fitErrorModel(bigger, { component })).forEach((value, k) => {
          expect(value / factor / numbers(model)[k]!).toBeCloseTo(1, 8);
        });
        const farther = rows.map((r) => ({ ...r, baselineKm: r.baselineKm * factor }));
        const far = fitErrorModel(farther, { component });
        expect(far.constantMm.estimate! / model.constantMm.estimate!).toBeCloseTo(1, 8);
        expect((far.ppm.high! * factor) / model.ppm.high!).toBeCloseTo(1, 8);
      }),
      runs,
    );
  });

  it('takes an arquero table as well as records', () => {
    expect(numbers(fitErrorModel(errorTable(rows as never), { component }))).toEqual(numbers(model));
  });

  it('does not change what it is given', () => {
    expect(() => fitErrorModel(rows, { component })).not.toThrow();
  });

  it('has a curve whose limits hold it and an upper limit that grows with confidence', () => {
    for (const point of errorCurve(model, [0, 0.5, 5, 20, 50])) {
      expect(point.lowMm!).toBeLessThanOrEqual(point.sigmaMm);
      expect(point.highMm!).toBeGreaterThanOrEqual(point.sigmaMm);
    }
    expect(errorCurve(model, [0])[0]!.sigmaMm).toBeCloseTo(model.constantMm.estimate!, 10);
    expect(sigmaUpperLimitMm(model, 10, 0.99)!).toBeGreaterThan(sigmaUpperLimitMm(model, 10, 0.9)!);
  });
});

describe('the radial fit', () => {
  it('is unchanged when every error is turned by the same angle', () => {
    const model = fitErrorModel(rows, { component: 'horizontal' });
    fc.assert(
      fc.property(fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }), (angle) => {
        const [c, s] = [Math.cos(angle), Math.sin(angle)];
        const turned = rows.map((r) => ({
          ...r,
          east: c * r.east - s * r.north,
          north: s * r.east + c * r.north,
        }));
        const fit = fitErrorModel(turned, { component: 'horizontal' });
        expect(fit.ppm.estimate!).toBeCloseTo(model.ppm.estimate!, 9);
        expect(fit.constantMm.high!).toBeCloseTo(model.constantMm.high!, 9);
      }),
      runs,
    );
  });
});
