import {
  type Ellipsoid,
  type Geodetic,
  geocentricToGeodetic,
  type LengthUnit,
  metresPer,
} from '../geodesy/index.js';
import { type CoordinateChanges, changedPlace } from './coordinateChanges.js';
import { CoordinateFault } from './coordinateFault.js';
import { type CoordinateSystem, systemOf } from './coordinateSystem.js';
import type { ColumnRole } from './roles.js';

/** Which columns carry coordinates in a system and how their three numbers become geographic ones. */
export interface CoordinateColumns {
  readonly roles: readonly [ColumnRole, ColumnRole, ColumnRole];
  /** So many of the roles, from the first, are known together or not at all: a plan position, or all three. */
  readonly together: 2 | 3;
  /** Unit of lengths in which such coordinates are written unless the layout says otherwise. */
  readonly unit: LengthUnit;
  /** The rows must give geoid separations. */
  readonly rowSeparations: boolean;
  /**
   * Three numbers in the order of `roles`, lengths in metres; a height may be NaN (not known) where it stands apart from
   * the plan.
   * @param separationM geoid separation of the row; NaN or left out when it gives none
   * @throws CoordinateFault for numbers outside the system's range
   */
  readonly toGeodetic: (first: number, second: number, third: number, separationM?: number) => Geodetic;
}

/** A system as it stands, before anything is done to its coordinates. */
type PlainColumns = Omit<CoordinateColumns, 'rowSeparations'> & { readonly ellipsoid: Ellipsoid };

/**
 * @param changes what must be done to these coordinates so that they can be compared with those of other sources
 * @throws Error when a code or a proj string is not understood
 */
export function coordinateColumns(
  system: CoordinateSystem,
  changes: CoordinateChanges = {},
): CoordinateColumns {
  const { ellipsoid, ...plain } = plainColumns(system, changes.plane);
  const rowSeparations = changes.rowSeparations ?? false;
  if (changes.height === undefined && changes.frame === undefined) return { ...plain, rowSeparations };
  return {
    ...plain,
    rowSeparations,
    toGeodetic: (first, second, third, separationM = Number.NaN) =>
      changedPlace(plain.toGeodetic(first, second, third), separationM, changes, ellipsoid),
  };
}

function plainColumns(system: CoordinateSystem, plane: CoordinateChanges['plane']): PlainColumns {
  const known = systemOf(system);
  const { ellipsoid, unit } = known;
  if (known.kind === 'geographic') {
    const roles = ['latitude', 'longitude', 'height'] as const;
    return { roles, together: 2, unit, ellipsoid, toGeodetic: geographic };
  }
  if (known.kind === 'geocentric') {
    return { roles: ['x', 'y', 'z'], together: 3, unit, ellipsoid, toGeodetic: geocentricOn(ellipsoid) };
  }
  const { inverse } = known.projection;
  const placeOf = (eastingM: number, northingM: number): ReturnType<typeof inverse> | null => {
    try {
      return inverse({ eastingM, northingM });
    } catch {
      // The projection says no more than that there is no such place, in words of its own.
      return null;
    }
  };
  return {
    roles: ['easting', 'northing', 'height'],
    together: 2,
    unit,
    ellipsoid,
    toGeodetic: (writtenEastingM, writtenNorthingM, writtenHeightM) => {
      const written = { eastingM: writtenEastingM, northingM: writtenNorthingM, heightM: writtenHeightM };
      const { eastingM, northingM, heightM } = plane === undefined ? written : plane(written);
      checkHeight(heightM);
      if (known.registered && Math.abs(eastingM) <= 360 && Math.abs(northingM) <= 360) {
        throw new CoordinateFault(
          `expected metres on the grid of ${system}, came easting ${eastingM} and northing ${northingM}, which look like degrees`,
          0,
        );
      }
      const place = placeOf(eastingM, northingM);
      if (place !== null) return { ...place, heightM };
      const swapped = placeOf(northingM, eastingM) === null ? '' : ' (are easting and northing swapped?)';
      throw new CoordinateFault(
        `expected a place within the reach of the projection, came easting ${eastingM} and northing ${northingM}${swapped}`,
        0,
      );
    },
  };
}

/** Beyond this an angle is more likely a length. */
const LENGTH_NOT_ANGLE = 1000;

function geographic(latitudeDeg: number, longitudeDeg: number, heightM: number): Geodetic {
  if (Math.abs(latitudeDeg) > 90) {
    const hint =
      Math.abs(latitudeDeg) > LENGTH_NOT_ANGLE
        ? ' (is this a length? State the projection under coordinates)'
        : Math.abs(longitudeDeg) <= 90
          ? ' (are latitude and longitude swapped?)'
          : '';
    throw new CoordinateFault(`expected a latitude from -90 to 90 degrees, came ${latitudeDeg}${hint}`, 0);
  }
  if (longitudeDeg < -180 || longitudeDeg > 360) {
    throw new CoordinateFault(`expected a longitude from -180 to 360 degrees, came ${longitudeDeg}`, 1);
  }
  checkHeight(heightM);
  return { latitudeDeg, longitudeDeg: longitudeDeg > 180 ? longitudeDeg - 360 : longitudeDeg, heightM };
}

const SMALLEST_RADIUS_M = 6.3e6;
const LARGEST_RADIUS_M = 6.5e6;

const isNearSurface = (radiusM: number): boolean =>
  radiusM >= SMALLEST_RADIUS_M && radiusM <= LARGEST_RADIUS_M;

const geocentricOn =
  (ellipsoid: Ellipsoid) =>
  (xM: number, yM: number, zM: number): Geodetic => {
    const radiusM = Math.hypot(xM, yM, zM);
    if (!isNearSurface(radiusM)) {
      const inFeet = isNearSurface(radiusM * metresPer('international-foot'));
      const degrees = Math.max(Math.abs(xM), Math.abs(yM)) <= 360;
      const hint = inFeet
        ? ' (are these feet? State length under units)'
        : degrees
          ? ' (are these degrees? State coordinates: geographic)'
          : '';
      throw new CoordinateFault(
        `expected geocentric metres near the earth's surface, came ${xM}, ${yM}, ${zM}${hint}`,
        0,
      );
    }
    return geocentricToGeodetic({ xM, yM, zM }, ellipsoid);
  };

const LOWEST_M = -10_000;
const HIGHEST_M = 100_000;

function checkHeight(heightM: number): void {
  if (heightM < LOWEST_M || heightM > HIGHEST_M) {
    throw new CoordinateFault(
      `expected a height from ${LOWEST_M} to ${HIGHEST_M} metres, came ${heightM}`,
      2,
    );
  }
}
