import type { Base, Control, Mark, PointCoordinates } from '../../src/control/index.js';
import type { Geodetic } from '../../src/geodesy/index.js';
import type { LogBatch, Position } from '../../src/logs/index.js';

/** A small invented world: two bases, three marks. */
export const MARKS: Readonly<Record<string, Geodetic>> = {
  CP1: { latitudeDeg: 47.01, longitudeDeg: 8.0, heightM: 500 },
  CP2: { latitudeDeg: 47.05, longitudeDeg: 8.1, heightM: 620 },
  CP3: { latitudeDeg: 46.9, longitudeDeg: 7.8, heightM: 450 },
};
export const BASES: Readonly<Record<string, Geodetic>> = {
  B1: { latitudeDeg: 47.0, longitudeDeg: 8.0, heightM: 510 },
  B2: { latitudeDeg: 46.95, longitudeDeg: 7.9, heightM: 480 },
};

/** Coordinates of which nothing else is stated. */
export const coordinatesAt = (
  position: Geodetic,
  change: Partial<PointCoordinates> = {},
): PointCoordinates => ({
  position,
  horizontalSigmaMm: Number.NaN,
  verticalSigmaMm: Number.NaN,
  source: '',
  frame: '',
  epoch: Number.NaN,
  from: '',
  to: '',
  ...change,
});

export function mark(name: string, position: Geodetic, ...later: readonly PointCoordinates[]): Mark {
  const versions = [coordinatesAt(position), ...later];
  return { ...versions.at(-1)!, name, versions, sky: '' };
}

export function base(name: string, position: Geodetic, mounting: Base['mounting'] = 'pillar'): Base {
  const versions = [coordinatesAt(position)];
  return { ...versions[0]!, name, versions, mounting };
}

export function control(
  marks: Readonly<Record<string, Geodetic>> = MARKS,
  bases: Readonly<Record<string, Geodetic>> = { B1: BASES.B1! },
  mounting: Base['mounting'] = 'pillar',
): Control {
  return {
    marks: new Map(Object.entries(marks).map(([name, position]) => [name, mark(name, position)])),
    bases: new Map(Object.entries(bases).map(([name, position]) => [name, base(name, position, mounting)])),
  };
}

/** 2025-03-04T09:00:00Z */
export const START_MS = Date.UTC(2025, 2, 4, 9);

let nextRow = 2;

/** A fixed position on CP1, `second` seconds after the start, with what is said otherwise. */
export function at(second: number, change: Partial<Position> = {}): Position {
  const where = MARKS[change.mark ?? 'CP1'] ?? MARKS.CP1!;
  return {
    file: 'a.csv',
    row: nextRow++,
    utcMs: START_MS + 1000 * second,
    dateOnly: '',
    mark: 'CP1',
    pointNumber: '',
    description: '',
    base: 'B1',
    setup: '',
    rover: 'R1',
    crew: '',
    fix: 'fixed',
    epochs: 1,
    ...where,
    satellites: Number.NaN,
    pdop: Number.NaN,
    ageSeconds: Number.NaN,
    horizontalSigmaM: Number.NaN,
    verticalSigmaM: Number.NaN,
    extras: null,
    ...change,
  };
}

/** The positions as batches of one file each, in the order given. */
export async function* batches(...files: readonly (readonly Position[])[]): AsyncGenerator<LogBatch> {
  for (const positions of files) {
    const file = positions[0]?.file ?? 'empty.csv';
    yield { file, rowsRead: positions.length, positions, setAside: [], messages: [] };
  }
}
