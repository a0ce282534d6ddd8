import { describe, expect, it } from 'vitest';
import { shareAtKm, simulateErrors } from '../../src/campaign/index.js';

const wrongFixes = { shareAt1Km: 0.003, shareAt12Km: 0.03 };
const options = { seed: 6, days: 600, wrongFixes };

describe('wrong fixes', () => {
  it('grow with distance as told, within 4 standard errors', () => {
    const { rows, marks } = simulateErrors(options);
    for (let first = 0; first < marks.length; first += 4) {
      const names = new Set(marks.slice(first, first + 4).map((mark) => mark.name));
      const own = rows.filter((row) => names.has(row.mark));
      const expected = own.reduce((sum, row) => sum + shareAtKm(wrongFixes, row.baselineKm), 0);
      const found = own.filter((row) => row.wrongFix).length;
      expect(expected).toBeGreaterThan(10);
      expect(Math.abs(found - expected)).toBeLessThan(4 * Math.sqrt(expected));
    }
  });

  it('add vectors of log-uniform length in all directions, and change nothing else', () => {
    const { rows, truth } = simulateErrors(options);
    const right = simulateErrors({ ...options, wrongFixes: null }).rows;
    const added = new Map(truth.wrongFixes.map((fix) => [`${fix.startMs} ${fix.rover}`, fix]));
    expect(added.size).toBe(rows.filter((row) => row.wrongFix).length);
    for (const [i, row] of rows.entries()) {
      const fix = added.get(`${row.startMs} ${row.rover}`);
      expect(row.mark).toBe(right[i]!.mark);
      expect(fix !== undefined).toBe(row.wrongFix);
      expect(row.up - right[i]!.up).toBeCloseTo(fix?.up ?? 0, 9);
      expect(row.east - right[i]!.east).toBeCloseTo(fix?.east ?? 0, 9);
    }
    const vectors = [...added.values()];
    const logs = vectors.map(({ east, north, up }) => Math.log(Math.hypot(east, north, up)));
    expect(Math.min(...logs)).toBeGreaterThanOrEqual(Math.log(50) - 1e-9);
    expect(Math.max(...logs)).toBeLessThanOrEqual(Math.log(1000) + 1e-9);
    const n = vectors.length;
    const mean = (values: readonly number[]) => values.reduce((sum, v) => sum + v, 0) / values.length;
    // A uniform log: mean log sqrt(50 · 1000), standard deviation log(20)/sqrt(12) = 0.865.
    expect(Math.abs(mean(logs) - Math.log(Math.sqrt(50_000)))).toBeLessThan((4 * 0.865) / Math.sqrt(n));
    // A direction uniform on the sphere has a mean square of 1/3 along every axis, variance 4/45 of the square.
    for (const axis of ['east', 'north', 'up'] as const) {
      const shares = vectors.map((v) => (v[axis] / Math.hypot(v.east, v.north, v.up)) ** 2);
      expect(Math.abs(mean(shares) - 1 / 3)).toBeLessThan(4 * Math.sqrt(4 / 45 / n));
    }
  });

  it('come in bursts of a rover with one vector when told', () => {
    const { rows, truth } = simulateErrors({
      ...options,
      noFix: { shareAt1Km: 0, shareAt12Km: 0 },
      unknownMarkShare: 0,
      occupationsPerDay: { from: 300, to: 300 },
      days: 100,
      wrongFixes: { shareAt1Km: 0.01, shareAt12Km: 0.01, meanBurst: 3 },
    });
    const vectorAt = new Map(truth.wrongFixes.map((fix) => [`${fix.startMs} ${fix.rover}`, fix.up]));
    let spoilt = 0;
    let started = 0;
    const before = new Map<string, number | undefined>();
    for (const row of rows) {
      const key = `${row.day} ${row.rover}`;
      const vector = vectorAt.get(`${row.startMs} ${row.rover}`);
      if (vector !== undefined) spoilt++;
      if (vector !== undefined && before.get(key) !== vector) started++;
      before.set(key, vector);
    }
    // Geometric with mean 3 and variance 6; runs cut by the end of a day are 3 in 100 of them.
    expect(Math.abs(spoilt / started - 3)).toBeLessThan(4 * Math.sqrt(6 / started) + 0.1);
    // About as many rows as without bursts: starts are a third as likely.
    expect(spoilt / rows.length).toBeGreaterThan(0.007);
    expect(spoilt / rows.length).toBeLessThan(0.013);
  });
});
