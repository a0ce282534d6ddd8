import type { Geocentric, Geodetic } from './coordinates.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';

const DEG = Math.PI / 180;

/** Geographic to geocentric coordinates (EPSG guidance note 7-2, method 9602). Longitudes of any turn are taken. */
export function geodeticToGeocentric(g: Geodetic, ellipsoid: Ellipsoid = WGS84): Geocentric {
  const sinLatitude = Math.sin(g.latitudeDeg * DEG);
  const cosLatitude = Math.cos(g.latitudeDeg * DEG);
  const e2 = ellipsoid.eccentricitySquared;
  const n = ellipsoid.semiMajorAxisM / Math.sqrt(1 - e2 * sinLatitude * sinLatitude);
  const axial = (n + g.heightM) * cosLatitude;
  return {
    xM: axial * Math.cos(g.longitudeDeg * DEG),
    yM: axial * Math.sin(g.longitudeDeg * DEG),
    zM: ((1 - e2) * n + g.heightM) * sinLatitude,
  };
}

/**
 * Geocentric to geographic coordinates, latitude to 1e-12 rad from 3 000 km below the ellipsoid outward. Bowring's
 * formula (1976, Survey Review 23) repeated on the reduced latitude until it stands, and a height that is good at
 * every latitude (Bowring 1985). Longitude in (−180, 180], 0 on the axis.
 * @throws RangeError for coordinates that are not finite, or within half the semi-minor axis of the earth's centre,
 * where no useful position lies (all zeros, kilometres for metres).
 */
export function geocentricToGeodetic(c: Geocentric, ellipsoid: Ellipsoid = WGS84): Geodetic {
  const { xM, yM, zM } = c;
  const { semiMajorAxisM: a, semiMinorAxisM: b, eccentricitySquared: e2 } = ellipsoid;
  const p = Math.sqrt(xM * xM + yM * yM);
  const radius = Math.sqrt(p * p + zM * zM);
  if (!(radius >= b / 2 && radius < Number.POSITIVE_INFINITY))
    throw new RangeError(
      `c: expected geocentric metres more than ${Math.round(b / 2)} m from the earth's centre, received ${xM}, ${yM}, ${zM}`,
    );
  const secondE2 = e2 / (1 - e2);
  const axisRatio = b / a;
  // reduced latitude as a sine and a cosine: no tangent, so nothing grows at the poles
  let s = zM;
  let q = axisRatio * p;
  for (let i = 0; i < 10; i += 1) {
    const scale = 1 / Math.sqrt(s * s + q * q);
    const sine = s * scale;
    const cosine = q * scale;
    const up = zM + secondE2 * b * sine * sine * sine;
    const out = p - e2 * a * cosine * cosine * cosine;
    const nextS = axisRatio * up;
    const turn = (nextS * cosine - out * sine) / Math.sqrt(nextS * nextS + out * out);
    s = nextS;
    q = out;
    if (Math.abs(turn) < 1e-15) break;
  }
  const latitude = Math.atan2(s / axisRatio, q);
  const sinLatitude = Math.sin(latitude);
  const longitude = Math.atan2(yM, xM);
  return {
    latitudeDeg: latitude / DEG,
    // −180 comes only from a negative zero
    longitudeDeg: longitude === -Math.PI ? 180 : p === 0 ? 0 : longitude / DEG,
    heightM: p * Math.cos(latitude) + zM * sinLatitude - a * Math.sqrt(1 - e2 * sinLatitude * sinLatitude),
  };
}
