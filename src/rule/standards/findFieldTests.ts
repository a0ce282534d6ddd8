import { type Geodetic, geodeticToGeocentric, localFrame } from '../../geodesy/index.js';
import type { FieldPoint, FieldTestSet } from './iso17123.js';

/** What is needed of an occupation to look for field tests. */
export interface FieldTestShot {
  readonly day: string;
  readonly mark: string;
  readonly base: string;
  readonly rover: string;
  readonly startMs: number;
  readonly baselineKm: number;
  /** Errors, mm. */
  readonly east: number;
  readonly north: number;
  readonly up: number;
}

/** A series of sets on two rover points by one rover from one base. */
export interface FieldSeries {
  readonly marks: readonly [first: string, second: string];
  readonly rover: string;
  readonly base: string;
  readonly day: string;
  readonly startMs: number;
  readonly baselineKm: number;
  /** From the coordinates of the marks, m. */
  readonly distanceM: number;
  readonly heightDifferenceM: number;
  readonly sets: readonly FieldTestSet[];
}

/** Series that make one test: three of five sets, or one. */
export interface FoundFieldTest {
  readonly series: readonly FieldSeries[];
  readonly sets: readonly FieldTestSet[];
}

export interface FoundFieldTests {
  readonly tests: readonly FoundFieldTest[];
  /** Series of fewer than five sets. */
  readonly incomplete: readonly FieldSeries[];
}

const [NEAREST_M, FARTHEST_M] = [2, 20];
const SETS_OF_SERIES = 5;
const SERIES_OF_TEST = 3;
const MINUTE = 60_000;
/** The standard has sets about five minutes apart; so much longer one may have waited for a fix. */
const LONGEST_SET_MS = 10 * MINUTE;
const LONGEST_PAUSE_MS = 20 * MINUTE;
const SERIES_APART_MS = 90 * MINUTE;
/** Series farther apart than this belong to two tests. */
const LONGEST_TEST_MS = 7 * 24 * 60 * MINUTE;

/** Coordinates of a mark on a day; null where they are not known in full. */
export type PlaceOfMark = (mark: string, day: string) => Geodetic | null;

/**
 * Looks among check shots for field tests after ISO 17123-8 (procedure from memory): two marks 2 to 20 m apart, measured
 * one after the other five times in a row. Fewer than two sets in a row are no series.
 * @param wanted only this pair, in this order, from this day on
 * @returns tests and series in the order of time
 */
export function findFieldTests(
  shots: readonly FieldTestShot[],
  placeOf: PlaceOfMark,
  wanted?: { readonly marks: readonly [string, string]; readonly day: string } | undefined,
): FoundFieldTests {
  const known = shots.filter(
    ({ startMs, east, north, up, day }) =>
      !Number.isNaN(startMs + east + north + up) && day >= (wanted?.day ?? ''),
  );
  const series = pairsOf(known, placeOf, wanted?.marks)
    .flatMap((pair) =>
      groups(known.filter(({ mark }) => pair.marks.includes(mark))).flatMap((own) =>
        seriesOf(own, pair, wanted !== undefined),
      ),
    )
    .sort(inTime);
  return {
    tests: testsOf(series.filter(({ sets }) => sets.length === SETS_OF_SERIES)),
    incomplete: series.filter(({ sets }) => sets.length < SETS_OF_SERIES),
  };
}

/** Two rovers may begin at once: then by their names. */
function inTime(a: FieldSeries, b: FieldSeries): number {
  const names = ({ marks, rover, base }: FieldSeries): string => JSON.stringify([marks, rover, base]);
  return a.startMs - b.startMs || (names(a) < names(b) ? -1 : 1);
}

interface Pair {
  readonly marks: readonly [string, string];
  /** Both points on a day, the first at the origin; null where they are unknown or no rover points. */
  readonly placesOn: (day: string) => ReadonlyMap<string, FieldPoint> | null;
}

/** Pairs of marks as near to each other as rover points are; a pair that is named may be at any distance. */
function pairsOf(
  shots: readonly FieldTestShot[],
  placeOf: PlaceOfMark,
  wanted: readonly [string, string] | undefined,
): Pair[] {
  const days = new Map<string, Set<string>>();
  for (const { mark, day } of shots) days.set(mark, (days.get(mark) ?? new Set()).add(day));
  const marks = [...days.keys()].sort();
  const candidates =
    wanted === undefined
      ? marks.flatMap((first, k) => marks.slice(k + 1).map((second) => [first, second] as const))
      : [wanted];
  return candidates
    .map(
      (pair): Pair => ({
        marks: [pair[0], pair[1]],
        placesOn: placesOf(pair, placeOf, wanted !== undefined),
      }),
    )
    .filter(({ marks: [first, second], placesOn }) =>
      [...(days.get(first) ?? [])].some((day) => days.get(second)?.has(day) && placesOn(day) !== null),
    );
}

