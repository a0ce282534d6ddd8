import type { Ellipsoid } from '../ellipsoid.js';
import { ellipsoidOfParameters } from '../ellipsoidOfParameters.js';
import type { LengthUnit } from '../lengthUnits.js';
import { type EpsgRow, epsgRows } from './epsgRows.js';
import { likelyCodes } from './likelyCodes.js';

export type CrsKind = 'geographic' | 'geocentric' | 'projected';

/** Coordinates that a code of the EPSG register stands for. */
export interface CrsDefinition {
  /** As in `EPSG:25832`. */
  readonly code: string;
  readonly name: string;
  readonly kind: CrsKind;
  /** Name of the reference frame (datum) beneath, e.g. `ETRS89`. */
  readonly frame: string;
  /** The frame's, for geocentric coordinates and lengths. */
  readonly ellipsoid: Ellipsoid;
  /** Unit of the axes. `projection` computes in metres whatever this says. */
  readonly unit: 'degree' | LengthUnit;
  /** Where the first, second and third axis of the written coordinates point: `enu` unless the register says e.g. `wsu`. */
  readonly axes: string;
  /** For `projection`; of geographic and geocentric coordinates it names the ellipsoid. Never a change of frame. */
  readonly projString: string;
  /** Metres between the frame's origin and that of WGS 84, where the register states a shift; else null. */
  readonly originShiftM: number | null;
  /** What must be known before these coordinates are compared with others, in full sentences; null: nothing. */
  readonly note: string | null;
}

/** Frames within this of WGS 84 are told apart by their plate motion and realization, not by another origin. */
const SAME_ORIGIN_M = 5;
/** Ellipsoids of the satellite age, semi-major axis 6378135 to 6378137 m; on others no frame has the earth's centre as origin. */
const SATELLITE_ELLIPSOIDS = /^(ellps=(WGS84|GRS80)|a=637813[5-7].*)$/;
const UNITS: Readonly<Record<string, LengthUnit>> = {
  'us-ft': 'us-survey-foot',
  ft: 'international-foot',
};
const KIND_WORDS: Readonly<Record<CrsKind, string>> = {
  geographic: 'latitudes and longitudes in degrees',
  geocentric: 'geocentric x, y, z in metres',
  projected: 'eastings and northings of a map projection',
};

/**
 * Definition of a code of the EPSG register (`EPSG:25832`, `epsg:25832` or `25832`), offline: 5952 geographic,
 * geocentric and projected systems in degrees, metres and feet, withdrawn ones left out (epsg-index 2.0.0).
 *
 * Datum shifts are no part of it: a grid on a frame with another origin is projected as it stands, and `note` says so.
 * @throws Error for a code that is malformed or not in the table, with those that may be meant.
 */
export function crsDefinition(code: string | number): CrsDefinition {
  const digits = /^(?:EPSG:)?(\d{4,5})$/i.exec(String(code).trim())?.[1];
  if (digits === undefined)
    throw new Error(
      `"${code}" is not an EPSG code; expected a number of four or five digits, e.g. EPSG:25832`,
    );
  const row = epsgRows().get(Number(digits));
  if (!row) {
    const likely = likelyCodes(Number(digits), [...epsgRows().values()]).map(
      ({ code, name }) => `EPSG:${code} (${name})`,
    );
    throw new Error(
      `EPSG:${digits} is not among the ${epsgRows().size} known codes; near it are ${likely.join(', ')}; a proj string can be given instead`,
    );
  }
  return definitionOf(row);
}

/**
 * `crsDefinition` of a code that must be of one kind.
 * @throws Error for another kind, saying what the code stands for and what was needed; and as `crsDefinition`.
 */
export function crsOfKind(code: string | number, kind: CrsKind): CrsDefinition {
  const crs = crsDefinition(code);
  if (crs.kind === kind) return crs;
  throw new Error(
    `${crs.code} (${crs.name}) stands for ${KIND_WORDS[crs.kind]}; expected a code for ${KIND_WORDS[kind]}`,
  );
}

function definitionOf(row: EpsgRow): CrsDefinition {
  const values = new Map(
    row.conversion.split(' ').map((parameter) => {
      const [key = '', value = ''] = parameter.split('=', 2);
      return [key, value] as const;
    }),
  );
  const projection = { geographic: 'proj=longlat', geocentric: 'proj=geocent', projected: row.conversion }[
    row.kind
  ];
  const axes = values.get('axis') ?? 'enu';
  return {
    code: `EPSG:${row.code}`,
    name: row.name,
    kind: row.kind,
    frame: row.frame,
    ellipsoid: ellipsoidOfParameters(withSigns(row.shape)),
    unit: row.kind === 'geographic' ? 'degree' : (UNITS[values.get('units') ?? ''] ?? 'metre'),
    axes,
    projString: withSigns(`${projection} ${row.shape}`),
    originShiftM: row.originShiftM,
    note: noteOn(row, axes),
  };
}

function withSigns(parameters: string): string {
  return parameters.replace(/(^| )(?=\S)/g, '$1+');
}

function noteOn(row: EpsgRow, axes: string): string | null {
  const notes: string[] = [];
  const ownEllipsoid = !SATELLITE_ELLIPSOIDS.test(row.shape);
  if (row.frame === 'WGS 84' && row.shape.startsWith('a='))
    notes.push(
      'It maps ellipsoidal latitudes by the formulas of a sphere: neither its distances nor its angles are true.',
    );
  else if ((row.originShiftM ?? 0) > SAME_ORIGIN_M || (ownEllipsoid && row.originShiftM === null)) {
    const far =
      row.originShiftM === null ? '' : ` (its origin is about ${row.originShiftM} m from that of WGS 84)`;
    notes.push(
      `Coordinates on ${row.frame}${far} are not satellite coordinates: state the transformation that leads to them.`,
    );
  }
  if (axes !== 'enu' && row.kind === 'projected')
    notes.push(
      `The register counts these coordinates along the axes "${axes}" (e east, w west, n north, s south); eastings grow to the east and northings to the north here, so turn the signs.`,
    );
  return notes.length === 0 ? null : notes.join(' ');
}
