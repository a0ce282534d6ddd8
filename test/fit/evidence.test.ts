import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import {
  composeAbsolute,
  daysWithFarShots,
  firstAndLast,
  fitErrorModel,
  goesWithDistance,
  informationNumber,
  informationShares,
  reshots,
} from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';

const { rows } = simulateErrors({ seed: 31, days: 24 });
const model = fitErrorModel(rows, { component: 'vertical' });

describe('shares of the information on the ppm', () => {
  it.each(['mark', 'day', 'direction', 'crew'] as const)('by %s add up to 1, largest first', (by) => {
    const { shares } = informationShares(rows, model, by);
    expect(shares.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12);
    expect(shares.reduce((sum, { occupations }) => sum + occupations, 0)).toBe(rows.length);
    expect([...shares].sort((a, b) => b.share - a.share)).toEqual(shares);
    expect(informationShares(shuffle(rows, randomStream(5)), model, by)).toEqual({
      by,
      shares,
      notes: informationShares(rows, model, by).notes,
    });
  });
  it('are the terms of the information number', () => {
    // By hand for two lengths: with n_1 and n_2 shots the information is n_1 n_2 v_1 v_2/(n_1 v_1 + n_2 v_2) (x_2 - x_1)².
    const two = rows.slice(0, 30).map((row, k) => ({
      ...row,
      mark: k < 20 ? 'near' : 'far',
      baselineKm: k < 20 ? 1 : 10,
    }));
    const fit = fitErrorModel(two, { component: 'vertical' });
    const { displayP, displayQ } = fit.fitted;
    const [v1, v2] = [20 / (displayP + displayQ) ** 2, 10 / (displayP + 100 * displayQ) ** 2];
    const center = (v1 + 100 * v2) / (v1 + v2);
    const expected = (v2 * (100 - center) ** 2) / (v2 * (100 - center) ** 2 + v1 * (1 - center) ** 2);
    const { shares } = informationShares(two, fit, 'mark');
    expect(shares.find(({ group }) => group === 'far')!.share).toBeCloseTo(expected, 10);
    const lengths = Float64Array.from(two, ({ baselineKm }) => baselineKm ** 2);
    const whole = informationNumber({ y: lengths, l: lengths, w: lengths.map(() => 1) }, displayP, displayQ);
    expect(whole).toBeCloseTo(displayQ ** 2 * (v2 * (100 - center) ** 2 + v1 * (1 - center) ** 2), 8);
  });
  it('name a mark that carries most of it', () => {
    const farthest = rows.reduce((a, b) => (b.baselineKm > a.baselineKm ? b : a)).mark;
    const few = rows.filter(({ baselineKm, mark }) => baselineKm < 5 || mark === farthest);
    const { notes } = informationShares(few, fitErrorModel(few, { component: 'vertical' }), 'mark');
    expect(notes[0]!.text).toMatch(
      new RegExp(`^Mark ${farthest} alone carries \\d\\d % of what is known of the ppm`),
    );
  });
  it('of a composed model are those of its repeatability', () => {
    const repeated = fitErrorModel(rows, { component: 'vertical', reference: 'repeatability' });
    const composed = composeAbsolute(repeated).model!;
    const [own, theirs] = [repeated, composed].map((each) => informationShares(rows, each, 'mark').shares);
    theirs!.forEach(({ group, share }, k) => {
      expect(group).toBe(own![k]!.group);
      expect(share).toBeCloseTo(own![k]!.share, 9);
    });
  });
  it('refuse another grouping', () => {
    expect(() => informationShares(rows, model, 'hat' as never)).toThrow(
      '"mark", "day", "direction" or "crew" as by',
    );
  });
});

describe('what goes with distance', () => {
  it('is told beyond a correlation of 0.7', () => {
    const uphill = rows.map((row) => ({ ...row, heightDifferenceM: -20 * row.baselineKm }));
    const { companions, notes } = goesWithDistance(uphill);
    expect(companions[0]).toMatchObject({ quantity: 'height difference' });
    expect(companions[0]!.correlation!).toBeCloseTo(1, 12);
    expect(notes.map(({ code }) => code)).toEqual(['goes-with-distance']);
    const late = rows.map((row) => ({ ...row, heightDifferenceM: 1, solarHour: 8 - row.baselineKm / 10 }));
    expect(goesWithDistance(late).notes[0]!.text).toMatch(
      /^Distance goes with hour \(correlation −1\.00\): far shots were taken early in the day/,
    );
  });
  it('is nothing in a mixed campaign, and null where it is not known', () => {
    const mixed = rows.map((row) => ({ ...row, heightDifferenceM: (row.startMs / 1000) % 97 }));
    expect(goesWithDistance(mixed).notes).toEqual([]);
    const plain = rows.map(({ day, baselineKm }) => ({ day, baselineKm }));
    expect(goesWithDistance(plain).companions.map(({ correlation }) => correlation === null)).toEqual([
      true,
      true,
      false,
    ]);
  });
});

