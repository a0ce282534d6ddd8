import { baselineBetween } from './baseline.js';
import type { Geodetic } from './coordinates.js';
import { type Ellipsoid, meridianRadiusM, primeVerticalRadiusM } from './ellipsoid.js';
import { geodesicBetween } from './geodesic.js';
import { pointScale } from './pointScale.js';
import type { Geographic, Projection } from './projection.js';

/** The length of one line in the ways that surveyors state it, metres. */
export interface LineLengths {
  /** Straight through space between the two points, slope included: what satellites measure, and what `L` means here. */
  readonly chordM: number;
  /** Along the ellipsoid. */
  readonly ellipsoidM: number;
  /** Along the ground's level: at the mean of both ellipsoidal heights, slope taken out. */
  readonly groundM: number;
  /** Between the two points on the projection plane. */
  readonly gridM: number;
  /** Grid over ellipsoid. NaN for a line of no length. */
  readonly lineScale: number;
  /** Grid over ground. NaN for a line of no length. */
  readonly combinedFactor: number;
}

/**
 * Lengths of the line between two points on the projection's ellipsoid.
 * @throws RangeError and Error as `projection.forward` and `geodesicBetween`.
 */
export function lineLengths(projection: Projection, from: Geodetic, to: Geodetic): LineLengths {
  const { ellipsoid } = projection;
  const { lengthM: ellipsoidM, azimuthDeg } = geodesicBetween(from, to, ellipsoid);
  const height = (from.heightM + to.heightM) / 2;
  const middle = (from.latitudeDeg + to.latitudeDeg) / 2;
  const radius = radiusInDirectionM(middle, azimuthDeg, ellipsoid);
  const groundM = ellipsoidM === 0 ? 0 : (ellipsoidM * (radius + height)) / radius;
  const [a, b] = [projection.forward(from), projection.forward(to)];
  const gridM = Math.hypot(b.eastingM - a.eastingM, b.northingM - a.northingM);
  return {
    chordM: baselineBetween(from, to, ellipsoid).lengthKm * 1000,
    ellipsoidM,
    groundM,
    gridM,
    lineScale: ellipsoidM === 0 ? Number.NaN : gridM / ellipsoidM,
    combinedFactor: groundM === 0 ? Number.NaN : gridM / groundM,
  };
}

/**
 * Line scale factor from the point scales k at both ends and the middle, by Simpson's rule: 6 / (1/k₁ + 4/kₘ + 1/k₂).
 * For conformal projections; within 1e-8 over 100 km.
 * @throws RangeError and Error as `pointScale`.
 */
export function lineScale(projection: Projection, from: Geographic, to: Geographic): number {
  const [a, b] = [projection.forward(from), projection.forward(to)];
  const middle = projection.inverse({
    eastingM: (a.eastingM + b.eastingM) / 2,
    northingM: (a.northingM + b.northingM) / 2,
  });
  const inverse = (place: Geographic) => 1 / pointScale(projection, place).scale;
  return 6 / (inverse(from) + 4 * inverse(middle) + inverse(to));
}

/** Euler's radius of curvature of the normal section in a direction. */
function radiusInDirectionM(latitudeDeg: number, azimuthDeg: number, ellipsoid: Ellipsoid): number {
  const azimuth = (azimuthDeg * Math.PI) / 180;
  return (
    1 /
    (Math.cos(azimuth) ** 2 / meridianRadiusM(latitudeDeg, ellipsoid) +
      Math.sin(azimuth) ** 2 / primeVerticalRadiusM(latitudeDeg, ellipsoid))
  );
}
