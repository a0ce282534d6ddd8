import { epochAt, IonexFault, numberAt } from './fault.js';
import type { IonexHeader } from './header.js';
import type { LineCursor } from './lineCursor.js';

export type MapKind = 'TEC' | 'RMS' | 'HEIGHT';

/** One map as it stands in the file. */
export interface MapBlock {
  readonly kind: MapKind;
  readonly epochMs: number;
  /** Line on which it begins. */
  readonly line: number;
  /** TECU, or km for a map of heights; NaN where there is none. */
  readonly values: Float64Array;
  /** Power of ten in force at its end. */
  readonly exponent: number;
  /** Whether the map states an exponent itself. */
  readonly statesExponent: boolean;
  readonly missing: number;
}

const VALUES_PER_LINE = 16;
const WIDTH = 5;
const NONE = 9999;

/**
 * Reads one map, with the cursor on its START line, and leaves it on its END line.
 * @param exponent in force before the map
 * @throws IonexFault
 */
export function readMapBlock(
  cursor: LineCursor,
  kind: MapKind,
  header: IonexHeader,
  exponent: number,
): MapBlock {
  const { latitudesDeg, longitudesDeg } = header;
  const width = longitudesDeg.length;
  const values = new Float64Array(latitudesDeg.length * width).fill(Number.NaN);
  const seen = new Uint8Array(latitudesDeg.length);
  const line = cursor.line;
  const endLabel = `END OF ${kind} MAP`;
  let epochMs: number | null = null;
  let power = exponent;
  let statesExponent = false;
  for (;;) {
    if (!cursor.next()) throw truncated(cursor, endLabel);
    const label = cursor.label();
    if (label === endLabel) break;
    if (label === 'EPOCH OF CURRENT MAP') epochMs = epochAt(cursor);
    else if (label === 'EXPONENT') {
      power = numberAt(cursor, 0, 6, 'a whole number');
      statesExponent = true;
    } else if (label === 'LAT/LON1/LON2/DLON/H') {
      const latitude = latitudeOf(cursor, header);
      seen[latitude] = 1;
      readRow(cursor, values, latitude * width, width, power);
    } else if (label !== 'COMMENT') throw unexpected(cursor, endLabel);
  }
  if (epochMs === null)
    throw new IonexFault('map-row-unreadable', line, 'The epoch of the map is missing. Get the file again.');
  const absent = seen.indexOf(0);
  if (absent >= 0)
    throw new IonexFault(
      'map-row-unreadable',
      line,
      `Expected a row for each of the ${seen.length} latitudes in the map, came none for ${latitudesDeg[absent]} degrees. Get the file again.`,
    );
  let missing = 0;
  for (let i = 0; i < values.length; i++) if (Number.isNaN(values[i]!)) missing += 1;
  return { kind, epochMs, line, values, exponent: power, statesExponent, missing };
}

/** Index of the latitude that a row of values is for; it must be of the grid that the header announced. */
function latitudeOf(cursor: LineCursor, { latitudesDeg, longitudesDeg }: IonexHeader): number {
  const [latitude, lon1, lon2, step] = [2, 8, 14, 20].map((at) =>
    numberAt(cursor, at, at + 6, 'a number of the grid'),
  ) as [number, number, number, number];
  const index = Math.round((latitude - latitudesDeg[0]!) / (latitudesDeg[1]! - latitudesDeg[0]!));
  const near = (a: number | undefined, b: number): boolean => a !== undefined && Math.abs(a - b) < 0.05;
  const same =
    near(latitudesDeg[index], latitude) &&
    near(longitudesDeg[0], lon1) &&
    near(longitudesDeg.at(-1), lon2) &&
    near(longitudesDeg[1]! - longitudesDeg[0]!, step);
  if (same) return index;
  throw new IonexFault(
    'map-row-unreadable',
    cursor.line,
    `Expected a row of the grid in the header, came latitude ${latitude}, longitudes ${lon1} to ${lon2} by ${step}. Get the file again.`,
  );
}

/** Reads the values of one latitude from their fixed columns; neighbours may touch. This is the hot loop. */
function readRow(cursor: LineCursor, values: Float64Array, at: number, width: number, power: number): void {
  // a whole number over a power of ten is rounded once, a product with 0.1 twice
  const [factor, divisor] = power >= 0 ? [10 ** power, 1] : [1, 10 ** -power];
  const { text } = cursor;
  for (let first = 0; first < width; first += VALUES_PER_LINE) {
    if (!cursor.next()) throw truncated(cursor, 'values');
    const count = Math.min(VALUES_PER_LINE, width - first);
    for (let k = 0; k < count; k++) {
      const from = cursor.start + k * WIDTH;
      const to = from + WIDTH;
      let value = 0;
      let sign = 1;
      let digits = 0;
      for (let i = from; i < to && i < cursor.end; i++) {
        const code = text.charCodeAt(i) - 48;
        if (code >= 0 && code <= 9) {
          value = 10 * value + code;
          digits += 1;
        } else if (digits === 0 && code === -3 && sign > 0) sign = -1;
        else if (!(digits === 0 && sign > 0 && code === -16)) {
          digits = 0;
          break;
        }
      }
      if (digits === 0) throw badValue(cursor, k);
      if (value !== NONE) values[at + first + k] = (sign * value * factor) / divisor;
    }
    if (cursor.end > cursor.start + count * WIDTH && cursor.columns(count * WIDTH, 80).trim() !== '')
      throw badValue(cursor, count);
  }
}

function badValue(cursor: LineCursor, k: number): IonexFault {
  const cell = cursor.columns(k * WIDTH, (k + 1) * WIDTH);
  return new IonexFault(
    'map-row-unreadable',
    cursor.line,
    `Expected a whole number or 9999 in columns ${k * WIDTH + 1} to ${(k + 1) * WIDTH} of a row of values, came ${JSON.stringify(cell)}. Get the file again.`,
  );
}

function truncated(cursor: LineCursor, expected: string): IonexFault {
  return new IonexFault(
    'map-file-truncated',
    cursor.line,
    `Expected ${expected === 'values' ? 'a row of values' : JSON.stringify(expected)}, came the end of the file. Get the file again.`,
  );
}

function unexpected(cursor: LineCursor, endLabel: string): IonexFault {
  return new IonexFault(
    'map-row-unreadable',
    cursor.line,
    `Expected a row of the map or ${JSON.stringify(endLabel)}, came ${JSON.stringify(cursor.columns(0, 80).trim().slice(0, 60))}. Get the file again.`,
  );
}
