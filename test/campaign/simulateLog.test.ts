import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type LogRow, simulateErrors, simulateLog } from '../../src/campaign/index.js';
import { geodeticToGeocentric, localFrame } from '../../src/geodesy/index.js';

const key = (row: LogRow): string => JSON.stringify(row);

describe('simulated log', () => {
  it('gives the occupations of simulateErrors back as means of their epochs, up to rounding', () => {
    const options = { seed: 12, days: 4, wrongFixes: {}, markSigmaMm: { east: 4, north: 4, up: 8 } };
    const { rows, marks, occupations } = simulateLog(options);
    expect(occupations).toEqual(simulateErrors(options).rows);
    const frames = new Map(marks.map((mark) => [mark.name, localFrame(mark)]));
    const fixed = new Map<string, LogRow[]>();
    const seen = new Set<string>();
    for (const row of rows)
      if (row.fix === 'fixed' && !seen.has(key(row))) {
        seen.add(key(row));
        const second = `${row.rover} ${row.timeMs}`;
        fixed.set(second, [...(fixed.get(second) ?? []), row]);
      }
    for (const occupation of occupations) {
      const epochs = [0, 1, 2, 3, 4].flatMap(
        (s) => fixed.get(`${occupation.rover} ${occupation.startMs + 1000 * s}`)!,
      );
      expect(epochs.map((row) => row.mark)).toEqual(Array(5).fill(occupation.mark));
      const local = epochs.map((row) => frames.get(row.mark)!.toLocal(geodeticToGeocentric(row)));
      const meanMm = (axis: 'eastM' | 'northM' | 'upM') => local.reduce((sum, v) => sum + 200 * v[axis], 0);
      // Rounding to 1e-9 degrees moves a position by at most 0.056 mm, to 0.1 mm of height by 0.05 mm.
      expect(Math.abs(meanMm('eastM') - occupation.east)).toBeLessThan(0.057);
      expect(Math.abs(meanMm('northM') - occupation.north)).toBeLessThan(0.057);
      expect(Math.abs(meanMm('upM') - occupation.up)).toBeLessThan(0.051);
    }
  });

  it('scatters epochs about the mean of their occupation', () => {
    const { rows, marks } = simulateLog({
      seed: 8,
      days: 20,
      constantMm: { east: 0, north: 0, up: 0 },
      ppm: { east: 0, north: 0, up: 0 },
    });
    const frames = new Map(marks.map((mark) => [mark.name, localFrame(mark)]));
    const ups = rows.flatMap((row) => {
      const frame = frames.get(row.mark);
      return row.fix === 'fixed' && frame !== undefined
        ? [1000 * frame.toLocal(geodeticToGeocentric(row)).upM]
        : [];
    });
    // Scatter 4 mm, of which 1/5 goes with the mean of five; n = 4/5 of the epochs are free.
    const meanSquare = ups.reduce((sum, v) => sum + v * v, 0) / ups.length;
    expect(Math.abs(meanSquare / (16 * 0.8) - 1)).toBeLessThan(4 * Math.sqrt(2 / (0.8 * ups.length)));
  });

  it('holds what the truth counts, row by row', () => {
    fc.assert(
      fc.property(fc.nat({ max: 1e6 }), fc.integer({ min: 1, max: 8 }), (seed, epochsPerOccupation) => {
        const { rows, marks, truth } = simulateLog({
          seed,
          days: 3,
          epochsPerOccupation,
          unknownMarkShare: 0.05,
          duplicateRowShare: 0.03,
          floatRowShare: 0.1,
          noFix: { shareAt1Km: 0.03, shareAt12Km: 0.1 },
        });
        const known = new Set(marks.map((mark) => mark.name));
        const first = new Set<string>();
        const found = {
          written: rows.length,
          fixed: 0,
          float: 0,
          unknownMark: 0,
          wrongMark: 0,
          duplicate: 0,
        };
        for (const row of rows) {
          if (row.fix === 'float') found.float++;
          else if (!known.has(row.mark)) found.unknownMark++;
          else if (first.has(key(row))) found.duplicate++;
          else found.fixed++;
          first.add(key(row));
        }
        expect(found).toEqual(truth.rows);
        expect(found.fixed).toBe(truth.visits.withFix * epochsPerOccupation);
        expect(found.unknownMark).toBe(truth.visits.unknownMark * epochsPerOccupation);
        expect(truth.unknownMarks).toHaveLength(truth.visits.unknownMark);
        expect(truth.visitsWithoutFix).toHaveLength(truth.visits.withoutFix);
        for (const { rover, startMs, writtenAs } of truth.unknownMarks) {
          expect(known.has(writtenAs)).toBe(false);
          expect(rows.find((row) => row.rover === rover && row.timeMs === startMs)?.mark).toBe(writtenAs);
        }
        for (const { rover, mark, startMs } of truth.visitsWithoutFix) {
          const own = rows.filter((row) => row.rover === rover && Math.abs(row.timeMs - startMs) < 60_000);
          expect(own.map((row) => row.fix)).toEqual(Array(epochsPerOccupation).fill('float'));
          expect(own[0]!.mark).toBe(mark);
        }
      }),
      { seed: 31, numRuns: 25 },
    );
  });

  it('has about the shares it was told, and more visits without a fix far away', () => {
    const { truth, rows } = simulateLog({ seed: 5, days: 200, unknownMarkShare: 0.01 });
    const { visits, visitsWithoutFix } = truth;
    const counts = truth.rows!;
    const waiting = counts.float - 5 * visits.withoutFix;
    // Float rows before a fix: geometric with mean m = 5 · .03/.97, variance m + m².
    const m = (5 * 0.03) / 0.97;
    expect(Math.abs(waiting / visits.withFix - m)).toBeLessThan(4 * Math.sqrt((m + m * m) / visits.withFix));
    const within = (found: number, expected: number) =>
      expect(Math.abs(found - expected)).toBeLessThan(4 * Math.sqrt(expected));
    within(visits.unknownMark, 0.01 * visits.planned);
    within(counts.duplicate, 0.002 * counts.fixed);
    const share = (from: number, to: number) => {
      const inside = ({ baselineKm }: { baselineKm: number }) => baselineKm >= from && baselineKm < to;
      const failed = visitsWithoutFix.filter(inside).length;
      return failed / (failed + simulated.filter(inside).length);
    };
    const simulated = simulateErrors({ seed: 5, days: 200, unknownMarkShare: 0.01 }).rows;
    expect(share(10, 40)).toBeGreaterThan(3 * share(0, 2));
    for (const [i, row] of rows.entries())
      if (i > 0) expect(row.timeMs).toBeGreaterThanOrEqual(rows[i - 1]!.timeMs);
  });

  it('keeps visits of a rover more than a minute apart', () => {
    const { rows } = simulateLog({
      seed: 2,
      days: 3,
      occupationsPerDay: { from: 400, to: 450 },
      floatRowShare: 0.2,
    });
    const last = new Map<string, LogRow>();
    let visits = 0;
    for (const row of rows) {
      const before = last.get(row.rover);
      const gapS = before === undefined ? Number.POSITIVE_INFINITY : (row.timeMs - before.timeMs) / 1000;
      if (gapS > 1) {
        visits++;
        expect(gapS).toBeGreaterThan(60);
      } else expect(row.mark).toBe(before?.mark);
      last.set(row.rover, row);
    }
    expect(visits).toBeGreaterThan(1100);
  });

  it('mistypes a mark without hitting another mark', () => {
    const marks = ['P1', 'P-1'].map((name, i) => ({ name, baselineKm: 1 + i, azimuthDeg: 0, heightM: 100 }));
    const { truth } = simulateLog({ seed: 1, days: 3, marks, unknownMarkShare: 0.3 });
    expect(new Set(truth.unknownMarks.map((visit) => visit.writtenAs))).toEqual(new Set(['P--1']));
  });
});
