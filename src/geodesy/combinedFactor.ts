import type { Geodetic } from './coordinates.js';
import { type Ellipsoid, meridianRadiusM, primeVerticalRadiusM } from './ellipsoid.js';
import { pointScale } from './pointScale.js';
import type { Projection } from './projection.js';

/** What turns a distance on the ground into one on the grid. */
export interface CombinedFactor {
  /** Plane over ellipsoid. */
  readonly pointScale: number;
  /** Ellipsoid over ground. */
  readonly heightFactor: number;
  /** Plane over ground: the product of both. */
  readonly combinedFactor: number;
  /** (combinedFactor − 1) · 10⁶: mm on the grid that a ground distance of 1 km grows by. */
  readonly ppm: number;
}

/** √(M N): radius of the sphere that fits the ellipsoid best at a latitude, metres. */
export function gaussianRadiusM(latitudeDeg: number, ellipsoid: Ellipsoid): number {
  return Math.sqrt(meridianRadiusM(latitudeDeg, ellipsoid) * primeVerticalRadiusM(latitudeDeg, ellipsoid));
}

/**
 * R / (R + h): length on the ellipsoid over length at the ellipsoidal height h. A height above sea level in its place errs by
 * 0.157 ppm per metre of geoid separation.
 * @throws RangeError when the height is not finite or not above −R.
 */
export function heightFactor(ellipsoidalHeightM: number, radiusM: number): number {
  const factor = radiusM / (radiusM + ellipsoidalHeightM);
  if (!(factor > 0 && Number.isFinite(factor)))
    throw new RangeError(
      `ellipsoidalHeightM and radiusM: expected a finite height above minus the radius, received ${ellipsoidalHeightM} and ${radiusM}`,
    );
  return factor;
}

/**
 * Combined factor of a projection at a place; its height is ellipsoidal. `radiusM` defaults to √(M N) of the projection's
 * ellipsoid there.
 * @throws RangeError and Error as `pointScale` and `heightFactor`.
 */
export function combinedFactor(
  projection: Projection,
  place: Geodetic,
  radiusM: number = gaussianRadiusM(place.latitudeDeg, projection.ellipsoid),
): CombinedFactor {
  const { scale } = pointScale(projection, place);
  const height = heightFactor(place.heightM, radiusM);
  const combined = scale * height;
  return { pointScale: scale, heightFactor: height, combinedFactor: combined, ppm: (combined - 1) * 1e6 };
}
