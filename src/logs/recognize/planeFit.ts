import { type Geodetic, geodeticToGeocentric } from '../../geodesy/index.js';
import { type CoordinateColumns, coordinateColumns } from '../coordinateColumns.js';
import type { CoordinateSystem } from '../coordinateSystem.js';

/** Rows that are tried. */
const MOST_ROWS = 20;
const STEP_M = 100;
/** Lengths on projections made for surveying differ from those on the ellipsoid by less than this share. */
const MOST_DISTORTION = 1.5e-3;
/** Grid north and true north differ little there: tangent of the meridian convergence. */
const MOST_CONVERGENCE = 0.2;

/** Whether a system is a projection: plane coordinates in metres. */
export const isPlane = (system: CoordinateSystem | undefined): system is CoordinateSystem =>
  system !== undefined && system !== 'geographic' && system !== 'geocentric';

/**
 * Whether plane coordinates lie where a projection is used: it has a place for each, and lengths and directions there are
 * hardly distorted. Coordinates in the wrong order or unit mostly lie far outside.
 * @param metres metres in a unit of the coordinates
 */
export function fitsProjection(
  system: CoordinateSystem,
  eastings: readonly number[],
  northings: readonly number[],
  metres: number,
): boolean {
  const columns = coordinateColumns(system);
  const count = Math.min(eastings.length, northings.length, MOST_ROWS);
  for (let k = 0; k < count; k++) {
    if (!isHardlyDistorted(columns, eastings[k]! * metres, northings[k]! * metres)) return false;
  }
  return count > 0;
}

function isHardlyDistorted({ toGeodetic }: CoordinateColumns, eastingM: number, northingM: number): boolean {
  try {
    const here = toGeodetic(eastingM, northingM, 0);
    const ahead = toGeodetic(eastingM, northingM + STEP_M, 0);
    const east = distanceM(here, toGeodetic(eastingM + STEP_M, northingM, 0)) / STEP_M;
    const north = distanceM(here, ahead) / STEP_M;
    if (Math.max(Math.abs(east - 1), Math.abs(north - 1)) > MOST_DISTORTION) return false;
    const eastward = (ahead.longitudeDeg - here.longitudeDeg) * Math.cos((here.latitudeDeg * Math.PI) / 180);
    const northward = ahead.latitudeDeg - here.latitudeDeg;
    return northward > 0 && Math.abs(eastward / northward) <= MOST_CONVERGENCE;
  } catch {
    // Outside the reach of the projection: it has no place for these numbers.
    return false;
  }
}

function distanceM(a: Geodetic, b: Geodetic): number {
  const [p, q] = [geodeticToGeocentric(a), geodeticToGeocentric(b)];
  return Math.hypot(p.xM - q.xM, p.yM - q.yM, p.zM - q.zM);
}
