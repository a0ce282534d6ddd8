import type { Geocentric, Geodetic, LocalVector } from './coordinates.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';
import { geodeticToGeocentric } from './geocentric.js';

/** The horizon of a point: east, north and up there. */
export interface LocalFrame {
  readonly origin: Geodetic;
  /** Geocentric position → vector from the origin (EPSG method 9836). */
  toLocal(c: Geocentric): LocalVector;
  /** Vector from the origin → geocentric position. */
  toGeocentric(v: LocalVector): Geocentric;
  /** Difference of two geocentric positions → the same vector in this horizon; only turned. */
  rotate(difference: Geocentric): LocalVector;
  /** Undoes `rotate`. */
  rotateBack(v: LocalVector): Geocentric;
}

/** Horizon of `origin`, by its ellipsoidal normal; sines and the origin's position are worked out once. */
export function localFrame(origin: Geodetic, ellipsoid: Ellipsoid = WGS84): LocalFrame {
  const latitude = (origin.latitudeDeg * Math.PI) / 180;
  const longitude = (origin.longitudeDeg * Math.PI) / 180;
  const sinLatitude = Math.sin(latitude);
  const cosLatitude = Math.cos(latitude);
  const sinLongitude = Math.sin(longitude);
  const cosLongitude = Math.cos(longitude);
  const centre = geodeticToGeocentric(origin, ellipsoid);

  const turn = (dx: number, dy: number, dz: number): LocalVector => {
    const outward = cosLongitude * dx + sinLongitude * dy;
    return {
      eastM: cosLongitude * dy - sinLongitude * dx,
      northM: cosLatitude * dz - sinLatitude * outward,
      upM: cosLatitude * outward + sinLatitude * dz,
    };
  };
  const turnBack = (v: LocalVector): Geocentric => {
    const outward = cosLatitude * v.upM - sinLatitude * v.northM;
    return {
      xM: cosLongitude * outward - sinLongitude * v.eastM,
      yM: sinLongitude * outward + cosLongitude * v.eastM,
      zM: sinLatitude * v.upM + cosLatitude * v.northM,
    };
  };
  return {
    origin,
    toLocal: (c) => turn(c.xM - centre.xM, c.yM - centre.yM, c.zM - centre.zM),
    rotate: (difference) => turn(difference.xM, difference.yM, difference.zM),
    rotateBack: turnBack,
    toGeocentric: (v) => {
      const { xM, yM, zM } = turnBack(v);
      return { xM: centre.xM + xM, yM: centre.yM + yM, zM: centre.zM + zM };
    },
  };
}
