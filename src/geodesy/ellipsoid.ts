/** An ellipsoid of revolution. */
export interface Ellipsoid {
  readonly name: string;
  readonly semiMajorAxisM: number;
  readonly inverseFlattening: number;
  readonly flattening: number;
  readonly semiMinorAxisM: number;
  /** First eccentricity squared, f (2 − f). */
  readonly eccentricitySquared: number;
}

/**
 * Ellipsoid from its two defining constants: semi-major axis in metres and inverse flattening (Infinity: a sphere).
 * @throws RangeError when the axis is not positive or the inverse flattening is not greater than 1.
 */
export function ellipsoid(name: string, semiMajorAxisM: number, inverseFlattening: number): Ellipsoid {
  if (!(semiMajorAxisM > 0 && Number.isFinite(semiMajorAxisM)))
    throw new RangeError(
      `semiMajorAxisM: expected a finite number of metres above 0, received ${semiMajorAxisM}`,
    );
  if (!(inverseFlattening > 1))
    throw new RangeError(`inverseFlattening: expected a number above 1, received ${inverseFlattening}`);
  const flattening = 1 / inverseFlattening;
  return {
    name,
    semiMajorAxisM,
    inverseFlattening,
    flattening,
    semiMinorAxisM: semiMajorAxisM * (1 - flattening),
    eccentricitySquared: flattening * (2 - flattening),
  };
}

/** World Geodetic System 1984 (EPSG ellipsoid 7030). */
export const WGS84: Ellipsoid = ellipsoid('WGS 84', 6378137, 298.257223563);

/** Geodetic Reference System 1980 (EPSG ellipsoid 7019). */
export const GRS80: Ellipsoid = ellipsoid('GRS 1980', 6378137, 298.257222101);

/** a / √(1 − e² sin²φ): radius of curvature in the prime vertical, metres. */
export function primeVerticalRadiusM(latitudeDeg: number, e: Ellipsoid): number {
  const sine = Math.sin((latitudeDeg * Math.PI) / 180);
  return e.semiMajorAxisM / Math.sqrt(1 - e.eccentricitySquared * sine * sine);
}

/** a (1 − e²) / (1 − e² sin²φ)^1.5: radius of curvature in the meridian, metres. */
export function meridianRadiusM(latitudeDeg: number, e: Ellipsoid): number {
  const sine = Math.sin((latitudeDeg * Math.PI) / 180);
  const w2 = 1 - e.eccentricitySquared * sine * sine;
  return (e.semiMajorAxisM * (1 - e.eccentricitySquared)) / (w2 * Math.sqrt(w2));
}
