import { azimuthDegrees } from './azimuth.js';
import type { Geocentric, Geodetic } from './coordinates.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';
import { geodeticToGeocentric } from './geocentric.js';
import { localFrame } from './localFrame.js';

/** The vector from a base to a rover. */
export interface Baseline {
  /** Straight (chord) distance between the two points, km. */
  readonly lengthKm: number;
  /** Direction to the rover in the base's horizon: 0 ≤ azimuth < 360, clockwise from north. NaN: no direction. */
  readonly azimuthDeg: number;
  /** The same direction, base to rover, as seen in the rover's horizon. NaN: no direction. */
  readonly azimuthAtRoverDeg: number;
  /** Rover minus base, ellipsoidal heights, metres. */
  readonly heightDifferenceM: number;
}

/** Horizontal parts below this are rounding of geocentric coordinates, not a direction. */
const NO_DIRECTION_M = 1e-6;

function azimuthOf(difference: Geocentric, at: Geodetic, ellipsoid: Ellipsoid): number {
  const { eastM, northM } = localFrame(at, ellipsoid).rotate(difference);
  if (Math.hypot(eastM, northM) < NO_DIRECTION_M) return Number.NaN;
  return azimuthDegrees(Math.atan2(eastM, northM));
}

/**
 * Baseline between two points on the same ellipsoid. Azimuths are those of the normal section (the vertical plane
 * through the other point), not of the geodesic: within 100 km these differ by less than 0.02″ for points at height 0,
 * and by up to 0.11″ more per 1000 m of the other point's height. A baseline of no length, or one straight up, has no
 * direction: both azimuths are NaN.
 */
export function baselineBetween(base: Geodetic, rover: Geodetic, ellipsoid: Ellipsoid = WGS84): Baseline {
  const from = geodeticToGeocentric(base, ellipsoid);
  const to = geodeticToGeocentric(rover, ellipsoid);
  const difference: Geocentric = { xM: to.xM - from.xM, yM: to.yM - from.yM, zM: to.zM - from.zM };
  return {
    lengthKm: Math.hypot(difference.xM, difference.yM, difference.zM) / 1000,
    azimuthDeg: azimuthOf(difference, base, ellipsoid),
    azimuthAtRoverDeg: azimuthOf(difference, rover, ellipsoid),
    heightDifferenceM: rover.heightM - base.heightM,
  };
}
