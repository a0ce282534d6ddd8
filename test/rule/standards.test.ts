import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import {
  asprs,
  checkPoints,
  circularUncertainty95,
  combineUncertainties,
  type FieldTestSet,
  isoFieldTest,
  nssda,
  relativeAllowance,
  relativePrecision,
  sameDeviation,
  uncertaintyBudget,
  upperFactor,
  withControlError,
} from '../../src/rule/index.js';
import { normalDeviates, radialQuantile, randomStream } from '../../src/stats/index.js';

const points = (count: number, errors: (k: number) => { east: number; north: number; up: number }) =>
  Array.from({ length: count }, (_, k) => ({ mark: `M${k}`, azimuthDeg: (360 * k) / count, ...errors(k) }));

describe('check points', () => {
  it('count once each, however often they were shot', () => {
    const shots = [...points(2, (k) => ({ east: k === 0 ? 3 : 4, north: 0, up: 0 }))];
    const often = [...shots, shots[1]!, shots[1]!];
    expect(checkPoints(often).rmseEastMm).toBeCloseTo(Math.sqrt(12.5), 12);
    expect(checkPoints(often)).toMatchObject({ planPoints: 2, heightPoints: 2 });
  });
});

describe('NSSDA', () => {
  // FGDC-STD-007.3-1998, from memory: Accuracy_r = 2.4477 RMSE_x = 1.7308 RMSE_r, Accuracy_z = 1.9600 RMSE_z.
  it('has its factors', () => {
    const found = nssda(points(20, (k) => ({ east: 10 * (-1) ** k, north: 10, up: -5 })));
    expect(found.horizontal95Mm! / 10).toBeCloseTo(2.4477468307, 8);
    expect(found.horizontal95Mm! / found.rmseRadialMm).toBeCloseTo(1.7308183826, 8);
    expect(found.vertical95Mm! / 5).toBeCloseTo(1.9599639845, 8);
    expect(found.conditions.map(({ met }) => met)).toEqual([true, true, true, true, null, null]);
  });
  it('has the mean of unequal axes, which is too small, beside the exact radius', () => {
    // Numerical integration: R95 of axes 1 and 0.6 is 2.081304; the mean rule is 5.92 % below.
    const found = nssda(points(20, () => ({ east: 6, north: 10, up: 1 })));
    expect(found.exactHorizontal95Mm! / 10).toBeCloseTo(2.081304, 5);
    expect(found.horizontal95Mm! / found.exactHorizontal95Mm! - 1).toBeCloseTo(-0.0592, 3);
    expect(nssda(points(20, () => ({ east: 5, north: 10, up: 1 }))).horizontal95Mm).toBeNull();
  });
  it('checks its conditions', () => {
    const { conditions, caution } = nssda(
      points(19, () => ({ east: 9, north: 9, up: 9 })),
      {
        planSigmaMm: 3,
        heightSigmaMm: 4,
      },
    );
    expect(conditions.map(({ met }) => met)).toEqual([false, false, true, true, true, false]);
    expect(caution).toContain('from memory: the printed standard decides');
  });
});

describe('ASPRS', () => {
  // Edition 2 (formulas from memory): RMSE 12 mm with control of 5 mm is 13 mm.
  it('adds the error of control in quadrature', () => {
    expect(withControlError(12, 5)).toBe(13);
    const found = asprs(
      points(30, () => ({ east: 12 / Math.SQRT2, north: 12 / Math.SQRT2, up: 12 })),
      {
        planSigmaMm: 5 / Math.SQRT2,
        heightSigmaMm: 5,
      },
    );
    expect(found.horizontalRmseMm).toBeCloseTo(13, 10);
    expect(found.verticalRmseMm).toBe(13);
    expect(found.spatialRmseMm).toBeCloseTo(13 * Math.SQRT2, 10);
    expect(found.conditions.every(({ met }) => met)).toBe(true);
    expect(asprs(points(29, () => ({ east: 1, north: 1, up: 1 }))).conditions.map(({ met }) => met)).toEqual([
      false,
      false,
      false,
    ]);
  });
});

