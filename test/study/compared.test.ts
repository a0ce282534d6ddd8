import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { stringify } from 'yaml';
import type { OccupationError } from '../../src/errors/index.js';
import { type Geodetic, geocentricToGeodetic, localFrame } from '../../src/geodesy/index.js';
import { readStudy, readStudyErrors } from '../../src/study/index.js';
import { testFolder } from '../files.js';
import { BASE, MARK_PLACES } from './spoiledStudy.js';
import { geoidGridText, WRITINGS, type Writing } from './writings.js';

/*
 * However marks, bases and logs are written, the errors are the same once the study file says how.
 */

const folder = testFolder();
folder.write('geoid.asc', geoidGridText());

const near = (place: Geodetic, eastM: number, northM: number, upM: number): Geodetic =>
  geocentricToGeodetic(localFrame(place).toGeocentric({ eastM, northM, upM }));

/** Two shots at each mark, some millimetres off. */
const SHOTS = [...MARK_PLACES].flatMap(([mark, place], k) =>
  [1, -1].map((sign, shot) => ({
    time: new Date(Date.UTC(2025, 3, 1, 8, 20 * k + 10 * shot)).toISOString(),
    mark,
    place: near(place, 0.01 * sign * (k + 1), -0.004 * k, 0.006 * sign * k),
  })),
);

interface Ways {
  readonly marks: Writing;
  readonly bases: Writing;
  readonly logs: Writing;
}

const csv = (lines: readonly (readonly string[])[]): string =>
  lines.map((cells) => cells.join(',')).join('\n');

async function errorsOf({ marks, bases, logs }: Ways): Promise<readonly OccupationError[]> {
  folder.write(
    'marks.csv',
    csv([
      ['mark', ...marks.columns],
      ...[...MARK_PLACES].map(([name, place]) => [name, ...marks.cells(place)]),
    ]),
  );
  folder.write(
    'bases.csv',
    csv([
      ['base', ...bases.columns],
      ['B1', ...bases.cells(BASE)],
    ]),
  );
  folder.write(
    'log.csv',
    csv([
      ['time', 'mark', 'fix', ...logs.columns],
      ...SHOTS.map(({ time, mark, place }) => [time, mark, 'fixed', ...logs.cells(place)]),
    ]),
  );
  const path = folder.write(
    'study.yaml',
    stringify({
      timeZone: 'UTC',
      marks: { file: 'marks.csv', ...marks.keys, ...marks.layout },
      bases: { file: 'bases.csv', ...bases.keys, ...bases.layout },
      logs: [{ files: 'log.csv', ...logs.keys, layout: { kind: 'delimited', ...logs.layout } }],
    }),
  );
  return (await readStudyErrors(await readStudy(path))).errors;
}

const plain = WRITINGS.degrees!;
let expected: readonly OccupationError[];

beforeAll(async () => {
  expected = await errorsOf({ marks: plain, bases: plain, logs: plain });
});

function expectSame(errors: readonly OccupationError[]): void {
  expect(errors).toHaveLength(SHOTS.length);
  errors.forEach((error, k) => {
    const same = expected[k]!;
    for (const component of ['east', 'north', 'up'] as const) {
      expect(Math.abs(error[component] - same[component])).toBeLessThan(0.01);
    }
    // Heights above the geoid make lengths shorter by separation / radius of the earth: 7 ppm.
    expect(Math.abs(error.baselineKm / same.baselineKm - 1)).toBeLessThan(8e-6);
  });
}

const isFrame = ({ keys }: Writing): boolean => 'transformation' in keys;
const isOrthometric = ({ keys }: Writing): boolean => 'heights' in keys;

describe('errors do not depend on how coordinates are written', () => {
  it('are those that were put in', () => {
    expect(expected).toHaveLength(SHOTS.length);
    expect(expected[0]!.east).toBeCloseTo(10, 3);
    expect(expected[3]!.north).toBeCloseTo(-4, 3);
  });

  it.each(Object.keys(WRITINGS))('logs: %s', async (name) => {
    expectSame(await errorsOf({ marks: plain, bases: plain, logs: WRITINGS[name]! }));
  });

  it.each(Object.keys(WRITINGS).filter((name) => !isOrthometric(WRITINGS[name]!)))(
    'marks and base: %s',
    async (name) => {
      expectSame(await errorsOf({ marks: WRITINGS[name]!, bases: WRITINGS[name]!, logs: plain }));
    },
  );

  it('in any mixture', async () => {
    const way = fc.constantFrom(...Object.keys(WRITINGS));
    await fc.assert(
      fc.asyncProperty(way, way, way, async (m, b, l) => {
        const [marks, bases, logs] = [WRITINGS[m]!, WRITINGS[b]!, WRITINGS[l]!];
        const ways = [marks, bases, logs];
        const heights = ways.map(({ keys }) => JSON.stringify(keys.heights ?? null));
        // Orthometric heights are not moved between frames, a constant is no grid, and a column must be everywhere.
        if (isOrthometric(marks) && ways.some(isFrame)) return;
        if (
          isOrthometric(marks) &&
          new Set(heights).size > 1 &&
          heights.some((one) => one.includes('constant'))
        )
          return;
        if (heights[0]!.includes('column') && ways.some((one) => !isOrthometric(one))) return;
        expectSame(await errorsOf({ marks, bases, logs }));
      }),
      { seed: 4, numRuns: 60 },
    );
  });
});
