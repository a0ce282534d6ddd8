import { azimuthDegrees } from './azimuth.js';
import { type Ellipsoid, WGS84 } from './ellipsoid.js';
import { wrappedLongitude } from './longitude.js';
import type { Geographic } from './projection.js';

/** The shortest line on the ellipsoid between two places. */
export interface Geodesic {
  readonly lengthM: number;
  /** Its direction at the first place and, going on, at the second: 0 ≤ azimuth < 360, clockwise from north. NaN: no length. */
  readonly azimuthDeg: number;
  readonly azimuthAtEndDeg: number;
}

const DEG = Math.PI / 180;
const MAX_STEPS = 100;

/**
 * Geodesic by Vincenty's inverse formula (1975, Survey Review 23), good to 0.1 mm up to about 19 000 km.
 * @throws RangeError for latitudes beyond ±90° and for places that lie almost opposite each other on the globe.
 */
export function geodesicBetween(from: Geographic, to: Geographic, ellipsoid: Ellipsoid = WGS84): Geodesic {
  for (const { latitudeDeg } of [from, to])
    if (!(Math.abs(latitudeDeg) <= 90))
      throw new RangeError(`latitudeDeg: expected -90 to 90, received ${latitudeDeg}`);
  const { flattening: f, semiMinorAxisM: b, semiMajorAxisM: a } = ellipsoid;
  const reduced = (latitudeDeg: number) => Math.atan((1 - f) * Math.tan(latitudeDeg * DEG));
  const [u1, u2] = [reduced(from.latitudeDeg), reduced(to.latitudeDeg)];
  const [s1, c1, s2, c2] = [Math.sin(u1), Math.cos(u1), Math.sin(u2), Math.cos(u2)];
  const difference = wrappedLongitude(to.longitudeDeg - from.longitudeDeg) * DEG;

  let lambda = difference;
  for (let step = 0; step < MAX_STEPS; step += 1) {
    const [sinLambda, cosLambda] = [Math.sin(lambda), Math.cos(lambda)];
    const sinSigma = Math.hypot(c2 * sinLambda, c1 * s2 - s1 * c2 * cosLambda);
    if (sinSigma === 0) return { lengthM: 0, azimuthDeg: Number.NaN, azimuthAtEndDeg: Number.NaN };
    const cosSigma = s1 * s2 + c1 * c2 * cosLambda;
    const sigma = Math.atan2(sinSigma, cosSigma);
    const sinAlpha = (c1 * c2 * sinLambda) / sinSigma;
    const cos2Alpha = 1 - sinAlpha * sinAlpha;
    // along the equator there is no middle latitude
    const cos2M = cos2Alpha === 0 ? 0 : cosSigma - (2 * s1 * s2) / cos2Alpha;
    const c = (f / 16) * cos2Alpha * (4 + f * (4 - 3 * cos2Alpha));
    const inner = cos2M + c * cosSigma * (2 * cos2M * cos2M - 1);
    const next = difference + (1 - c) * f * sinAlpha * (sigma + c * sinSigma * inner);
    const change = Math.abs(next - lambda);
    lambda = next;
    if (change > 1e-14) continue;
    const k2 = (cos2Alpha * (a * a - b * b)) / (b * b);
    const big = 1 + (k2 / 16384) * (4096 + k2 * (-768 + k2 * (320 - 175 * k2)));
    const small = (k2 / 1024) * (256 + k2 * (-128 + k2 * (74 - 47 * k2)));
    const last = (small / 6) * cos2M * (4 * sinSigma * sinSigma - 3) * (4 * cos2M * cos2M - 3);
    const correction = small * sinSigma * (cos2M + (small / 4) * (cosSigma * (2 * cos2M * cos2M - 1) - last));
    return {
      lengthM: b * big * (sigma - correction),
      azimuthDeg: azimuthDegrees(Math.atan2(c2 * sinLambda, c1 * s2 - s1 * c2 * cosLambda)),
      azimuthAtEndDeg: azimuthDegrees(Math.atan2(c1 * sinLambda, c1 * s2 * cosLambda - s1 * c2)),
    };
  }
  throw new RangeError(
    `geodesic from ${from.latitudeDeg}, ${from.longitudeDeg} to ${to.latitudeDeg}, ${to.longitudeDeg}: expected places that are not opposite each other on the globe`,
  );
}
