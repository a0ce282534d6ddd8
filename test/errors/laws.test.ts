import { existsSync, mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { type CampaignOptions, type LogRow, logText, simulateLog } from '../../src/campaign/index.js';
import type { Control } from '../../src/control/index.js';
import {
  computeErrors,
  type FormedOccupations,
  type FormOccupationsOptions,
  formOccupations,
  type Occupation,
  type Visit,
} from '../../src/errors/index.js';
import type { Geodetic } from '../../src/geodesy/index.js';
import { type Position, readLogs } from '../../src/logs/index.js';
import { logFile, testFolder } from '../files.js';
import { at, base, batches, control, MARKS, mark } from './world.js';

const folder = testFolder();
const SEED = 20250304;
const UTC: FormOccupationsOptions = { timeZone: 'UTC' };

const CAMPAIGN: CampaignOptions = {
  seed: 5,
  days: 3,
  marks: { count: 4, nearestKm: 0.5, farthestKm: 20 },
  occupationsPerDay: { from: 6, to: 9 },
  floatRowShare: 0.2,
  noFix: { shareAt1Km: 0.1, shareAt12Km: 0.2 },
  unknownMarkShare: 0.05,
  duplicateRowShare: 0.1,
};

/** A simulated campaign as positions, made worse by rows of the same time that differ by little and by much. */
function campaign(worse = true): { positions: Position[]; known: Control; rows: readonly LogRow[] } {
  const { rows, marks, base } = simulateLog(CAMPAIGN);
  const places = (points: readonly ({ name: string } & Geodetic)[]): Record<string, Geodetic> =>
    Object.fromEntries(points.map(({ name, ...place }) => [name, place]));
  const positions = rows.map(({ timeMs, setup: _, ...row }) =>
    at(0, { ...row, utcMs: timeMs, crew: row.crew }),
  );
  const variants = positions.flatMap((position, i): Position[] => {
    if (i % 17 === 3) return [{ ...position, heightM: position.heightM + 0.00005, satellites: 4 }];
    if (i % 23 === 5) return [{ ...position, heightM: position.heightM + 1 }];
    if (i % 29 === 7) return [{ ...position, fix: 'float', latitudeDeg: position.latitudeDeg + 1e-6 }];
    if (i % 7 === 2) return [{ ...position, crew: 'other' }];
    if (i % 6 === 1) return [{ ...position, satellites: 4 }];
    return [];
  });
  const all = [...positions, ...(worse ? variants : [])].map((position, i) => ({ ...position, row: i + 2 }));
  return { positions: all, known: control(places(marks), places([base]), 'tripod'), rows };
}

const placeless = ({ file: _, row: __, ...rest }: Occupation) => rest;
const comparable = ({ occupations, visits }: FormedOccupations): { o: unknown[]; v: readonly Visit[] } => ({
  o: occupations.map(placeless),
  v: visits,
});

describe('errors do not depend on where on its parallel the world lies', () => {
  it('turned about the axis of the earth', async () => {
    // Of rows that agree within 0.1 mm one is used, and rounding may choose another: none of these here.
    const { positions, known } = campaign(false);
    const errorsOf = async (turnDeg: number) => {
      const turned = <T extends Geodetic>(place: T): T => ({
        ...place,
        longitudeDeg: place.longitudeDeg + turnDeg,
      });
      const there: Control = {
        marks: new Map([...known.marks].map(([name, m]) => [name, mark(name, turned(m.position))])),
        bases: new Map([...known.bases].map(([name, b]) => [name, base(name, turned(b.position))])),
      };
      const { occupations } = await formOccupations(batches(positions.map(turned)), there, UTC);
      return computeErrors(occupations, there).errors;
    };
    const here = await errorsOf(0);
    expect(here.length).toBeGreaterThan(10);
    await fc.assert(
      fc.asyncProperty(fc.double({ min: -180, max: 180, noNaN: true }), async (turnDeg) => {
        const there = await errorsOf(turnDeg);
        expect(there).toHaveLength(here.length);
        there.forEach((error, i) => {
          const same = here[i]!;
          // Geocentric coordinates are good to about 1e-9 m, that is 1e-6 mm; over some epochs a little more.
          for (const key of ['east', 'north', 'up', 'along', 'across'] as const) {
            expect(Math.abs(error[key] - same[key])).toBeLessThan(1e-4);
          }
          expect(Math.abs(error.baselineKm - same.baselineKm)).toBeLessThan(1e-10);
          expect(Math.abs(error.azimuthDeg - same.azimuthDeg)).toBeLessThan(1e-8);
        });
      }),
      { seed: SEED, numRuns: 30 },
    );
  });
});

describe('along and across', () => {
  it('are east and north, turned', async () => {
    const known = control();
    const small = fc.double({ min: -5e-6, max: 5e-6, noNaN: true });
    await fc.assert(
      fc.asyncProperty(fc.constantFrom('CP1', 'CP2', 'CP3'), small, small, async (name, dLat, dLon) => {
        const { latitudeDeg, longitudeDeg } = MARKS[name]!;
        const moved = at(0, {
          mark: name,
          latitudeDeg: latitudeDeg + dLat,
          longitudeDeg: longitudeDeg + dLon,
        });
        const { occupations } = await formOccupations(batches([moved]), known);
        const [error] = computeErrors(occupations, known).errors;
        const { east, north, along, across } = error!;
        expect(along ** 2 + across ** 2).toBeCloseTo(east ** 2 + north ** 2, 6);
      }),
      { seed: SEED, numRuns: 100 },
    );
  });
});

describe('formOccupations', () => {
  const { positions, known } = campaign();

  it('does not depend on the order of rows', async () => {
    const whole = comparable(await formOccupations(batches(positions), known, UTC));
    expect(whole.o.length).toBeGreaterThan(10);
    expect(whole.v.length).toBeGreaterThan(whole.o.length);
    await fc.assert(
      fc.asyncProperty(
        fc.shuffledSubarray(positions, { minLength: positions.length }),
        async (shuffled: Position[]) => {
          const moved = shuffled.map((position, i) => ({ ...position, row: i + 2 }));
          expect(comparable(await formOccupations(batches(moved), known, UTC))).toEqual(whole);
        },
      ),
      { seed: SEED, numRuns: 30 },
    );
  });

  it('does not depend on the order of files, place and account of each row included', async () => {
    // The second file is a copy of the first: which of two equal rows is the duplicate must not depend on the order.
    const files = ['c.csv', 'a.csv', 'b.csv'].map((file, k) =>
      positions.filter((_, i) => (i % 3) % 2 === k % 2).map((position) => ({ ...position, file })),
    );
    const run = async (order: readonly number[]) => {
      const formed = await formOccupations(batches(...order.map((k) => files[k]!)), known, UTC);
      return {
        ...formed,
        files: [...formed.files].sort((a, b) => (a.file < b.file ? -1 : 1)),
      };
    };
    const whole = await run([0, 1, 2]);
    expect(whole.files.some(({ setAside }) => (setAside.duplicate?.count ?? 0) > 0)).toBe(true);
    expect(whole.files.some(({ setAside }) => (setAside.conflicting?.count ?? 0) > 0)).toBe(true);
    for (const order of [
      [0, 2, 1],
      [1, 0, 2],
      [1, 2, 0],
      [2, 0, 1],
      [2, 1, 0],
    ])
      expect(await run(order)).toEqual(whole);
  });

  it('does not depend on how a log is cut into files', async () => {
    const whole = comparable(await formOccupations(batches(positions), known, UTC));
    await fc.assert(
      fc.asyncProperty(fc.integer({ min: 1, max: 9 }), fc.integer(), async (pieces, salt) => {
        const files = Array.from({ length: pieces }, (_, k) =>
          positions
            .filter((_, i) => (((i * 7919 + salt) % pieces) + pieces) % pieces === k)
            .map((position) => ({ ...position, file: `${(k * 5) % 9}.csv` })),
        );
        expect(comparable(await formOccupations(batches(...files), known, UTC))).toEqual(whole);
      }),
      { seed: SEED, numRuns: 30 },
    );
  });

  it('does not depend on where the chunks of the file reader end', async () => {
    const { rows } = simulateLog({ ...CAMPAIGN, days: 20, occupationsPerDay: { from: 40, to: 60 } });
    const text = logText(rows);
    expect(text.length).toBeGreaterThan(300_000);
    const read = async (padding: number) => {
      // A comment in front moves every later byte, so that chunk ends fall anywhere in a row.
      const path = folder.write('padded.csv', `# ${'é'.repeat(padding)}\n${text}`);
      return formOccupations(readLogs([logFile(path, 'padded.csv')], { timeZone: null }), known, UTC);
    };
    const whole = await read(1);
    expect(whole.occupations.length).toBeGreaterThan(500);
    for (const padding of [2, 13, 30, 51, 77]) expect(await read(padding)).toEqual(whole);
  });

  it('refuses a gap that is no time', async () => {
    await expect(formOccupations(batches([at(0)]), control(), { gapSeconds: 0 })).rejects.toThrow(
      new RangeError('gapSeconds: expected a number above 0, received 0'),
    );
  });
});

describe('epochs that wait on disk', () => {
  const { positions, known } = campaign();
  const temporary = join(folder.path, 'tmp');
  const before = process.env.TMPDIR;

  beforeEach(() => {
    mkdirSync(temporary, { recursive: true });
    process.env.TMPDIR = temporary;
  });
  afterEach(() => {
    if (before === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = before;
  });

  it('come back the same, whatever fits into memory, and leave nothing behind', async () => {
    const whole = await formOccupations(batches(positions), known, UTC);
    for (const epochsInMemory of [0, 1, 2, 7, 50, 100]) {
      let onDisk = 0;
      const formed = await formOccupations(batches(positions), known, {
        ...UTC,
        epochsInMemory,
        onProgress: () => {
          onDisk = readdirSync(temporary).length;
        },
      });
      expect(onDisk).toBe(1);
      expect(formed).toEqual(whole);
      expect(readdirSync(temporary)).toEqual([]);
    }
  });

  it('leave nothing behind after an error either', async () => {
    async function* failing() {
      yield* batches(positions);
      expect(readdirSync(temporary)).toHaveLength(1);
      throw new Error('the disk was pulled out');
    }
    await expect(formOccupations(failing(), known, { ...UTC, epochsInMemory: 5 })).rejects.toThrow(
      'the disk was pulled out',
    );
    expect(existsSync(temporary) && readdirSync(temporary)).toEqual([]);
  });
});
