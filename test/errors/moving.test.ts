import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FormOccupationsOptions, formOccupations } from '../../src/errors/index.js';
import { geocentricToGeodetic, geodeticToGeocentric, localFrame } from '../../src/geodesy/index.js';
import type { LogBatch, Position } from '../../src/logs/index.js';
import { normalDeviates, type Random, randomStream } from '../../src/stats/index.js';
import { at, control, MARKS, START_MS } from './world.js';

/*
 * Logs of a rover that does not stop recording. What a receiver shows of a rod that stands still is common practice:
 * RTK positions scatter by 8 to 15 mm per axis from epoch to epoch.
 */

const SEED = 1606;
const known = control();
const frame = localFrame(MARKS.CP1!);

/** Where a rover is, metres east and north of CP1, at a time in seconds. */
type Path = (second: number) => { eastM: number; northM: number };

interface Recording {
  readonly hz: number;
  readonly seconds: number;
  /** Per axis, mm. */
  readonly scatterMm?: number;
  readonly random?: Random;
  readonly change?: (second: number) => Partial<Position>;
}

function record(path: Path, { hz, seconds, scatterMm = 0, random, change }: Recording): Position[] {
  const normal = normalDeviates(random ?? randomStream(SEED));
  const off = () => (scatterMm / 1000) * normal();
  return Array.from({ length: Math.round(seconds * hz) + 1 }, (_, k) => {
    const second = k / hz;
    const { eastM, northM } = path(second);
    const place = frame.toGeocentric({ eastM: eastM + off(), northM: northM + off(), upM: 2 * off() });
    // Milliseconds are whole in logs.
    return at(0, {
      ...geocentricToGeodetic(place),
      utcMs: START_MS + Math.round(1000 * second),
      row: k + 2,
      ...change?.(second),
    });
  });
}

async function form(
  positions: readonly Position[],
  { nearestMarkM = null, ...options }: FormOccupationsOptions & { nearestMarkM?: number | null } = {},
) {
  async function* batches(): AsyncGenerator<LogBatch> {
    // In pieces, as a long log comes.
    for (let from = 0; from < positions.length; from += 7) {
      const piece = positions.slice(from, from + 7);
      yield {
        file: 'a.csv',
        rowsRead: piece.length,
        positions: piece,
        setAside: [],
        messages: [],
        nearestMarkM,
      };
    }
  }
  const formed = await formOccupations(batches(), known, options);
  const [{ read, used, setAside }] = formed.files as [(typeof formed.files)[number]];
  const moving = setAside.moving?.count ?? 0;
  return { ...formed, read, used, moving };
}

const nameless = () => ({ mark: '' });
const walk =
  (metresPerSecond: number, passM: number, startM: number): Path =>
  (second) => ({ eastM: startM + metresPerSecond * second, northM: passM });

describe('a rover that goes past a mark', () => {
  const cases = [1, 10].flatMap((speed) => [1, 5].map((hz) => [speed, hz] as const));

  it.each(cases)('at %d m/s and %d Hz does not visit it, found by nearness', async (speed, hz) => {
    const random = randomStream(SEED, `${speed} ${hz}`);
    for (const scatterMm of [0, 8, 15]) {
      for (const passM of [0, 0.5, 2.5, 2.99]) {
        // Anywhere between two epochs the rover may be nearest to the mark.
        for (const startM of [-40, -40.3, -41.7]) {
          const positions = record(walk(speed, passM, startM), {
            hz,
            seconds: 80 / speed,
            scatterMm,
            random,
            change: nameless,
          });
          const { occupations, visits, read, used } = await form(positions, { nearestMarkM: 3 });
          expect([occupations, visits, used]).toEqual([[], [], 0]);
          expect(read).toBe(positions.length);
        }
      }
    }
  });

  it.each(cases)('at %d m/s and %d Hz does not visit it, named all along', async (speed, hz) => {
    for (const scatterMm of [0, 8, 15]) {
      const positions = record(walk(speed, 0.3, -20), { hz, seconds: 40 / speed, scatterMm });
      const { occupations, visits, used, moving } = await form(positions);
      expect([occupations, visits, used, moving]).toEqual([[], [], 0, positions.length]);
    }
  });

  it('does not visit it without a fix either, found by nearness', async () => {
    const float = () => ({ mark: '', fix: 'float' as const });
    for (const hz of [1, 5]) {
      const positions = record(walk(1, 0.5, -20), { hz, seconds: 40, scatterMm: 15, change: float });
      expect((await form(positions, { nearestMarkM: 3 })).visits).toEqual([]);
      const standing = record(() => ({ eastM: 0.2, northM: 0.1 }), {
        hz,
        seconds: 40,
        scatterMm: 15,
        change: float,
      });
      const { visits } = await form(standing, { nearestMarkM: 3 });
      expect(visits.map(({ fixedRows }) => fixedRows)).toEqual([0]);
    }
  });

  it('and turns back there does not visit it', async () => {
    for (const hz of [1, 2, 5]) {
      const turn: Path = (second) => ({ eastM: Math.abs(second - 15), northM: 0.2 });
      const { occupations, visits } = await form(record(turn, { hz, seconds: 30, scatterMm: 8 }));
      expect([occupations, visits]).toEqual([[], []]);
    }
  });
});