/** Marks have other coordinates on some days; most days have the same. */
function placesOf(
  [first, second]: readonly [string, string],
  placeOf: PlaceOfMark,
  anyDistance: boolean,
): Pair['placesOn'] {
  return (day) => {
    const [from, to] = [placeOf(first, day), placeOf(second, day)];
    if (from === null || to === null) return null;
    const { eastM, northM } = localFrame(from).toLocal(geodeticToGeocentric(to));
    const apartM = Math.hypot(eastM, northM);
    if (!anyDistance && (apartM < NEAREST_M || apartM > FARTHEST_M)) return null;
    return new Map([
      [first, { x: 0, y: 0, h: 0 }],
      [second, { x: eastM, y: northM, h: to.heightM - from.heightM }],
    ]);
  };
}

/** The shots of each rover and base in the order of time. */
function groups(shots: readonly FieldTestShot[]): FieldTestShot[][] {
  const found = new Map<string, FieldTestShot[]>();
  for (const shot of shots) {
    const key = JSON.stringify([shot.rover, shot.base]);
    found.set(key, [...(found.get(key) ?? []), shot]);
  }
  return [...found.values()].map((own) =>
    own.sort((a, b) => a.startMs - b.startMs || (a.mark < b.mark ? -1 : 1)),
  );
}

function seriesOf(
  shots: readonly FieldTestShot[],
  { marks, placesOn }: Pair,
  ordered: boolean,
): FieldSeries[] {
  const found: FieldSeries[] = [];
  let sets: [FieldTestShot, FieldTestShot][] = [];
  const close = (): void => {
    // Further sets of a row are a series of their own.
    for (let k = 0; k < sets.length; k += SETS_OF_SERIES) {
      const part = sets.slice(k, k + SETS_OF_SERIES);
      const places = placesOn(part[0]![0].day);
      if (part.length > 1 && places !== null) found.push(seriesFrom(part, places));
    }
    sets = [];
  };
  for (let k = 0; k + 1 < shots.length; k++) {
    const [first, second] = [shots[k]!, shots[k + 1]!];
    const last = sets.at(-1);
    if (last !== undefined && first.startMs - last[0].startMs > LONGEST_PAUSE_MS) close();
    const order = sets[0]?.[0].mark ?? (ordered ? marks[0] : first.mark);
    const isSet =
      first.mark === order && second.mark !== order && second.startMs - first.startMs <= LONGEST_SET_MS;
    if (!isSet) continue;
    sets.push([first, second]);
    k += 1;
  }
  close();
  return found;
}

function seriesFrom(
  pairs: readonly (readonly [FieldTestShot, FieldTestShot])[],
  places: ReadonlyMap<string, FieldPoint>,
): FieldSeries {
  const measured = ({ mark, east, north, up }: FieldTestShot): FieldPoint => {
    const { x, y, h } = places.get(mark)!;
    return { x: x + east / 1000, y: y + north / 1000, h: h + up / 1000 };
  };
  const [first, second] = pairs[0]!;
  const [from, to] = [places.get(first.mark)!, places.get(second.mark)!];
  return {
    marks: [first.mark, second.mark],
    rover: first.rover,
    base: first.base,
    day: first.day,
    startMs: first.startMs,
    baselineKm: first.baselineKm,
    distanceM: Math.hypot(to.x - from.x, to.y - from.y),
    heightDifferenceM: to.h - from.h,
    sets: pairs.map(([a, b]) => ({ series: 1, startMs: a.startMs, first: measured(a), second: measured(b) })),
  };
}

/** Three series in a row of one pair, rover and base are a full test; what is left are simplified ones. */
function testsOf(series: readonly FieldSeries[]): FoundFieldTest[] {
  const tests: FoundFieldTest[] = [];
  const left = [...series];
  while (left.length > 0) {
    const first = left.shift()!;
    const chosen = [first];
    for (const next of left) {
      const last = chosen.at(-1)!;
      const same =
        JSON.stringify([next.marks, next.rover, next.base]) ===
        JSON.stringify([first.marks, first.rover, first.base]);
      const inTime =
        next.startMs - last.startMs >= SERIES_APART_MS && next.startMs - first.startMs <= LONGEST_TEST_MS;
      if (same && inTime && chosen.length < SERIES_OF_TEST) chosen.push(next);
    }
    const whole = chosen.length === SERIES_OF_TEST ? chosen : [first];
    for (const used of whole.slice(1)) left.splice(left.indexOf(used), 1);
    tests.push({
      series: whole,
      sets: whole.flatMap(({ sets }, k) => sets.map((set) => ({ ...set, series: k + 1 }))),
    });
  }
  return tests;
}
