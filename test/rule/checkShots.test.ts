import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { limitOf, otherDays, predictedDays, varianceAt } from '../../src/rule/checkshot/tails.js';
import {
  checkShotLimits,
  errorByOccupationLength,
  secondVisits,
  twoVisitLimitMm,
  visitCorrelation,
} from '../../src/rule/index.js';
import { randomStream } from '../../src/stats/index.js';

describe('the limit of a mixture', () => {
  const alike = (variance: number) => ({
    variances: Float64Array.of(variance, variance),
    weights: Float64Array.of(0.3, 0.7),
  });
  it('of equal days is the Gaussian quantile', () => {
    // Normal table: two-sided 5 % 1.9599639845, 0.1 % 3.2905267; Rayleigh: 95 % at 2.4477468307 of one axis.
    expect(limitOf('vertical', alike(4), 0.05)).toBeCloseTo(2 * 1.9599639845, 5);
    expect(limitOf('vertical', alike(4), 0.001)).toBeCloseTo(2 * 3.2905267, 5);
    expect(limitOf('horizontal', alike(2 * 9), 0.05)).toBeCloseTo(3 * 2.4477468307, 5);
  });
  it('of days that differ lies farther out than their RMS tells', () => {
    const days = { variances: Float64Array.of(1, 16), weights: Float64Array.of(0.9, 0.1) };
    expect(limitOf('vertical', days, 0.001)).toBeGreaterThan(limitOf('vertical', alike(2.5), 0.001));
    // By hand: 0.9 · 2Φ(-x) + 0.1 · 2Φ(-x/4) = 0.001 at x with 2Φ(-x/4) = 0.01, x = 4 · 2.5758293, the first part gone.
    expect(limitOf('vertical', days, 0.001)).toBeCloseTo(4 * 2.5758293035, 4);
  });
});

const { rows, truth } = simulateErrors({ seed: 4, days: 40 });
const models = {
  vertical: fitErrorModel(rows, { component: 'vertical' }),
  horizontal: fitErrorModel(rows, { component: 'horizontal' }),
};
const days = { vertical: dayModel(rows, models.vertical), horizontal: dayModel(rows, models.horizontal) };

describe('check-shot limits', () => {
  it.each(['vertical', 'horizontal'] as const)('alarm about as often as asked for, %s', (component) => {
    const { limits, alarmShare } = checkShotLimits(models[component], days[component], {
      falseAlarmsPerYear: 20,
      lengthsKm: truth.marks.map(({ baselineKm }) => baselineKm),
    });
    expect(alarmShare).toBe(0.01);
    const limitAt = new Map(limits.map(({ baselineKm, knownMarkMm }) => [baselineKm, knownMarkMm]));
    const others = simulateErrors({ seed: 104, days: 60 });
    const fresh = checkShotLimits(models[component], days[component], {
      falseAlarmsPerYear: 20,
      lengthsKm: others.truth.marks.map(({ baselineKm }) => baselineKm),
    }).limits;
    for (const { baselineKm, knownMarkMm } of fresh) limitAt.set(baselineKm, knownMarkMm);
    const size = (row: (typeof rows)[number]) =>
      component === 'vertical' ? Math.abs(row.up) : Math.hypot(row.east, row.north);
    const alarms = others.rows.filter((row) => size(row) > limitAt.get(row.baselineKm)!).length;
    expect(alarms / others.rows.length).toBeGreaterThan(0.003);
    expect(alarms / others.rows.length).toBeLessThan(0.02);
  });
  it('grow with distance, fewer alarms and what is not known', () => {
    const plain = checkShotLimits(models.vertical, days.vertical);
    const widths = plain.limits.map(({ knownMarkMm }) => knownMarkMm);
    expect(widths).toEqual([...widths].sort((a, b) => a - b));
    const rare = checkShotLimits(models.vertical, days.vertical, { falseAlarmsPerYear: 0.1 });
    const marks = checkShotLimits(models.vertical, days.vertical, { markSigmaMm: 8, baseSigmaMm: 5 });
    plain.limits.forEach((limit, k) => {
      expect(rare.limits[k]!.knownMarkMm).toBeGreaterThan(limit.knownMarkMm);
      expect(marks.limits[k]!.knownMarkMm).toBeGreaterThan(limit.knownMarkMm);
      expect(marks.limits[k]!.twoBasesMm).toBeGreaterThan(limit.twoBasesMm);
      expect(marks.limits[k]!.otherDayMm).toBe(limit.otherDayMm);
      expect(limit.otherDayMm).toBeGreaterThan(limit.knownMarkMm);
      expect(limit.otherDayMm).toBeLessThan(limit.twoBasesMm + 1e-6);
    });
    expect(rare.sentence).toContain('once in 10 years');
  });
  it('of two visits follow from what both share', () => {
    const at = { firstKm: 5, secondKm: 5, when: 'same-day', bases: 'same', alarmShare: 0.001 } as const;
    const independent = twoVisitLimitMm(models.vertical, days.vertical, at)!;
    const alike = twoVisitLimitMm(models.vertical, days.vertical, { ...at, correlation: 0.75 })!;
    expect(alike / independent).toBeCloseTo(0.5, 5);
    const bases = twoVisitLimitMm(models.vertical, days.vertical, {
      ...at,
      correlation: 0.75,
      bases: 'different',
    })!;
    expect(bases).toBeCloseTo(independent, 6);
    const own = varianceAt(predictedDays('vertical', days.vertical.posterior!), 5);
    const { weights } = otherDays(predictedDays('vertical', days.vertical.posterior!), own, own);
    expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 6);
  });
  it('are refused with the reason', () => {
    const few = rows.filter(({ day }) => day < truth.days[10]!.day);
    const model = fitErrorModel(few, { component: 'vertical' });
    expect(checkShotLimits(model, dayModel(few, model))).toMatchObject({
      limits: [],
      reason: '10 days are too few, it needs 15',
      sentence: 'There is no check-shot limit: 10 days are too few, it needs 15.',
    });
    expect(
      twoVisitLimitMm(model, null, {
        firstKm: 1,
        secondKm: 1,
        when: 'other-day',
        bases: 'same',
        alarmShare: 0.01,
      }),
    ).toBeNull();
    expect(() =>
      checkShotLimits(models.vertical, days.vertical, { checksPerYear: 1, falseAlarmsPerYear: 3 }),
    ).toThrow('Expected fewer false alarms than check shots, and more than none, came 3 among 1.');
  });
});