describe('ISO 17123-8', () => {
  // First two sets of the published example (Bonn, 2006-09-22), as printed in the Russian edition: nominal 19.994 m and
  // 0.028 m, deviations 9 and -14 mm, -21 and 8 mm.
  const published = [
    [
      [-67635.47, -63943.197, 320.792],
      [-67652.389, -63932.527, 320.799],
    ],
    [
      [-67635.479, -63943.188, 320.788],
      [-67652.376, -63932.525, 320.824],
    ],
  ] as const;
  const set = (k: number, series = 1): FieldTestSet => {
    const [first, second] = published[k % 2]!.map(([x, y, h]) => ({ x, y, h }));
    return { series, first: first!, second: second! };
  };
  const options = { distanceM: 19.994, heightDifferenceM: 0.028, predeterminedMm: { plan: 15, height: 25 } };
  it('finds the deviations of the published sets', () => {
    const { sets, limitsMm } = isoFieldTest(
      [0, 1, 0, 1, 0].map((k) => set(k)),
      options,
    );
    expect(
      sets
        .slice(0, 2)
        .map(({ distanceErrorMm, heightErrorMm }) => [distanceErrorMm, heightErrorMm].map(Math.round)),
    ).toEqual([
      [9, -21],
      [-14, 8],
    ]);
    expect(sets[0]!.distanceM).toBeCloseTo(20.003, 3);
    expect(sets[1]!.heightDifferenceM).toBeCloseTo(0.036, 6);
    expect(sets.every(({ withinLimits }) => withinLimits)).toBe(true);
    expect(limitsMm.distance).toBe(37.5);
    expect(limitsMm.height).toBeCloseTo(88.39, 2);
  });
  // Quantiles computed independently: χ² .95 of 56, 28 and 8, F .975 of (56, 56) and (28, 28).
  it('has the factors of its tests', () => {
    expect(upperFactor(56)).toBeCloseTo(1.15316586, 7);
    expect(upperFactor(28)).toBeCloseTo(1.21504171, 7);
    expect(upperFactor(8)).toBeCloseTo(1.39227, 5);
    const of = (mm: number, degreesOfFreedom: number) => ({ mm, degreesOfFreedom });
    expect(sameDeviation(of(Math.sqrt(1.6975), 56), of(1, 56))).toBe(true);
    expect(sameDeviation(of(Math.sqrt(1.6977), 56), of(1, 56))).toBe(false);
    expect(sameDeviation(of(Math.sqrt(0.4696), 28), of(1, 28))).toBe(true);
    expect(sameDeviation(of(Math.sqrt(0.4694), 28), of(1, 28))).toBe(false);
  });
  it('tells degrees of freedom and tests of the full test', () => {
    const normal = normalDeviates(randomStream(3));
    const noisy = (mm: number) =>
      Array.from({ length: 15 }, (_, k): FieldTestSet => {
        const at = (x: number) => ({
          x: x + (mm / 1000) * normal(),
          y: (mm / 1000) * normal(),
          h: (mm / 1000) * normal(),
        });
        return {
          series: 1 + Math.floor(k / 5),
          startMs: k * 300_000 + Math.floor(k / 5) * 5_400_000,
          first: at(0),
          second: at(10),
        };
      });
    const asked = {
      distanceM: 10,
      heightDifferenceM: 0,
      predeterminedMm: { plan: 8 * Math.SQRT2, height: 8 },
    };
    const good = isoFieldTest(noisy(8), asked);
    expect(good).toMatchObject({ kind: 'full', planWithin: true, heightWithin: true });
    expect([good.plan.degreesOfFreedom, good.height.degreesOfFreedom]).toEqual([56, 28]);
    expect(good.conditions.map(({ met }) => met)).toEqual([true, null, true]);
    expect(isoFieldTest(noisy(14), asked)).toMatchObject({ planWithin: false, heightWithin: false });
  });
  it('refuses sets that are no test', () => {
    expect(() => isoFieldTest([set(0), set(1)], options)).toThrow(
      'Expected 1 or 3 series of 5 sets, came 1 series of 2 sets.',
    );
  });
});

