import { epochAt, IonexFault, numberAt } from './fault.js';
import type { LineCursor } from './lineCursor.js';

/** What the header of an IONEX file says. */
export interface IonexHeader {
  readonly version: number;
  readonly system: string;
  readonly firstMs: number | null;
  readonly lastMs: number | null;
  readonly intervalSeconds: number;
  readonly mapCount: number | null;
  readonly mappingFunction: string;
  readonly elevationCutoffDeg: number;
  readonly baseRadiusKm: number;
  readonly shellHeightKm: number;
  readonly latitudesDeg: Float64Array;
  readonly longitudesDeg: Float64Array;
  /** Power of ten of the unit that values are written in. */
  readonly exponent: number;
}

/** The format's own default. */
const DEFAULT_EXPONENT = -1;
const KNOWN_VERSIONS = [1, 1.1];

const FORMAT = 'Give a map file in the IONEX format, version 1.0 or 1.1, as it was published';

/**
 * Reads the header, with the cursor before the first line, and leaves it on END OF HEADER. Auxiliary data (biases of
 * satellites and stations) are passed over.
 * @throws IonexFault
 */
export function readHeader(cursor: LineCursor): IonexHeader {
  const first = cursor.next();
  if (!first || cursor.label() !== 'IONEX VERSION / TYPE')
    throw new IonexFault(
      'map-layout-unknown',
      first ? 1 : null,
      `Expected a first line that ends with the label "IONEX VERSION / TYPE", came ${first ? JSON.stringify(cursor.columns(0, 80).trim().slice(0, 60)) : 'an empty file'}. ${FORMAT}.`,
    );
  const version = numberAt(cursor, 0, 8, 'the version of the format');
  if (!KNOWN_VERSIONS.includes(version))
    throw new IonexFault('map-layout-unknown', 1, `Expected version 1.0 or 1.1, came ${version}. ${FORMAT}.`);
  if (cursor.columns(20, 21) !== 'I')
    throw new IonexFault(
      'map-layout-unknown',
      1,
      `Expected the file type I in column 21, came ${JSON.stringify(cursor.columns(20, 40).trim())}. ${FORMAT}.`,
    );
  const found = new Map<string, number | readonly number[]>();
  const system = cursor.columns(40, 60).trim();
  let mappingFunction = '';
  let inAuxiliary = false;
  for (;;) {
    if (!cursor.next())
      throw new IonexFault(
        'map-file-truncated',
        cursor.line,
        'Expected the label "END OF HEADER", came the end of the file. Get the file again.',
      );
    const label = cursor.label();
    if (label === 'END OF AUX DATA') inAuxiliary = false;
    if (inAuxiliary) continue;
    if (label === 'END OF HEADER') break;
    if (label === 'START OF AUX DATA') inAuxiliary = true;
    else if (label === 'MAPPING FUNCTION') mappingFunction = cursor.columns(0, 60).trim();
    else {
      const read = FIELDS[label];
      if (read !== undefined) found.set(label, read(cursor));
    }
  }
  const one = (label: string): number | null => (found.get(label) as number | undefined) ?? null;
  return {
    version,
    system,
    firstMs: one('EPOCH OF FIRST MAP'),
    lastMs: one('EPOCH OF LAST MAP'),
    intervalSeconds: one('INTERVAL') ?? 0,
    mapCount: one('# OF MAPS IN FILE'),
    mappingFunction,
    elevationCutoffDeg: one('ELEVATION CUTOFF') ?? Number.NaN,
    baseRadiusKm: required(found, 'BASE RADIUS', cursor.line)[0]!,
    shellHeightKm: shellHeight(found, cursor.line),
    latitudesDeg: gridOf(found, 'LAT1 / LAT2 / DLAT', 90, cursor.line),
    longitudesDeg: gridOf(found, 'LON1 / LON2 / DLON', 360, cursor.line),
    exponent: one('EXPONENT') ?? DEFAULT_EXPONENT,
  };
}

const whole = (cursor: LineCursor): number => numberAt(cursor, 0, 6, 'a whole number');
const decimal = (cursor: LineCursor): number => numberAt(cursor, 0, 8, 'a number');
const three = (cursor: LineCursor): readonly number[] =>
  [2, 8, 14].map((at) => numberAt(cursor, at, at + 6, 'a number'));

const FIELDS: Readonly<Record<string, (cursor: LineCursor) => number | readonly number[]>> = {
  'EPOCH OF FIRST MAP': epochAt,
  'EPOCH OF LAST MAP': epochAt,
  INTERVAL: whole,
  '# OF MAPS IN FILE': whole,
  'ELEVATION CUTOFF': decimal,
  'BASE RADIUS': decimal,
  'HGT1 / HGT2 / DHGT': three,
  'LAT1 / LAT2 / DLAT': three,
  'LON1 / LON2 / DLON': three,
  EXPONENT: whole,
};

function required(
  found: ReadonlyMap<string, number | readonly number[]>,
  label: string,
  line: number,
): readonly number[] {
  const values = found.get(label);
  if (values !== undefined) return typeof values === 'number' ? [values] : values;
  throw new IonexFault(
    'map-header-incomplete',
    line,
    `The header line "${label}" is missing. Without it the maps have no place: get the file again.`,
  );
}

function shellHeight(found: ReadonlyMap<string, number | readonly number[]>, line: number): number {
  const [first, last] = required(found, 'HGT1 / HGT2 / DHGT', line) as [number, number];
  if (first === last && (found.get('MAP DIMENSION') ?? 2) === 2) return first;
  throw new IonexFault(
    'map-three-dimensional',
    line,
    `Expected maps on one shell, came shells from ${first} to ${last} km. Give a file with two-dimensional maps.`,
  );
}

function gridOf(
  found: ReadonlyMap<string, number | readonly number[]>,
  label: string,
  most: number,
  line: number,
): Float64Array {
  const [first, last, step] = required(found, label, line) as [number, number, number];
  const steps = (last - first) / step;
  const count = Math.round(steps) + 1;
  if (
    step !== 0 &&
    Math.abs(steps - Math.round(steps)) < 1e-6 &&
    count >= 2 &&
    Math.abs(first) <= most &&
    Math.abs(last) <= most
  )
    return Float64Array.from({ length: count }, (_, k) => first + k * step);
  throw new IonexFault(
    'map-header-incomplete',
    line,
    `Expected a grid of at least two lines in "${label}", came ${first} to ${last} by ${step}. Get the file again.`,
  );
}
