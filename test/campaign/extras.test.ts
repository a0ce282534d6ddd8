import { describe, expect, it } from 'vitest';
import { simulateErrors, simulateLog } from '../../src/campaign/index.js';

const base = { seed: 11, days: 40 };

describe('what can be added to a campaign', () => {
  it('are single bad days beside runs, apart from each other', () => {
    for (let seed = 1; seed <= 50; seed++) {
      const { truth } = simulateErrors({
        seed,
        days: 12,
        occupationsPerDay: { from: 3, to: 3 },
        badDays: { runs: 1, runLength: 2, singles: 2 },
      });
      const runs = truth.days
        .map(({ bad }) => (bad ? 'x' : '.'))
        .join('')
        .match(/x+/g)!;
      expect(runs.map(({ length }) => length).sort()).toEqual([1, 1, 2]);
    }
  });

  it('is a second base: its days, its baselines, its setups', () => {
    const otherBase = {
      name: 'T',
      latitudeDeg: 44.35,
      longitudeDeg: -18.4,
      heightM: 120,
      fromDay: 11,
      toDay: 20,
    };
    const { rows, bases, truth } = simulateErrors({ ...base, otherBase });
    expect(bases.map(({ name }) => name)).toEqual(['B1', 'T']);
    const days = truth.days.map(({ day }) => day);
    for (const row of rows) {
      const other = days.indexOf(row.day) >= 10 && days.indexOf(row.day) < 20;
      expect([row.base, row.setup]).toEqual(other ? ['T', `T ${row.day}`] : ['B1', 'B1']);
    }
    const lengths = (from: string) =>
      new Set(rows.filter((row) => row.mark === 'M14' && row.base === from).map((row) => row.baselineKm));
    expect(lengths('T').size).toBe(1);
    // The bases are 5.6 km apart.
    expect(Math.abs([...lengths('T')][0]! - [...lengths('B1')][0]!)).toBeLessThan(5.6);
    expect(lengths('T')).not.toEqual(lengths('B1'));
  });

  it('are blunders, counted, and nothing else changes', () => {
    const plain = simulateErrors(base);
    const { rows, truth } = simulateErrors({ ...base, blunders: { rodHeights: 3, wrongMarks: 2 } });
    expect(truth.blunders).toHaveLength(5);
    expect(truth.visits.wrongMark).toBe(2);
    expect(rows).toHaveLength(plain.rows.length - 2);
    const before = new Map(plain.rows.map((row) => [`${row.rover} ${row.startMs}`, row]));
    const changed = rows.filter((row) => {
      const old = before.get(`${row.rover} ${row.startMs}`)!;
      expect([row.east, row.north]).toEqual([old.east, old.north]);
      if (row.up !== old.up) expect(Math.abs(row.up - old.up)).toBeCloseTo(200, 9);
      return row.up !== old.up;
    });
    expect(changed.map(({ rodBlunder }) => rodBlunder)).toEqual([true, true, true]);
    expect(rows.filter(({ rodBlunder }) => rodBlunder)).toHaveLength(3);
  });

  it('writes a wrong mark into the log under the name of another', () => {
    const { rows, marks, truth } = simulateLog({
      ...base,
      days: 3,
      blunders: { rodHeights: 0, wrongMarks: 1 },
    });
    const [blunder] = truth.blunders;
    const row = rows.find(({ rover, timeMs }) => rover === blunder!.rover && timeMs === blunder!.startMs)!;
    expect(row.mark).toBe(blunder!.writtenAs);
    expect(row.mark).not.toBe(blunder!.mark);
    expect(marks.map(({ name }) => name)).toContain(row.mark);
    expect(truth.rows!.wrongMark).toBe(truth.settings.epochsPerOccupation);
  });

  it('is a correlation of east and north, and tails that keep the root-mean-square', () => {
    // Far from independent shots would blur both: every shot is new, and all marks are near.
    const many = {
      seed: 5,
      days: 200,
      dependent: false,
      dayFactorLogSd: 0,
      marks: { count: 8, nearestKm: 0.2, farthestKm: 0.5 },
    };
    const correlation = (r: number): number => {
      const { rows } = simulateErrors({ ...many, eastNorthCorrelation: r });
      const sum = (of: (row: (typeof rows)[number]) => number): number =>
        rows.reduce((total, row) => total + of(row), 0);
      return (
        sum((row) => row.east * row.north) /
        Math.sqrt(sum((row) => row.east ** 2) * sum((row) => row.north ** 2))
      );
    };
    // 9000 shots: standard error 0.01.
    expect(Math.abs(correlation(0))).toBeLessThan(0.04);
    expect(Math.abs(correlation(0.5) - 0.5)).toBeLessThan(0.04);
    const { rows } = simulateErrors({ ...many, tailDegrees: 6 });
    const mean = (of: (value: number) => number): number =>
      rows.reduce((total, row) => total + of(row.up), 0) / rows.length;
    const square = mean((up) => up ** 2);
    expect(Math.abs(square / 11 ** 2 - 1)).toBeLessThan(0.1);
    // Kurtosis of a t law with 6 degrees of freedom is 6, of a normal one 3.
    expect(mean((up) => up ** 4) / square ** 2).toBeGreaterThan(4);
  });

  it('refuses what cannot be', () => {
    const other = { name: 'T', latitudeDeg: 44.35, longitudeDeg: -18.4, heightM: 120 };
    expect(() => simulateErrors({ otherBase: { ...other, fromDay: 3, toDay: 31 } })).toThrow(
      'among the 30 days',
    );
    expect(() => simulateErrors({ otherBase: { ...other, name: 'B1', fromDay: 3, toDay: 4 } })).toThrow(
      'a name other than',
    );
    expect(() => simulateErrors({ days: 1, blunders: { rodHeights: 500 } })).toThrow(
      'at most one for each of',
    );
  });
});
