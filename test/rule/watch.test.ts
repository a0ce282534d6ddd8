import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { type WatchBasis, watchBasis, watchDays } from '../../src/rule/index.js';
import { dayStatistic } from '../../src/rule/watch/dayStatistic.js';
import { chiSquareQuantile } from '../../src/stats/index.js';

const marks = { count: 10, nearestKm: 0.5, farthestKm: 25 };
const long = simulateErrors({ seed: 31, days: 100, marks });
const days = long.truth.days.map(({ day }) => day);
const fitted = long.rows.filter(({ day }) => day < days[60]!);
const later = long.rows.filter(({ day }) => day >= days[60]!);
const model = fitErrorModel(fitted, { component: 'horizontal', reference: 'repeatability' });
const start = watchBasis(model, dayModel(fitted, model));
const basis = start.basis!;

describe('the statistic of a day', () => {
  const alike: WatchBasis = { ...basis, A: 4, B: 1, effectiveShare: 1, logFactors: [0], probabilities: [1] };
  it('is chi-square where days do not differ and all lengths are one', () => {
    // n rows with two axes at one length: Σ 2 y/μ is chi-square with 2 n degrees of freedom.
    const [n, mu] = [12, 4 + 9];
    for (const p of [0.5, 0.05, 0.01]) {
      const y = new Array<number>(n).fill((mu * chiSquareQuantile(1 - p, 2 * n)) / (2 * n));
      const shots = { y, l: new Array<number>(n).fill(9), w: new Array<number>(n).fill(1) };
      for (const part of ['ppm', 'constant'] as const) {
        expect(dayStatistic(alike, shots, part)!.pValue).toBeCloseTo(p, 8);
      }
    }
  });
  it('is less surprising where days may differ, and capped', () => {
    const shots = { y: [300, 400, 500], l: [100, 100, 100], w: [1, 1, 1] };
    const sure = dayStatistic(alike, shots, 'ppm')!;
    const wide = dayStatistic(
      { ...alike, logFactors: [-0.7, 0, 0.7], probabilities: [0.3, 0.4, 0.3] },
      shots,
      'ppm',
    )!;
    expect(wide.pValue).toBeGreaterThan(sure.pValue);
    expect(dayStatistic(alike, { ...shots, y: [1e7, 1e7, 1e7] }, 'ppm')!.score).toBe(4);
    expect(dayStatistic({ ...alike, B: 0 }, shots, 'ppm')).toBeNull();
  });
});

describe('watching', () => {
  it('keeps still while nothing changes', () => {
    const watch = watchDays(basis, later);
    expect(watch.days).toHaveLength(40);
    expect(watch.alarms).toEqual([]);
    expect(watch).toMatchObject({ fitAgain: false, reasons: [], leftOut: 0 });
    const scores = watch.days.map(({ ppm }) => ppm!.score);
    expect(Math.abs(scores.reduce((sum, z) => sum + z, 0) / scores.length)).toBeLessThan(0.7);
  });
  it('finds a doubled ppm, tells since when, and asks for a new fit', () => {
    const changed = days[75]!;
    const worse = later.map((row) => {
      const far = row.day >= changed ? 1 + row.baselineKm / 12 : 1;
      return { ...row, east: far * row.east, north: far * row.north };
    });
    const { alarms, reasons, fitAgain } = watchDays(basis, worse);
    expect(fitAgain).toBe(true);
    expect(alarms[0]!.part).toBe('ppm');
    expect(alarms[0]!.day >= changed && alarms[0]!.day <= days[92]!).toBe(true);
    expect(days.indexOf(alarms[0]!.since)).toBeGreaterThan(65);
    expect(reasons[0]).toMatch(/^since \d{4}-\d\d-\d\d errors grow faster with distance .* and fit again$/);
  });
  it('finds larger errors near the base', () => {
    const worse = later.map((row) => ({ ...row, east: 1.8 * row.east, north: 1.8 * row.north }));
    const { alarms, days: watched } = watchDays(basis, worse);
    expect(new Set(alarms.map(({ part }) => part))).toContain('constant');
    const after = watched.filter(({ day }) =>
      alarms.some((alarm) => alarm.part === 'constant' && alarm.day === day),
    );
    for (const { constantSum } of after) expect(constantSum).toBe(0);
  });
  it('is the same from a basis that was written and read', () => {
    const read = JSON.parse(JSON.stringify(basis)) as WatchBasis;
    expect(read).toEqual(basis);
    expect(watchDays(read, later)).toEqual(watchDays(basis, later));
  });
  it('leaves out days that were fitted, and marks that are new', () => {
    expect(watchDays(basis, long.rows).days).toEqual(watchDays(basis, later).days);
    const renamed = later.map((row) => ({ ...row, mark: row.baselineKm > 1 ? `new ${row.mark}` : row.mark }));
    const { leftOut, reasons } = watchDays(basis, renamed);
    expect(leftOut).toBe(renamed.filter(({ mark }) => mark.startsWith('new')).length);
    expect(reasons.join()).toContain('lie on marks that the model does not know');
  });
  it('is due again a year after the last day fitted', () => {
    const late = later.map((row) => ({ ...row, day: `2026${row.day.slice(4)}` }));
    expect(watchDays(basis, late).reasons.join()).toContain(`to be looked at again by ${basis.reviewBy}`);
  });
  it('refuses thin models with the reason', () => {
    const few = fitted.filter(({ day }) => day < days[29]!);
    const fit = fitErrorModel(few, { component: 'horizontal' });
    expect(watchBasis(fit, dayModel(few, fit)).reason).toBe(
      '29 days were fitted, and watching needs 30: add days first',
    );
    expect(watchBasis(model, null).reason).toContain('how days differ could not be judged');
  });
});