describe('a second visit', () => {
  // The simulation: 40 % of the constant part lasts for 10 minutes, the distance part for 40.
  const dense = simulateErrors({
    seed: 6,
    days: 60,
    crews: ['A'],
    rovers: ['R1'],
    marks: { count: 6, nearestKm: 0.5, farthestKm: 25 },
    occupationsPerDay: { from: 60, to: 80 },
  }).rows;
  const model = fitErrorModel(dense, { component: 'horizontal' });
  const found = secondVisits(dense, model, { random: randomStream(1, 'visits'), resamples: 99 });
  it('is correlated with the first as it was made to be', () => {
    const { A, B } = found.correlation!;
    for (const km of [1, 10, 20]) {
      for (const minutes of [10, 30, 60]) {
        const s = (B * km * km) / (A + B * km * km);
        const made = (1 - s) * 0.4 * Math.exp(-minutes / 10) + s * Math.exp(-minutes / 40);
        expect(Math.abs(visitCorrelation(found.correlation!, km, minutes) - made)).toBeLessThan(0.1);
      }
    }
  });
  it('gains the more the longer it waits, and no more than an independent one', () => {
    for (const { factor } of found.visits) {
      expect(factor.estimate!).toBeGreaterThan(Math.SQRT1_2 - 1e-12);
      expect(factor.low!).toBeLessThanOrEqual(factor.estimate! + 1e-9);
      expect(factor.high!).toBeLessThanOrEqual(1);
    }
    const far = found.visits
      .filter(({ baselineKm }) => baselineKm === 10)
      .map(({ factor }) => factor.estimate!);
    expect(far).toEqual([...far].sort((a, b) => b - a));
  });
  it('is not judged from few pairs, nor far ones from near ones', () => {
    const few = dense.filter(({ day }) => day < dense[600]!.day);
    const small = secondVisits(few, fitErrorModel(few, { component: 'horizontal' }), {
      random: randomStream(1),
    });
    expect(small.correlation).toBeNull();
    expect(small.sentence).toMatch(/^The visits are too few .* Visit some marks twice a day\.$/);
  });
  it('takes out what the mean of other days adds to a pair', () => {
    const marked = dense.map((row) => ({ ...row, east: row.east + 20 * Math.sin(row.baselineKm) }));
    const repeated = fitErrorModel(marked, { component: 'horizontal', reference: 'repeatability' });
    const again = secondVisits(marked, repeated, { random: randomStream(1), resamples: 9 });
    for (const km of [1, 10]) {
      const [a, b] = [found, again].map(({ correlation }) => visitCorrelation(correlation!, km, 20));
      expect(Math.abs(a! - b!)).toBeLessThan(0.05);
    }
  });
});

it('error by length of occupation shows where longer ones are better', () => {
  const timed = rows.map((row, i) => {
    const epochs = [1, 5, 60][i % 3]!;
    const factor = epochs === 60 ? 0.7 : 1;
    return { ...row, epochs, up: factor * row.up };
  });
  const found = errorByOccupationLength(timed, fitErrorModel(timed, { component: 'vertical' }));
  expect(found.map(({ fromEpochs, toEpochs }) => [fromEpochs, toEpochs])).toEqual([
    [1, 1],
    [5, 9],
    [60, 179],
  ]);
  expect(found[2]!.ratio.high!).toBeLessThan(0.9);
  expect(found[0]!.ratio.low!).toBeGreaterThan(0.9);
  expect(found.reduce((sum, { occupations }) => sum + occupations, 0)).toBe(rows.length);
});
