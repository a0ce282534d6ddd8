/** Mean radius of the Earth of the thin-shell formulas, km. */
export const EARTH_RADIUS_KM = 6371;

/** Height of the shell most maps use, km. */
export const USUAL_SHELL_KM = 450;

/** Height and scale of the zenith angle in the modified mapping (Schaer 1999, dissertation, Bern; from memory). */
const MODIFIED_SHELL_KM = 506.7;
const MODIFIED_SCALE = 0.9782;

const RADIANS = Math.PI / 180;

/**
 * Slant over vertical TEC on a thin shell: 1/√(1 − (R cos e/(R + h))²).
 * @param elevationDeg elevation of the satellite, 0 to 90
 */
export function thinShellMapping(elevationDeg: number, shellHeightKm = USUAL_SHELL_KM): number {
  return mappingOf(Math.cos(elevationDeg * RADIANS), shellHeightKm);
}

/**
 * The modified thin-shell mapping: zenith angle scaled by 0.9782 on a shell at 506.7 km, which comes near to an
 * extended slab (Schaer 1999).
 */
export function modifiedMapping(elevationDeg: number): number {
  return mappingOf(Math.sin(MODIFIED_SCALE * (90 - elevationDeg) * RADIANS), MODIFIED_SHELL_KM);
}

function mappingOf(sineOfZenithAngle: number, shellHeightKm: number): number {
  const sine = (EARTH_RADIUS_KM * sineOfZenithAngle) / (EARTH_RADIUS_KM + shellHeightKm);
  return 1 / Math.sqrt(1 - sine * sine);
}

/** Where a ray goes through the shell. */
export interface PiercePoint {
  readonly latitudeDeg: number;
  /** −180 to 180. */
  readonly longitudeDeg: number;
  /** Angle at the Earth's centre between receiver and pierce point, degrees. */
  readonly centralAngleDeg: number;
}

/** A receiver and the direction to a satellite, degrees; the azimuth runs from north through east. */
export interface Ray {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly azimuthDeg: number;
  readonly elevationDeg: number;
}

/** Pierce point of a ray on a spherical shell, by the spherical triangle of pole, receiver and pierce point. */
export function piercePoint(ray: Ray, shellHeightKm = USUAL_SHELL_KM): PiercePoint {
  const [latitude, azimuth, elevation] = [ray.latitudeDeg, ray.azimuthDeg, ray.elevationDeg].map(
    (angle) => angle * RADIANS,
  ) as [number, number, number];
  const shell = (EARTH_RADIUS_KM * Math.cos(elevation)) / (EARTH_RADIUS_KM + shellHeightKm);
  const psi = Math.PI / 2 - elevation - Math.asin(shell);
  const sine = Math.sin(latitude) * Math.cos(psi) + Math.cos(latitude) * Math.sin(psi) * Math.cos(azimuth);
  const eastward = Math.atan2(
    Math.sin(psi) * Math.sin(azimuth) * Math.cos(latitude),
    Math.cos(psi) - Math.sin(latitude) * sine,
  );
  const longitudeDeg = ray.longitudeDeg + eastward / RADIANS;
  return {
    // rounding must not carry the sine of a pole beyond 1
    latitudeDeg: Math.asin(Math.min(1, Math.max(-1, sine))) / RADIANS,
    longitudeDeg: longitudeDeg - 360 * Math.round(longitudeDeg / 360),
    centralAngleDeg: psi / RADIANS,
  };
}
