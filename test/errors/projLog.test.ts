import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { readBases, readMarks } from '../../src/control/index.js';
import { computeErrors, formOccupations } from '../../src/errors/index.js';
import { readLogs } from '../../src/logs/index.js';
import { logFile } from '../files.js';
import { at, BASES, batches, control, MARKS } from './world.js';

const path = (name: string): string =>
  fileURLToPath(new URL(`../fixtures/proj-log/${name}`, import.meta.url));

/** Mean of the rows of an occupation. */
const mean = (rows: readonly string[][], column: number): number =>
  rows.reduce((total, row) => total + Number(row[column]), 0) / rows.length;

// Errors, chord lengths and azimuths by PROJ 9.1.1 (cct, geod); see fixtures/proj-log/README.md.
describe('a log whose errors were put in with PROJ', () => {
  const expected = readFileSync(path('expected.csv'), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(','));
  // As the README tells: nine occupations, the last row one of its own.
  const sizes = [3, 3, 3, 3, 3, 3, 3, 2, 1];

  const run = async () => {
    const source = (name: string) => ({ path: path(name), file: name, coordinates: 'geographic' });
    const { marks } = await readMarks(source('marks.csv'));
    const { bases } = await readBases(source('bases.csv'));
    const known = { marks, bases };
    const log = readLogs([logFile(path('log.csv'), 'log.csv')], { timeZone: null });
    const formed = await formOccupations(log, known);
    return { formed, computed: computeErrors(formed.occupations, known) };
  };

  it('gives the errors back within 0.05 mm, lengths and azimuths to the printed digits', async () => {
    const { formed, computed } = await run();
    expect(formed.files).toEqual([{ file: 'log.csv', read: 24, used: 24, setAside: {} }]);
    expect(computed.setAside).toEqual([]);
    expect(computed.errors.map(({ epochs }) => epochs)).toEqual(sizes);
    let from = 0;
    for (const error of computed.errors) {
      const rows = expected.slice(from, from + error.epochs);
      from += error.epochs;
      expect(error.startMs).toBe(Date.parse(rows[0]![0]!));
      expect(error.mark).toBe(rows[0]![1]);
      expect(Math.abs(error.east - mean(rows, 2))).toBeLessThan(0.05);
      expect(Math.abs(error.north - mean(rows, 3))).toBeLessThan(0.05);
      expect(Math.abs(error.up - mean(rows, 4))).toBeLessThan(0.05);
      expect(Math.abs(error.baselineKm - Number(rows[0]![5]))).toBeLessThan(1e-9);
      expect(Math.abs(error.azimuthDeg - Number(rows[0]![6]))).toBeLessThan(1e-9);
    }
    expect(from).toBe(expected.length);
  });

  it('keeps the occupation over midnight UTC whole on its solar day', async () => {
    const { computed } = await run();
    const night = computed.errors[6]!;
    expect([night.day, night.epochs, night.setup]).toEqual(['2025-03-07', 3, 'B1 2025-03-07']);
  });
});

describe('signs', () => {
  // A second of arc is about 31 m: 1e-7 degrees of latitude are 11.1 mm, of longitude at 47° 7.6 mm.
  const errorOf = async (change: { dLat?: number; dLon?: number; dUp?: number }) => {
    const { latitudeDeg, longitudeDeg, heightM } = MARKS.CP1!;
    const moved = at(0, {
      latitudeDeg: latitudeDeg + (change.dLat ?? 0),
      longitudeDeg: longitudeDeg + (change.dLon ?? 0),
      heightM: heightM + (change.dUp ?? 0),
    });
    const known = control();
    const { occupations } = await formOccupations(batches([moved]), known);
    return computeErrors(occupations, known).errors[0]!;
  };

  it('counts measured minus known, east, north and up', async () => {
    const north = await errorOf({ dLat: 1e-7 });
    expect([north.east, north.north, north.up].map((value) => Number(value.toFixed(1)) + 0)).toEqual([
      0, 11.1, 0,
    ]);
    const east = await errorOf({ dLon: 1e-7 });
    expect([east.east, east.north, east.up].map((value) => Number(value.toFixed(1)) + 0)).toEqual([
      7.6, 0, 0,
    ]);
    const up = await errorOf({ dUp: -0.02 });
    expect([up.east, up.north, up.up].map((value) => Number(value.toFixed(1)) + 0)).toEqual([0, 0, -20]);
  });

  it('counts along from base to mark and across to the right of it', async () => {
    // CP1 lies due north of B1, so along is north and across is east.
    expect(BASES.B1!.longitudeDeg).toBe(MARKS.CP1!.longitudeDeg);
    const north = await errorOf({ dLat: 1e-7 });
    expect(north.along).toBeCloseTo(north.north, 9);
    expect(north.across).toBeCloseTo(0, 5);
    const east = await errorOf({ dLon: 1e-7 });
    expect(east.across).toBeCloseTo(east.east, 9);
    expect(east.along).toBeCloseTo(0, 5);
  });
});
