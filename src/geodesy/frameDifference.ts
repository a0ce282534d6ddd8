import type { Geocentric, Geodetic } from './coordinates.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';
import { geodeticToGeocentric } from './geocentric.js';
import type { FrameTransformation } from './helmert.js';
import { localFrame } from './localFrame.js';

/**
 * What leaving out a change of frame does at a place: target minus source, all in the one horizon of the place, as a
 * measured baseline sees it whose ends have known coordinates of the other frame.
 */
export interface FrameDifference {
  /** Shift of the coordinates in the horizon of the place. */
  readonly eastMm: number;
  readonly northMm: number;
  readonly upMm: number;
  /** √(east² + north²). */
  readonly horizontalMm: number;
  /** Growth of lengths, parts per million: mm per km that a baseline is too short by without the transformation. */
  readonly scalePpm: number;
  /** How much directions turn (clockwise), arc seconds. */
  readonly turnArcSeconds: number;
  /** What these do to a baseline of 1 km, as the shift common to both its ends drops out. */
  readonly perKm: {
    /** Along the baseline, positive longer; equals `scalePpm`. */
    readonly alongMm: number;
    /** Across it, positive to the right. */
    readonly acrossMm: number;
    /** Rise of the end of a baseline to the east, and of one to the north. */
    readonly upToEastMm: number;
    readonly upToNorthMm: number;
  };
}

/**
 * Size of a change of frame at a place. `year` as in the transformation.
 * @throws RangeError as the transformation does.
 */
export function frameDifference(
  transformation: FrameTransformation,
  place: Geodetic,
  year?: number,
  ellipsoid: Ellipsoid = WGS84,
): FrameDifference {
  const frame = localFrame(place, ellipsoid);
  const here = geodeticToGeocentric(place, ellipsoid);
  const shift = frame.rotate(minus(transformation.forward(here, year), here));
  // the map is linear: over 1000 km, metres are what millimetres are over 1 km, and no digits are lost
  const lengthM = 1e6;
  const image = (eastM: number, northM: number) => {
    const end = frame.toGeocentric({ eastM, northM, upM: 0 });
    const moved = frame.rotate(minus(transformation.forward(end, year), end));
    return {
      eastMm: moved.eastM - shift.eastM,
      northMm: moved.northM - shift.northM,
      upMm: moved.upM - shift.upM,
    };
  };
  const east = image(lengthM, 0);
  const north = image(0, lengthM);
  // half the antisymmetric part; the symmetric one is the scale
  const acrossMm = (north.eastMm - east.northMm) / 2;
  const scalePpm = transformation.scalePpmAt(year);
  return {
    eastMm: shift.eastM * 1000,
    northMm: shift.northM * 1000,
    upMm: shift.upM * 1000,
    horizontalMm: Math.hypot(shift.eastM, shift.northM) * 1000,
    scalePpm,
    turnArcSeconds: ((acrossMm * 1e-6) / Math.PI) * 180 * 3600,
    perKm: { alongMm: scalePpm, acrossMm, upToEastMm: east.upMm, upToNorthMm: north.upMm },
  };
}

function minus(a: Geocentric, b: Geocentric): Geocentric {
  return { xM: a.xM - b.xM, yM: a.yM - b.yM, zM: a.zM - b.zM };
}
