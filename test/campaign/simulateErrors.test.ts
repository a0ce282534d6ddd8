import { describe, expect, it } from 'vitest';
import { type SimulatedOccupation, shareAtKm, simulateErrors } from '../../src/campaign/index.js';

const AXES = ['east', 'north', 'up'] as const;
const mean = (values: readonly number[]): number => values.reduce((sum, v) => sum + v, 0) / values.length;

/** Mean of `value` over rows and its standard error when shots of a day go together (ratio estimator). */
function clusteredMean(rows: readonly SimulatedOccupation[], value: (row: SimulatedOccupation) => number) {
  const overall = mean(rows.map(value));
  const byDay = new Map<string, number>();
  for (const row of rows) byDay.set(row.day, (byDay.get(row.day) ?? 0) + value(row) - overall);
  const square = [...byDay.values()].reduce((sum, v) => sum + v * v, 0);
  return { mean: overall, se: Math.sqrt(square) / rows.length };
}

describe('simulated errors', () => {
  it('are equal for equal seeds and differ for different seeds', () => {
    const bytes = (seed: number) => JSON.stringify(simulateErrors({ seed, days: 5, wrongFixes: {} }));
    expect(bytes(7)).toBe(bytes(7));
    expect(bytes(7)).not.toBe(bytes(8));
  });

  it('have a row for every visit with a fix on a known mark, in time order within the working hours', () => {
    const { rows, truth } = simulateErrors({ days: 12, startDate: '2025-03-01' });
    expect(rows).toHaveLength(truth.visits.withFix);
    expect(truth.visits.withFix + truth.visits.withoutFix + truth.visits.unknownMark).toBe(
      truth.visits.planned,
    );
    for (const [i, row] of rows.entries()) {
      if (i > 0) expect(row.startMs).toBeGreaterThanOrEqual(rows[i - 1]!.startMs);
      const local = new Date(row.startMs - 3_600_000).toISOString();
      expect(local.slice(0, 10)).toBe(row.day);
      expect(Number(local.slice(11, 13))).toBeGreaterThanOrEqual(8);
      expect(Number(local.slice(11, 13))).toBeLessThan(17);
    }
    // 2025-03-01 was a Saturday (calendar).
    expect(truth.days.map(({ day }) => day).slice(0, 6)).toEqual([
      '2025-03-03',
      '2025-03-04',
      '2025-03-05',
      '2025-03-06',
      '2025-03-07',
      '2025-03-10',
    ]);
  });

  it('have mean squares a² + b² E(s²) L² at all distances, within 4 standard errors by day', () => {
    const { rows, marks } = simulateErrors({ seed: 3, days: 400 });
    // E s² = exp(2 · 0.3²) = 1.197: second moment of a log-normal factor with median 1.
    const square = { east: [5.5, 0.55], north: [5.5, 0.55], up: [11, 1.1] } as const;
    for (let first = 0; first < marks.length; first += 3) {
      const names = new Set(marks.slice(first, first + 3).map((mark) => mark.name));
      const own = rows.filter((row) => names.has(row.mark));
      for (const axis of AXES) {
        const [a, b] = square[axis];
        const ratio = clusteredMean(
          own,
          (row) => row[axis] ** 2 / (a ** 2 + b ** 2 * 1.1972 * row.baselineKm ** 2),
        );
        expect(ratio.se).toBeLessThan(0.06);
        expect(Math.abs(ratio.mean - 1)).toBeLessThan(4 * ratio.se);
        expect(Math.abs(mean(own.map((row) => row[axis])))).toBeLessThan(
          4 * clusteredMean(own, (r) => r[axis]).se,
        );
      }
    }
  });

  it('state the ppm of the long run, of the days drawn and of each day', () => {
    const { truth } = simulateErrors({ days: 5000, occupationsPerDay: { from: 3, to: 3 } });
    const { horizontal, vertical, east, up } = truth.components;
    expect(horizontal.constantMm).toBeCloseTo(5.5 * Math.SQRT2, 12);
    expect(vertical).toEqual(up);
    expect(east.medianDayPpm).toBe(0.55);
    expect(east.longRunPpm).toBeCloseTo(0.55 * Math.sqrt(1.1972), 4);
    // Mean of 5000 s²: standard error sqrt(exp(.72) − exp(.36)) / sqrt(5000) = 0.011; half of it for the root.
    expect(east.drawnPpm / 0.55).toBeGreaterThan(Math.sqrt(1.1972 - 4 * 0.011));
    expect(east.drawnPpm / 0.55).toBeLessThan(Math.sqrt(1.1972 + 4 * 0.011));
    // Median of 5000 log factors: standard error 0.3 · 1.2533 / sqrt(5000) = 0.0053.
    expect(Math.abs(Math.log(east.drawnMedianDayPpm / 0.55))).toBeLessThan(4 * 0.0053);
    expect(up.dayPpm[17]).toBeCloseTo(1.1 * truth.days[17]!.factor, 12);
    expect(up.drawnPpm ** 2).toBeCloseTo(mean(up.dayPpm.map((ppm) => ppm ** 2)), 9);
  });

  describe('depend on each other', () => {
    const zero = { east: 0, north: 0, up: 0 };
    const one = { east: 1, north: 1, up: 1 };
    const settings = {
      seed: 11,
      days: 300,
      dayFactorLogSd: 0,
      occupationsPerDay: { from: 150, to: 150 },
      noFix: { shareAt1Km: 0, shareAt12Km: 0 },
      unknownMarkShare: 0,
    };
    /** Products of unit errors of neighbours in time with what they should average to, and its clustered error. */
    function compare(
      rows: readonly SimulatedOccupation[],
      unit: (row: SimulatedOccupation) => number,
      expected: (a: SimulatedOccupation, b: SimulatedOccupation) => number | null,
    ) {
      const next = new Map(rows.slice(1).map((row, i) => [rows[i]!, row]));
      const pairs = rows.filter(
        (row) => next.get(row)?.day === row.day && expected(row, next.get(row)!) !== null,
      );
      const excess = clusteredMean(
        pairs,
        (row) => unit(row) * unit(next.get(row)!) - expected(row, next.get(row)!)!,
      );
      return {
        ...excess,
        expected: mean(pairs.map((row) => expected(row, next.get(row)!)!)),
        pairs: pairs.length,
      };
    }
    const minutes = (a: SimulatedOccupation, b: SimulatedOccupation): number =>
      (b.startMs - a.startMs) / 60_000;

    it('over 40 minutes in the part that grows with distance, more alike the closer their directions', () => {
      const { rows } = simulateErrors({ ...settings, constantMm: zero, ppm: one });
      const turn = (a: SimulatedOccupation, b: SimulatedOccupation) =>
        Math.cos(((a.azimuthDeg - b.azimuthDeg) * Math.PI) / 180);
      for (const axis of AXES)
        for (const alike of [true, false]) {
          const result = compare(
            rows,
            (row) => row[axis] / row.baselineKm,
            (a, b) => (turn(a, b) > 0 === alike ? Math.exp(-minutes(a, b) / 40) * turn(a, b) : null),
          );
          expect(Math.abs(result.expected)).toBeGreaterThan(0.3);
          expect(Math.abs(result.mean)).toBeLessThan(4 * result.se);
          expect(result.se).toBeLessThan(0.05);
        }
    });

    it('over 10 minutes in two fifths of the constant part of a rover, and not between rovers', () => {
      const { rows } = simulateErrors({ ...settings, constantMm: one, ppm: zero });
      for (const same of [true, false]) {
        const result = compare(
          rows,
          (row) => row.up,
          (a, b) =>
            (a.rover === b.rover) === same ? (same ? 0.4 * Math.exp(-minutes(a, b) / 10) : 0) : null,
        );
        expect(result.pairs).toBeGreaterThan(1000);
        if (same) expect(result.expected).toBeGreaterThan(0.15);
        expect(Math.abs(result.mean)).toBeLessThan(4 * result.se);
        expect(result.se).toBeLessThan(0.03);
      }
    });

    it('unless told otherwise', () => {
      const { rows } = simulateErrors({ ...settings, constantMm: one, ppm: one, dependent: false });
      const result = compare(
        rows,
        (row) => row.north / Math.sqrt(1 + row.baselineKm ** 2),
        () => 0,
      );
      expect(Math.abs(result.mean)).toBeLessThan(4 * result.se);
      expect(result.se).toBeLessThan(0.01);
      expect(clusteredMean(rows, (row) => row.north ** 2 / (1 + row.baselineKm ** 2)).mean).toBeCloseTo(1, 1);
    });
  });

  it('follow the daily course at solar hours, highest at 14 h', () => {
    const { rows, truth } = simulateErrors({ seed: 2, days: 300, middayRise: 0.8, constantMm: { up: 0 } });
    const ms = (from: number, to: number) => {
      const own = rows.filter((row) => row.solarHour >= from && row.solarHour < to);
      return clusteredMean(own, (row) => (row.up / (1.1 * row.baselineKm)) ** 2 / 1.1972);
    };
    // h² = exp(1.6 (2 cos(2π(t − 14)/24) − 1)): at 8 h exp(−1.6) = 0.20, at 14 h exp(1.6) = 4.95.
    const noon = ms(13.5, 14.5);
    const morning = ms(7.5, 8.5);
    expect(Math.abs(noon.mean - 4.88)).toBeLessThan(4 * noon.se);
    expect(Math.abs(morning.mean - 0.22)).toBeLessThan(4 * morning.se);
    const h2 = mean(
      rows.map((row) => Math.exp(1.6 * (2 * Math.cos(((row.solarHour - 14) * Math.PI) / 12) - 1))),
    );
    expect(truth.components.up.longRunPpm ** 2 / (1.1 ** 2 * 1.1972 * h2)).toBeCloseTo(1, 2);
  });

  it('hold bad days in runs of consecutive days, each worse by its own factor', () => {
    const options = { seed: 21, days: 60, badDays: { runs: 4, runLength: 3 } };
    const { truth } = simulateErrors(options);
    const without = simulateErrors({ ...options, badDays: null }).truth;
    const runs = truth.days
      .map((day) => (day.bad ? 'x' : '.'))
      .join('')
      .match(/x+/g);
    expect(runs).toEqual(['xxx', 'xxx', 'xxx', 'xxx']);
    const ratios = truth.days.map((day, i) => day.factor / without.days[i]!.factor);
    const bad = ratios.filter((_, i) => truth.days[i]!.bad);
    expect(ratios.filter((_, i) => !truth.days[i]!.bad).every((ratio) => ratio === 1)).toBe(true);
    expect(Math.min(...bad)).toBeGreaterThanOrEqual(2);
    expect(Math.max(...bad)).toBeLessThanOrEqual(5);
    expect(new Set(bad).size).toBe(12);
  });

  it('keep runs of bad days apart even when there is just room for them', () => {
    const { truth } = simulateErrors({ days: 11, badDays: { runs: 3, runLength: 3 } });
    expect(truth.days.map((day) => (day.bad ? 'x' : '.')).join('')).toBe('xxx.xxx.xxx');
  });

  it('take bad days into account in the long run', () => {
    // 8 % of the days worse by a factor uniform in 2 to 5, log sd 0.25: E s² = exp(.125) (.92 + .08 · 13) = 2.22.
    const badDays = { runs: 4, runLength: 2 };
    const { truth } = simulateErrors({ days: 100, dayFactorLogSd: 0.25, badDays });
    expect((truth.components.up.longRunPpm / 1.1) ** 2).toBeCloseTo(2.22, 2);
  });

  it('show errors of marks and setups as common offsets', () => {
    const options = {
      seed: 9,
      days: 40,
      base: { mounting: 'tripod', setupsPerDay: 2 },
      marks: { count: 300 },
    } as const;
    const without = simulateErrors(options);
    const { rows, truth } = simulateErrors({
      ...options,
      markSigmaMm: { east: 5, north: 6, up: 12 },
      setupSigmaMm: { east: 3, north: 4, up: 8 },
    });
    const marks = new Map(truth.marks.map((mark) => [mark.mark, mark]));
    const setups = new Map(truth.setups.map((setup) => [setup.setup, setup]));
    expect(setups.size).toBe(80);
    for (const [i, row] of rows.entries())
      for (const axis of AXES)
        expect(row[axis] - without.rows[i]![axis]).toBeCloseTo(
          marks.get(row.mark)![axis] + setups.get(row.setup)![axis],
          9,
        );
    const sd = (values: readonly number[]) => Math.sqrt(mean(values.map((v) => v * v)));
    // Standard error of a standard deviation: sigma / sqrt(2 n); n = 300 marks, 80 setups.
    expect(Math.abs(sd(truth.marks.map((mark) => mark.up)) / 12 - 1)).toBeLessThan(4 / Math.sqrt(600));
    expect(Math.abs(sd(truth.setups.map((setup) => setup.north)) / 4 - 1)).toBeLessThan(4 / Math.sqrt(160));
    // 5.5² + 5² + 3² and so on.
    expect(truth.components.east.absoluteConstantMm).toBeCloseTo(Math.sqrt(64.25), 9);
    expect(truth.components.horizontal.absoluteConstantMm ** 2).toBeCloseTo(64.25 + 82.25, 9);
  });

  it('name setups by base on a pillar, and by base and day on a tripod', () => {
    const setups = (mounting: 'pillar' | 'tripod', setupsPerDay = 1) => [
      ...new Set(simulateErrors({ days: 2, base: { mounting, setupsPerDay } }).rows.map((row) => row.setup)),
    ];
    expect(setups('pillar')).toEqual(['B1']);
    expect(setups('tripod')).toEqual(['B1 2025-03-03', 'B1 2025-03-04']);
    expect(setups('tripod', 2)).toEqual([
      'B1 2025-03-03',
      'B1 2025-03-03 (2)',
      'B1 2025-03-04',
      'B1 2025-03-04 (2)',
    ]);
  });

  it('come from a few near marks and few shots a day when shots are habitual', () => {
    const { rows, truth } = simulateErrors({
      seed: 4,
      days: 250,
      habitual: {},
      noFix: { shareAt1Km: 0, shareAt12Km: 0 },
    });
    const perDay = truth.days.map(({ day }) => rows.filter((row) => row.day === day).length);
    expect(Math.max(...perDay)).toBeLessThanOrEqual(8);
    expect(mean(perDay)).toBeGreaterThan(5);
    expect(mean(perDay)).toBeLessThan(6);
    const near = rows.filter((row) => row.baselineKm <= 3).length / rows.length;
    expect(Math.abs(near - 0.8)).toBeLessThan(4 * Math.sqrt((0.8 * 0.2) / rows.length));
  });

  it('leave every crew near and far marks every day in a planned campaign', () => {
    const { rows, truth, marks } = simulateErrors({
      days: 20,
      noFix: { shareAt1Km: 0, shareAt12Km: 0 },
      unknownMarkShare: 0,
    });
    const third = [...marks].map((mark) => mark.baselineKm).sort((a, b) => a - b);
    for (const { day } of truth.days)
      for (const crew of ['A', 'B', 'C']) {
        const own = rows.filter((row) => row.day === day && row.crew === crew).map((row) => row.baselineKm);
        expect(Math.max(...own)).toBeGreaterThanOrEqual(third[10]!);
        expect(Math.min(...own)).toBeLessThanOrEqual(third[3]!);
      }
    expect(new Set(rows.map((row) => `${row.crew}${row.rover}`)).size).toBe(9);
  });
});

describe('share by distance', () => {
  it('is a straight line of logs through the shares at 1 and 12 km', () => {
    const share = { shareAt1Km: 0.003, shareAt12Km: 0.03 };
    expect(shareAtKm(share, 1)).toBeCloseTo(0.003, 12);
    expect(shareAtKm(share, 12)).toBeCloseTo(0.03, 12);
    // Half way in log distance: sqrt(12) km and the geometric mean of the shares.
    expect(shareAtKm(share, Math.sqrt(12))).toBeCloseTo(Math.sqrt(0.003 * 0.03), 12);
    expect(shareAtKm(share, 0.1)).toBe(shareAtKm(share, 0.5));
    expect(shareAtKm(share, 1e6)).toBe(0.5);
    expect(shareAtKm({ shareAt1Km: 0, shareAt12Km: 0 }, 5)).toBe(0);
  });
});
