import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { markShifts, nextMarks, type WatchBasis, watchBasis } from '../../src/rule/index.js';
import { type MarkMean, markMeans } from '../../src/split/index.js';

const marks = { count: 10, nearestKm: 0.5, farthestKm: 20 };
const season = simulateErrors({ seed: 8, days: 60, marks });
const days = season.truth.days.map(({ day }) => day);
const fitted = season.rows.filter(({ day }) => day < days[40]!);
const later = season.rows.filter(({ day }) => day >= days[40]!);
const model = fitErrorModel(fitted, { component: 'horizontal', reference: 'repeatability' });
const basis = watchBasis(model, dayModel(fitted, model)).basis!;
const known = markMeans(fitted);
const near = known[1]!.mark;

describe('marks that may have moved', () => {
  it('are none while nothing moves', () => {
    const shifts = markShifts(later, known, basis);
    expect(shifts.length).toBe(known.length);
    expect(shifts.filter(({ verdict }) => verdict === 'moved')).toEqual([]);
    // Standard errors hold: shifts lie within three of them.
    for (const { shiftMm, seMm } of shifts)
      for (const value of shiftMm) expect(Math.abs(value / seMm)).toBeLessThan(3);
  });
  it('are none in nearly all of 40 seasons, with as few marks as tell a move of the base', () => {
    const wrong = Array.from({ length: 40 }, (_, k) => {
      const { rows, truth } = simulateErrors({ seed: 100 + k, days: 45, marks: { ...marks, count: 4 } });
      const last = truth.days[29]!.day;
      const first = rows.filter(({ day }) => day <= last);
      const fit = fitErrorModel(first, { component: 'horizontal', reference: 'repeatability' });
      const own = watchBasis(fit, dayModel(first, fit)).basis;
      if (own === null) return false;
      const shifts = markShifts(
        rows.filter(({ day }) => day > last),
        markMeans(first),
        own,
      );
      return shifts.some(({ verdict }) => verdict === 'moved');
    });
    // 1 in 100 is stated: more than 3 of 40 would be one chance in 700.
    expect(wrong.filter(Boolean).length).toBeLessThanOrEqual(3);
  });
  it('are found with how far they went, and only they', () => {
    const moved = later.map((row) => (row.mark === near ? { ...row, east: row.east + 25 } : row));
    const shifts = markShifts(moved, known, basis);
    const found = shifts.filter(({ verdict }) => verdict === 'moved');
    expect(found.map(({ mark }) => mark)).toEqual([near]);
    expect(found[0]!.shiftMm[0]).toBeGreaterThan(18);
    expect(found[0]!.shiftMm[0]).toBeLessThan(32);
  });
  it('are not all that a moved base moves', () => {
    const base = later.map((row) => ({ ...row, north: row.north + 60 }));
    expect(markShifts(base, known, basis).filter(({ verdict }) => verdict === 'moved')).toEqual([]);
  });
  it('are not judged by one or two days, nor by the days that were fitted', () => {
    const few = later.filter(({ day }) => day <= days[41]!);
    for (const { verdict, pValue } of markShifts(few, known, basis)) {
      expect(verdict).toBe('too few days');
      expect(pValue).toBeNull();
    }
    expect(markShifts(fitted, known, basis)).toEqual([]);
  });
  it('do not hang on a single day that went wrong', () => {
    const day = later.find(({ mark }) => mark === near)!.day;
    const blunder = later.map((row) =>
      row.mark === near && row.day === day ? { ...row, east: row.east + 500 } : row,
    );
    expect(markShifts(blunder, known, basis).filter(({ verdict }) => verdict === 'moved')).toEqual([]);
  });
});

const mark = (name: string, baselineKm: number, daysThere: number): MarkMean => ({
  mark: name,
  base: 'B',
  baselineKm,
  azimuthDeg: 0,
  occupations: 2 * daysThere,
  days: daysThere,
  east: 0,
  north: 0,
  up: 0,
  se: { east: 1, north: 1, up: 1 },
});

describe('the next marks to visit', () => {
  const all = [mark('near', 0.5, 30), mark('old', 2, 9), mark('mid', 5, 12), mark('far', 15, 20)];
  const flat: WatchBasis = { ...basis, A: 64, B: 1 };
  const everywhere = new Map(all.map(({ mark: name }) => [name, 2]));
  it('are the one that tells most of the ppm, and those with the fewest days', () => {
    const next = nextMarks(all, everywhere, [], flat);
    expect(next.map(({ mark: name, reason }) => [name, reason])).toEqual([
      ['far', 'tells most of the ppm'],
      ['old', 'few days'],
      ['mid', 'few days'],
    ]);
    expect(next[1]!.days).toBe(11);
    // Information of one occupation, B² (l - l̄)²/μ², over that of all: the shares of all occupations add up to 1.
    const shares = nextMarks(all, everywhere, [], flat, 4);
    const total = shares.reduce(
      (sum, { mark: name, informationGain }) =>
        sum + informationGain! * all.find((one) => one.mark === name)!.occupations,
      0,
    );
    expect(total).toBeCloseTo(1, 12);
  });
  it('begin with one that may have moved, and name one that was not visited', () => {
    const visited = new Map([...everywhere].filter(([name]) => name !== 'near'));
    const shift = { component: 'vertical', mark: 'mid', base: 'B', baselineKm: 5, days: 4 } as const;
    const moved = { ...shift, shiftMm: [40], seMm: 5, pValue: 1e-6, verdict: 'moved' } as const;
    expect(nextMarks(all, visited, [moved], flat).map(({ mark: name, reason }) => [name, reason])).toEqual([
      ['mid', 'may have moved'],
      ['far', 'tells most of the ppm'],
      ['near', 'not visited'],
    ]);
  });
  it('need no model', () => {
    const next = nextMarks(all, new Map(), [], null);
    expect(next.map(({ mark: name }) => name)).toEqual(['old', 'mid', 'far']);
    expect(next.every(({ informationGain }) => informationGain === null)).toBe(true);
    expect(nextMarks([], new Map(), [], null)).toEqual([]);
  });
});
