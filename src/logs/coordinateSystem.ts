import {
  crsDefinition,
  type Ellipsoid,
  type LengthUnit,
  type Projection,
  projection,
  WGS84,
} from '../geodesy/index.js';

/**
 * `geographic` (degrees, WGS 84), `geocentric` (metres, WGS 84), a code of the EPSG register (`EPSG:25832`) or a proj
 * string of a projection.
 */
export type CoordinateSystem = string;

interface CommonSystem {
  readonly ellipsoid: Ellipsoid;
  /** Unit of lengths in which such coordinates are written, as its definition says. */
  readonly unit: LengthUnit;
  /** What must be known before such coordinates are compared with others, in full sentences; null: nothing. */
  readonly note: string | null;
}

/** What a coordinate system is. */
export type KnownSystem = CommonSystem &
  (
    | { readonly kind: 'geographic' }
    | { readonly kind: 'geocentric' }
    | { readonly kind: 'projected'; readonly projection: Projection; readonly registered: boolean }
  );

const UNIT_WORDS: Readonly<Record<string, LengthUnit>> = {
  'us-ft': 'us-survey-foot',
  ft: 'international-foot',
};

/** @throws Error when a code or a proj string is not understood */
export function systemOf(system: CoordinateSystem): KnownSystem {
  if (system === 'geographic' || system === 'geocentric') {
    return { kind: system, ellipsoid: WGS84, unit: 'metre', note: null };
  }
  if (!/^EPSG:/i.test(system)) {
    const unit = UNIT_WORDS[/\+units=(\S+)/.exec(system)?.[1] ?? ''] ?? 'metre';
    const plane = projection(system);
    return {
      kind: 'projected',
      projection: plane,
      registered: false,
      ellipsoid: plane.ellipsoid,
      unit,
      note: null,
    };
  }
  const crs = crsDefinition(system);
  const unit = crs.unit === 'degree' ? 'metre' : crs.unit;
  const { note } = crs;
  if (crs.kind !== 'projected') return { kind: crs.kind, ellipsoid: crs.ellipsoid, unit, note } as const;
  const plane = projection(crs.code);
  return { kind: 'projected', projection: plane, registered: true, ellipsoid: plane.ellipsoid, unit, note };
}
