import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { geocentricToGeodetic, localFrame } from '../../src/geodesy/index.js';
import { type FieldTestShot, findFieldTests, isoFieldTest } from '../../src/rule/index.js';

const origin = { latitudeDeg: 44.3, longitudeDeg: -18.4, heightM: 120 };
const away = (eastM: number, northM: number, upM: number) =>
  geocentricToGeodetic(localFrame(origin).toGeocentric({ eastM, northM, upM }));
const places = new Map([
  ['A', origin],
  ['B', away(6, 8, 0.5)],
  ['FAR', away(300, 0, 0)],
]);
const placeOf = (mark: string) => places.get(mark) ?? null;

const MINUTE = 60_000;
const shot = (mark: string, minutes: number, more: Partial<FieldTestShot> = {}): FieldTestShot => ({
  day: '2025-03-14',
  mark,
  base: 'P',
  rover: 'R1',
  startMs: minutes * MINUTE,
  baselineKm: 0.4,
  east: 0,
  north: 0,
  up: 0,
  ...more,
});
/** Five sets, five minutes apart. */
const series = (startMinutes: number, sets = 5, more: Partial<FieldTestShot> = {}): FieldTestShot[] =>
  Array.from({ length: sets }, (_, k) => [
    shot('A', startMinutes + 5 * k, more),
    shot('B', startMinutes + 5 * k + 2, more),
  ]).flat();

describe('a field test among check shots', () => {
  it('is recognised by its shape, with the distance of the marks', () => {
    const { tests, incomplete } = findFieldTests(series(0), placeOf);
    expect(incomplete).toEqual([]);
    expect(tests).toHaveLength(1);
    const [only] = tests[0]!.series;
    expect(only).toMatchObject({ marks: ['A', 'B'], rover: 'R1', base: 'P', day: '2025-03-14' });
    // 6, 8, 10: the horizontal distance is that of the plan.
    expect(only!.distanceM).toBeCloseTo(10, 4);
    expect(only!.heightDifferenceM).toBeCloseTo(0.5, 4);
  });
  it('carries the errors of the shots into the sets, as the standard counts them', () => {
    const shots = series(0).map((each, k) => (k === 3 ? { ...each, east: 6, north: 8, up: 20 } : each));
    const [test] = findFieldTests(shots, placeOf).tests;
    const { sets } = isoFieldTest(test!.sets, {
      distanceM: 10,
      heightDifferenceM: 0.5,
      predeterminedMm: { plan: 15, height: 25 },
    });
    // The second point of the second set moved by 10 mm along the line, and by 20 mm in height.
    expect(sets[1]!.distanceErrorMm).toBeCloseTo(10, 1);
    expect(sets[1]!.heightErrorMm).toBeCloseTo(20, 1);
    expect(sets[0]!.distanceErrorMm).toBeCloseTo(0, 1);
  });
  it('is full with three series 90 minutes apart, and else simplified ones', () => {
    const full = findFieldTests(
      [0, 120, 240].flatMap((at) => series(at)),
      placeOf,
    ).tests;
    expect(full.map(({ sets }) => sets.map(({ series: k }) => k))).toEqual([
      [1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 3, 3, 3, 3, 3],
    ]);
    const near = findFieldTests(
      [0, 60, 120].flatMap((at) => series(at)),
      placeOf,
    ).tests;
    expect(near.map(({ sets }) => sets.length)).toEqual([5, 5, 5]);
    const rovers = [0, 120, 240].flatMap((at, k) => series(at, 5, { rover: `R${k}` }));
    expect(findFieldTests(rovers, placeOf).tests).toHaveLength(3);
  });
  it('is not made of ordinary check shots', () => {
    const ordinary = Array.from({ length: 20 }, (_, day) => [
      shot('A', day * 1440, { day: `2025-04-${10 + day}` }),
      shot('B', day * 1440 + 3, { day: `2025-04-${10 + day}` }),
      shot('FAR', day * 1440 + 9, { day: `2025-04-${10 + day}` }),
    ]).flat();
    expect(findFieldTests(ordinary, placeOf)).toEqual({ tests: [], incomplete: [] });
    const far = series(0).map((each) => ({ ...each, mark: each.mark === 'B' ? 'FAR' : each.mark }));
    expect(findFieldTests(far, placeOf).tests).toEqual([]);
    expect(
      findFieldTests(
        series(0).map((each) => ({ ...each, up: Number.NaN })),
        placeOf,
      ).tests,
    ).toEqual([]);
  });
  it('that misses sets is told, and one that is named may be in any order and at any distance', () => {
    const { tests, incomplete } = findFieldTests(series(0, 4), placeOf);
    expect(tests).toEqual([]);
    expect(incomplete.map(({ sets }) => sets.length)).toEqual([4]);
    const shots = [
      shot('A', -3),
      ...series(0).map((each) => ({ ...each, mark: each.mark === 'A' ? 'FAR' : 'A' })),
    ];
    const named = { marks: ['FAR', 'A'] as const, day: '2025-03-14' };
    const [found] = findFieldTests(shots, placeOf, named).tests;
    expect(found!.series[0]).toMatchObject({ marks: ['FAR', 'A'] });
    expect(found!.series[0]!.distanceM).toBeCloseTo(300, 3);
    expect(findFieldTests(shots, placeOf, { ...named, day: '2025-03-15' }).tests).toEqual([]);
  });
  it('rebuilds the points from the coordinates of their own day', () => {
    // B was set anew on the 15th, 2 m farther: each day is judged by its own place.
    const moved = (mark: string, day: string) =>
      mark === 'B' && day > '2025-03-14' ? away(7.2, 9.6, 0.5) : placeOf(mark);
    const later = series(24 * 60, 5, { day: '2025-03-15' });
    const { tests } = findFieldTests([...series(0), ...later], moved);
    expect(tests.map(({ series: [only] }) => Number(only!.distanceM.toFixed(3)))).toEqual([10, 12]);
    for (const { sets } of tests) {
      expect(sets[0]!.second.x ** 2 + sets[0]!.second.y ** 2).toBeCloseTo(
        sets === tests[0]!.sets ? 100 : 144,
        3,
      );
    }
  });
  it('does not depend on the order of the shots', () => {
    const shots = ['R1', 'R2'].flatMap((rover) => [0, 120, 240].flatMap((at) => series(at, 5, { rover })));
    const expected = JSON.stringify(findFieldTests(shots, placeOf));
    fc.assert(
      fc.property(fc.shuffledSubarray(shots, { minLength: shots.length }), (shuffled) => {
        expect(JSON.stringify(findFieldTests(shuffled, placeOf))).toBe(expected);
      }),
      { seed: 4, numRuns: 20 },
    );
  });
});
