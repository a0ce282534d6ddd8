import { type Geodetic, geocentricToGeodetic, projection } from '../geodesy/index.js';
import { type CoordinateChanges, changedPlace } from './coordinateChanges.js';
import type { ColumnRole } from './roles.js';

/** `geographic` (degrees, WGS 84), `geocentric` (metres, WGS 84) or a proj string of a projection. */
export type CoordinateSystem = string;

/** Which columns carry coordinates in a system and how their three numbers become geographic ones. */
export interface CoordinateColumns {
  readonly roles: readonly [ColumnRole, ColumnRole, ColumnRole];
  /** So many of the roles, from the first, are known together or not at all: a plan position, or all three. */
  readonly together: 2 | 3;
  /** The rows must give geoid separations. */
  readonly rowSeparations: boolean;
  /**
   * Three numbers in the order of `roles`; a height may be NaN (not known) where it stands apart from the plan.
   * @param separationM geoid separation of the row; NaN or left out when it gives none
   * @throws CoordinateFault for numbers outside the system's range
   */
  readonly toGeodetic: (first: number, second: number, third: number, separationM?: number) => Geodetic;
}

/** Coordinates that cannot be: what was expected and came, and which of the three is to blame. */
export class CoordinateFault extends RangeError {
  constructor(
    text: string,
    readonly index: 0 | 1 | 2,
  ) {
    super(text);
  }
}

/**
 * @param changes what must be done to these coordinates so that they can be compared with those of other sources
 * @throws Error when a proj string is not understood
 */
export function coordinateColumns(
  system: CoordinateSystem,
  changes: CoordinateChanges = {},
): CoordinateColumns {
  const plain = plainColumns(system, changes.plane);
  const rowSeparations = changes.rowSeparations ?? false;
  if (changes.height === undefined && changes.frame === undefined) return { ...plain, rowSeparations };
  return {
    ...plain,
    rowSeparations,
    toGeodetic: (first, second, third, separationM = Number.NaN) =>
      changedPlace(plain.toGeodetic(first, second, third), separationM, changes),
  };
}

function plainColumns(
  system: CoordinateSystem,
  plane: CoordinateChanges['plane'],
): Omit<CoordinateColumns, 'rowSeparations'> {
  if (system === 'geographic') {
    return { roles: ['latitude', 'longitude', 'height'], together: 2, toGeodetic: geographic };
  }
  if (system === 'geocentric') return { roles: ['x', 'y', 'z'], together: 3, toGeodetic: geocentric };
  const { inverse } = projection(system);
  return {
    roles: ['easting', 'northing', 'height'],
    together: 2,
    toGeodetic: (writtenEastingM, writtenNorthingM, writtenHeightM) => {
      const written = { eastingM: writtenEastingM, northingM: writtenNorthingM, heightM: writtenHeightM };
      const { eastingM, northingM, heightM } = plane === undefined ? written : plane(written);
      checkHeight(heightM);
      try {
        return { ...inverse({ eastingM, northingM }), heightM };
      } catch {
        // The projection says no more than this, in words of its own.
        throw new CoordinateFault(
          `expected a place within the reach of the projection, came easting ${eastingM} and northing ${northingM}`,
          0,
        );
      }
    },
  };
}

function geographic(latitudeDeg: number, longitudeDeg: number, heightM: number): Geodetic {
  if (Math.abs(latitudeDeg) > 90) {
    const swapped = Math.abs(longitudeDeg) <= 90 ? ' (are latitude and longitude swapped?)' : '';
    throw new CoordinateFault(`expected a latitude from -90 to 90 degrees, came ${latitudeDeg}${swapped}`, 0);
  }
  if (longitudeDeg < -180 || longitudeDeg > 360) {
    throw new CoordinateFault(`expected a longitude from -180 to 360 degrees, came ${longitudeDeg}`, 1);
  }
  checkHeight(heightM);
  return { latitudeDeg, longitudeDeg: longitudeDeg > 180 ? longitudeDeg - 360 : longitudeDeg, heightM };
}

const SMALLEST_RADIUS_M = 6.3e6;
const LARGEST_RADIUS_M = 6.5e6;

function geocentric(xM: number, yM: number, zM: number): Geodetic {
  const radiusM = Math.hypot(xM, yM, zM);
  if (!(radiusM >= SMALLEST_RADIUS_M && radiusM <= LARGEST_RADIUS_M)) {
    throw new CoordinateFault(
      `expected geocentric metres near the earth's surface, came ${xM}, ${yM}, ${zM}`,
      0,
    );
  }
  return geocentricToGeodetic({ xM, yM, zM });
}

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
