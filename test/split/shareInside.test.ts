import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { shareInsideByDistance } from '../../src/split/index.js';

const row = (day: string, baselineKm: number, east: number, up = 0) => ({
  day,
  baselineKm,
  east,
  north: 0,
  up,
});

describe('shareInsideByDistance', () => {
  it('counts from the base outward as by hand, a limit itself being inside', () => {
    const rows = [row('a', 1, 5), row('b', 1, 5), row('a', 3, 6), row('b', 3, 4), row('a', 2, 9)];
    const found = shareInsideByDistance(rows, { component: 'horizontal', limitMm: 5 });
    expect(found.map((one) => [one.baselineKm, one.occupations, one.inside, one.share])).toEqual([
      [1, 2, 2, 1],
      [2, 3, 2, 2 / 3],
      [3, 5, 3, 0.6],
    ]);
    expect([found[0]!.low, found[0]!.high]).toEqual([null, null]);
  });

  it('has day-clustered limits on the log-odds scale', () => {
    const inside = [1, 1, 1, 0, 1, 0, 0, 0];
    const rows = inside.map((one, i) => row(i < 4 ? 'a' : 'b', 1, one === 1 ? 1 : 9));
    const [only] = shareInsideByDistance(rows, { component: 'horizontal', limitMm: 5 });
    // day totals of x - 0.5 are 1 and -1: standard error √(2 × 2) / 8 = 0.25; t(0.975; 1) = 12.7062 (tables)
    const half = (12.7062 * 0.25) / 0.25;
    expect(only!.share).toBe(0.5);
    expect(Math.log(only!.high! / (1 - only!.high!))).toBeCloseTo(half, 3);
    expect(only!.low! + only!.high!).toBeCloseTo(1, 12);
  });

  it('ends with all occupations whose component is known, whatever their order', () => {
    const { rows } = simulateErrors({ days: 10, seed: 4 });
    const gaps = rows.map((one, i) => (i % 7 === 0 ? { ...one, up: Number.NaN } : one));
    const found = shareInsideByDistance(gaps, { component: 'vertical', limitMm: 20 });
    const known = gaps.filter(({ up }) => !Number.isNaN(up));
    expect(found.at(-1)!.occupations).toBe(known.length);
    expect(found.at(-1)!.inside).toBe(known.filter(({ up }) => Math.abs(up) <= 20).length);
    expect(shareInsideByDistance([...gaps].reverse(), { component: 'vertical', limitMm: 20 })).toEqual(found);
  });

  it('gives at most 200 points and keeps the farthest', () => {
    const rows = Array.from({ length: 1000 }, (_, i) => row(`d${i % 5}`, i + 1, 1));
    const found = shareInsideByDistance(rows, { component: 'horizontal', limitMm: 5 });
    expect(found).toHaveLength(200);
    expect(found.at(-1)!.occupations).toBe(1000);
    expect(shareInsideByDistance([], { component: 'horizontal', limitMm: 5 })).toEqual([]);
  });
});