describe('days with far shots', () => {
  const days = [...new Set(rows.map(({ day }) => day))];
  const split = (factor: number) =>
    rows
      .filter(({ day, baselineKm }) => baselineKm < 8 || days.indexOf(day) % 2 === 0)
      .map((row) => ({ ...row, up: days.indexOf(row.day) % 2 === 0 ? row.up * factor : row.up }));
  const run = (factor: number) => daysWithFarShots(split(factor), { component: 'vertical', farKm: 8 });
  it('are not shown to differ when they do not', () => {
    const { daysWithFar, daysWithoutFar, near, message } = run(1);
    expect([daysWithFar, daysWithoutFar]).toEqual([12, 12]);
    expect(near!.low).toBeLessThan(1);
    expect(near!.high).toBeGreaterThan(1);
    expect(message.code).toBe('far-days-not-shown-to-differ');
  });
  it('are told when they are better, or worse', () => {
    expect(run(0.4).message.code).toBe('far-days-better');
    expect(run(0.4).message.text).toContain('so the ppm is too small for the others');
    expect(run(2.5).message.code).toBe('far-days-worse');
    expect(run(2.5).near!.ratio / run(1).near!.ratio).toBeCloseTo(2.5, 9);
  });
  it('are not compared with fewer than 5 days of either kind', () => {
    expect(daysWithFarShots(rows, { component: 'vertical', farKm: 8 })).toMatchObject({
      near: null,
      message: { code: 'far-days-not-compared' },
    });
  });
});

describe('the first and the last occupation of a visit', () => {
  // Each occupation becomes a visit of three, a minute apart.
  const normal = (k: number): number => ((k * 7919) % 101) / 50 - 1;
  const visits = (factor: number) =>
    rows.flatMap((row, k) =>
      [0, 1, 2].map((j) => ({
        ...row,
        startMs: row.startMs + 60_000 * j,
        up: (j === 0 ? factor : 1) * 10 * normal(3 * k + j),
      })),
    );
  const run = (factor: number) => firstAndLast(visits(factor), { component: 'vertical' });
  it('are not shown to differ when they do not', () => {
    expect(run(1).message.code).toBe('first-not-shown-to-differ');
  });
  it('are told when the first is worse, or better', () => {
    expect(run(2).message.code).toBe('first-worse');
    expect(run(2).message.text).toContain('Wait longer after the fix');
    expect(run(0.5).message.code).toBe('first-better');
    expect(run(2).first!.ratio / run(1).first!.ratio).toBeCloseTo(2, 9);
  });
  it('are not compared where visits have one occupation', () => {
    const single = rows.filter(({ mark }, k) => k === 0 || rows[k - 1]!.mark !== mark).slice(0, 8);
    expect(firstAndLast(single, { component: 'vertical' })).toMatchObject({ first: null });
  });
});

describe('signs of repeated and missing shots', () => {
  const at = (minutes: number, mark: string, pointNumber: string, rover = 'R1') => ({
    day: '2025-03-03',
    mark,
    rover,
    startMs: Date.UTC(2025, 2, 3, 9) + 60_000 * minutes,
    pointNumber,
  });
  const shots = [
    at(0, 'A', '101'),
    at(4, 'A', '103'),
    at(40, 'B', '104'),
    at(41, 'A', '900', 'R2'),
    at(60, 'B', '130'),
  ];
  it('pairs what begins soon after another on the same mark, and counts short gaps of numbers', () => {
    const { pairs, missingNumbers, numbered, notes } = reshots(shots);
    expect(pairs).toEqual([{ first: 0, again: 1, minutes: 4 }]);
    expect(reshots(shots, { withinMinutes: 30 }).pairs).toHaveLength(2);
    // 102 is missing; 105 to 129 are other work; the other rover counts by itself.
    expect([missingNumbers, numbered]).toEqual([1, 5]);
    expect(notes.map(({ code }) => code)).toEqual(['quick-reshots', 'point-numbers-missing']);
  });
  it('says nothing of numbers without the column, and refuses minutes below 0', () => {
    const plain = shots.map(({ pointNumber: _, ...shot }) => shot);
    expect(reshots(plain)).toMatchObject({ missingNumbers: null, numbered: null });
    expect(() => reshots(plain, { withinMinutes: -1 })).toThrow(
      'Expected a number above 0 as withinMinutes, came -1',
    );
  });
});