describe('the budget', () => {
  // JCGM 100, example H.1 (from memory): 25, 9.7, 2.9 and 16.6 nm with 18, 25.6, 50 and 2 degrees of freedom.
  it('combines as the guide does', () => {
    const entries = [
      [25, 18],
      [9.7, 25.6],
      [2.9, 50],
      [16.6, 2],
    ].map(([standardMm, degreesOfFreedom]) => ({
      source: '',
      standardMm: standardMm!,
      degreesOfFreedom: degreesOfFreedom!,
    }));
    const found = combineUncertainties(entries, 0.99);
    expect(found.combinedMm).toBeCloseTo(32, 0);
    expect(Math.floor(found.degreesOfFreedom)).toBe(16);
    expect(found.coverageFactor).toBeCloseTo(2.92, 2);
    expect(found.expandedMm).toBeCloseTo(93, 0);
  });
  it('of a model comes back to its σ, and the base on top', () => {
    const { rows } = simulateErrors({ seed: 2, days: 30 });
    const model = fitErrorModel(rows, { component: 'horizontal', reference: 'repeatability' });
    const { displayA, displayB } = model.variance!;
    const plain = uncertaintyBudget(model, 8, { centringSigmaMm: 2, resolutionStepMm: 1 });
    expect(plain.combinedMm).toBeCloseTo(Math.sqrt((displayA + displayB * 64) / 2), 10);
    const withBase = uncertaintyBudget(model, 8, { centringSigmaMm: 2, baseSigmaMm: 6 });
    expect(withBase.combinedMm ** 2 - plain.combinedMm ** 2).toBeCloseTo(36, 8);
    expect(withBase.expandedMm).toBeGreaterThan(1.95 * withBase.combinedMm);
    const absolute = fitErrorModel(rows, { component: 'horizontal' });
    expect(uncertaintyBudget(absolute, 8, { baseSigmaMm: 3, markSigmaMm: 2 }).combinedMm).toBeLessThan(
      uncertaintyBudget(absolute, 8).combinedMm,
    );
    expect(() =>
      uncertaintyBudget(fitErrorModel(rows, { component: 'horizontal', form: 'linear-sum' }), 8),
    ).toThrow('Expected a fit of the form "root-sum-square" with intervals');
  });
});

describe('relative precision', () => {
  // Worked figure in ACSM Bulletin 225 (2007): 786 ft → 0.07 ft + 0.0393 ft = 0.1093 ft.
  it('has the allowance of land title surveys, added linearly', () => {
    expect(relativeAllowance({ constantMm: 0.07 * 304.8, ppm: 50 }, 786 * 0.3048) / 304.8).toBeCloseTo(
      0.1093,
      4,
    );
  });
  const { rows } = simulateErrors({
    seed: 9,
    days: 30,
    marks: { count: 8, nearestKm: 0.3, farthestKm: 6 },
    markSigmaMm: { east: 0, north: 0, up: 0 },
  });
  const precision = (errors: typeof rows) =>
    relativePrecision(errors, fitErrorModel(errors, { component: 'horizontal' }));
  it('does not see an error that all points of a setup share, and sees one that they do not', () => {
    const fits = precision(rows);
    const shifted = precision(rows.map((row) => ({ ...row, east: row.east + 300 })));
    expect(shifted.classes.map(({ semiMajorMm }) => semiMajorMm.toFixed(6))).toEqual(
      fits.classes.map(({ semiMajorMm }) => semiMajorMm.toFixed(6)),
    );
    const told = fits.classes.filter(({ verdict }) => verdict !== 'cannot be told');
    expect(told.length).toBeGreaterThan(1);
    for (const { verdict, distanceCheck } of told.map((each) => ({
      ...each,
      distanceCheck: each.allowedMm > 60,
    }))) {
      if (distanceCheck) expect(verdict).toBe('holds');
    }
    const bad = precision(rows.map((row, i) => ({ ...row, north: row.north + (i % 2 === 0 ? 400 : -400) })));
    expect(bad.classes.filter(({ verdict }) => verdict === 'exceeded').length).toBeGreaterThan(0);
    expect(() => relativePrecision(rows, fitErrorModel(rows, { component: 'vertical' }))).toThrow(
      'horizontal model',
    );
  });
});

// Coefficients as in a government geodesy library; ratios 0 and 1 give 1.960790 and 2.450762.
it('the circular uncertainty is the published cubic, within 0.18 % of the exact radius', () => {
  expect(circularUncertainty95(1, 0)).toBeCloseTo(1.96079, 9);
  expect(circularUncertainty95(1, 1)).toBeCloseTo(2.450762, 9);
  expect(circularUncertainty95(0, 0)).toBe(0);
  for (let k = 0; k <= 20; k++) {
    const exact = radialQuantile(1, k / 20, 0.95);
    expect(Math.abs(circularUncertainty95(k / 20, 1) / exact - 1)).toBeLessThan(0.0018);
  }
});