describe('a rover that stands', () => {
  const standing: Path = () => ({ eastM: 0.004, northM: -0.007 });

  it('is never moving, however its positions scatter', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(1, 5, 10),
        fc.double({ min: 8, max: 15, noNaN: true }),
        fc.integer(),
        fc.constantFrom(null, 3),
        async (hz, scatterMm, seed, nearestMarkM) => {
          const positions = record(standing, { hz, seconds: 60, scatterMm, random: randomStream(seed) });
          const { occupations, moving, used } = await form(positions, { nearestMarkM });
          expect([occupations.length, moving, used]).toEqual([1, 0, positions.length]);
        },
      ),
      { seed: SEED, numRuns: 300 },
    );
  });

  it('is not moving where a wrong fix of 0.5 m jumps, for good or there and back', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(1, 5, 10),
        fc.double({ min: 0, max: 15, noNaN: true }),
        fc.integer(),
        fc.double({ min: 3, max: 40, noNaN: true }),
        fc.constantFrom(0.5, 1, 3, 8, 100),
        fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
        async (hz, scatterMm, seed, jumpAt, lasts, direction) => {
          const path: Path = (second) => {
            const metres = second >= jumpAt && second < jumpAt + lasts ? 0.5 : 0;
            return { eastM: metres * Math.cos(direction), northM: metres * Math.sin(direction) };
          };
          const positions = record(path, { hz, seconds: 60, scatterMm, random: randomStream(seed) });
          const { occupations, moving } = await form(positions);
          expect([occupations.length, moving]).toEqual([1, 0]);
        },
      ),
      { seed: SEED, numRuns: 300 },
    );
  });

  it('keeps its stand when it comes walking and goes walking', async () => {
    // Comes from 20 m west at 1 m/s, stands 60 s, goes on to the north.
    const stay: Path = (second) =>
      second < 20 ? { eastM: second - 20, northM: 0 } : { eastM: 0, northM: Math.max(0, second - 80) };
    for (const hz of [1, 5, 10]) {
      for (const scatterMm of [0, 8, 15]) {
        for (const nearestMarkM of [null, 3]) {
          const change = nearestMarkM === null ? () => ({}) : nameless;
          const positions = record(stay, { hz, seconds: 100, scatterMm, change });
          const { occupations, visits } = await form(positions, { nearestMarkM });
          expect([occupations.length, visits.length]).toEqual([1, 1]);
          const [{ startMs, endMs, epochs, position }] = occupations as [(typeof occupations)[number]];
          // The stand from 20 s to 80 s, up to a second at its ends; nothing of the way.
          expect(Math.abs(startMs - START_MS - 20_000)).toBeLessThanOrEqual(1000);
          expect(Math.abs(endMs - START_MS - 80_000)).toBeLessThanOrEqual(1000);
          expect(epochs).toBeGreaterThanOrEqual(60 * hz - hz);
          const { eastM, northM } = frame.toLocal(geodeticToGeocentric(position));
          // 15 mm over 61 epochs leave 2 mm, five times of it 10 mm.
          expect(Math.hypot(eastM, northM)).toBeLessThan(0.01);
        }
      }
    }
  });

  it('for a single epoch is a visit, as a shot of a controller that stores no more', async () => {
    for (const nearestMarkM of [null, 3]) {
      const shots = [0, 30, 300].map((second) => at(second, { mark: nearestMarkM === null ? 'CP1' : '' }));
      const { occupations, moving } = await form(shots, { nearestMarkM, gapSeconds: 10 });
      expect([occupations.length, moving]).toEqual([3, 0]);
    }
  });

  it('an hour long is one occupation, or shots of the length that is asked for', async () => {
    const hour = record(standing, { hz: 1, seconds: 3599, scatterMm: 8 });
    expect((await form(hour)).occupations.map(({ epochs }) => epochs)).toEqual([3600]);
    const cut = await form(hour, { windowSeconds: 300 });
    expect(cut.occupations.map(({ epochs }) => epochs)).toEqual(new Array(12).fill(300));
    expect(cut.occupations.map(({ startMs }) => (startMs - START_MS) / 1000)).toEqual(
      Array.from({ length: 12 }, (_, k) => 300 * k),
    );
    expect(cut.visits).toHaveLength(1);
    // 3600 = 3 · 1000 + 600: what is left over is a shorter shot.
    const uneven = await form(hour, { windowSeconds: 1000 });
    expect(uneven.occupations.map(({ epochs }) => epochs)).toEqual([1000, 1000, 1000, 600]);
    expect((await form(hour, { windowSeconds: null })).occupations).toHaveLength(1);
  });
});
