import { type Geodetic, geocentricToGeodetic, projection } from '../geodesy/index.js';
import type { ColumnRole } from './roles.js';

/** `geographic` (degrees, WGS 84), `geocentric` (metres, WGS 84) or a proj string of a projection. */
export type CoordinateSystem = string;

/** Which columns carry coordinates in a system and how their three numbers become geographic ones. */
export interface CoordinateColumns {
  readonly roles: readonly [ColumnRole, ColumnRole, ColumnRole];
  /** Three numbers in the order of `roles`; throws RangeError with the remedy when they are outside the system's range. */
  readonly toGeodetic: (first: number, second: number, third: number) => Geodetic;
}

/** @throws Error when a proj string is not understood */
export function coordinateColumns(system: CoordinateSystem): CoordinateColumns {
  if (system === 'geographic') {
    return { roles: ['latitude', 'longitude', 'height'], toGeodetic: geographic };
  }
  if (system === 'geocentric') {
    return {
      roles: ['x', 'y', 'z'],
      toGeodetic: (xM, yM, zM) => {
        const radiusM = Math.hypot(xM, yM, zM);
        if (radiusM < 6.3e6 || radiusM > 6.5e6) {
          throw new RangeError(
            `expected geocentric metres on the earth's surface, came ${(radiusM / 1000).toFixed(1)} km from its centre`,
          );
        }
        return geocentricToGeodetic({ xM, yM, zM });
      },
    };
  }
  const { inverse } = projection(system);
  return {
    roles: ['easting', 'northing', 'height'],
    toGeodetic: (eastingM, northingM, heightM) => ({ ...inverse({ eastingM, northingM }), heightM }),
  };
}

function geographic(latitudeDeg: number, longitudeDeg: number, heightM: number): Geodetic {
  if (Math.abs(latitudeDeg) > 90)
    throw new RangeError(`expected a latitude from -90 to 90 degrees, came ${latitudeDeg}`);
  if (longitudeDeg < -180 || longitudeDeg > 360) {
    throw new RangeError(`expected a longitude from -180 to 360 degrees, came ${longitudeDeg}`);
  }
  return { latitudeDeg, longitudeDeg: longitudeDeg > 180 ? longitudeDeg - 360 : longitudeDeg, heightM };
}
