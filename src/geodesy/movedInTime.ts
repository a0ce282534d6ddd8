import type { Geocentric, Geodetic } from './coordinates.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';
import { localFrame } from './localFrame.js';

/** Velocity of a mark or base, metres per year along the geocentric axes. */
export interface GeocentricVelocity {
  readonly xMPerYear: number;
  readonly yMPerYear: number;
  readonly zMPerYear: number;
}

/** The same in the mark's horizon, metres per year. */
export interface LocalVelocity {
  readonly eastMPerYear: number;
  readonly northMPerYear: number;
  readonly upMPerYear: number;
}

/** A velocity in the horizon of `at` along the geocentric axes: only turned. */
export function geocentricVelocity(
  v: LocalVelocity,
  at: Geodetic,
  ellipsoid: Ellipsoid = WGS84,
): GeocentricVelocity {
  const turned = localFrame(at, ellipsoid).rotateBack({
    eastM: v.eastMPerYear,
    northM: v.northMPerYear,
    upM: v.upMPerYear,
  });
  return { xMPerYear: turned.xM, yMPerYear: turned.yM, zMPerYear: turned.zM };
}

/**
 * Where a position of `fromYear` stands in `toYear` at a constant velocity (decimal years).
 * @throws RangeError when a year or a velocity is not finite.
 */
export function movedInTime(
  c: Geocentric,
  v: GeocentricVelocity,
  fromYear: number,
  toYear: number,
): Geocentric {
  const years = toYear - fromYear;
  if (!Number.isFinite(years))
    throw new RangeError(`fromYear and toYear: expected decimal years, received ${fromYear} and ${toYear}`);
  if (![v.xMPerYear, v.yMPerYear, v.zMPerYear].every(Number.isFinite))
    throw new RangeError(
      `velocity: expected metres per year, received ${v.xMPerYear}, ${v.yMPerYear}, ${v.zMPerYear}`,
    );
  return {
    xM: c.xM + v.xMPerYear * years,
    yM: c.yM + v.yMPerYear * years,
    zM: c.zM + v.zMPerYear * years,
  };
}
