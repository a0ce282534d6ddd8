import { meridianRadiusM, primeVerticalRadiusM } from './ellipsoid.js';
import type { Geographic, PlanePosition, Projection } from './projection.js';

/** How a projection draws a small neighbourhood of a place. */
export interface PointScale {
  /** Length on the plane over length on the ellipsoid; of a conformal projection the same in all directions. */
  readonly scale: number;
  /** The same along the meridian and along the parallel. */
  readonly meridianScale: number;
  readonly parallelScale: number;
  /**
   * Azimuth of grid north, clockwise from true north: grid bearing = azimuth − convergence. East of the central
   * meridian it is positive in the northern hemisphere and negative in the southern. (Some manuals count the other way.)
   */
  readonly convergenceDeg: number;
}

const DEG = Math.PI / 180;
/** Fourth-order differences over this step err by less than 1e-12 in scale. */
const STEP_DEG = 0.05;

/**
 * Point scale factor and convergence of a projection at a place, by differences of fourth order (Abramowitz & Stegun
 * 25.3.6): 1e-11 in scale, 1e-9° in convergence. `scale` is the geometric mean of the two directions.
 * @throws RangeError within 0.1° of a pole, Error where the projection does not reach.
 */
export function pointScale(projection: Projection, place: Geographic): PointScale {
  const { latitudeDeg, longitudeDeg } = place;
  if (!(Math.abs(latitudeDeg) <= 90 - 2 * STEP_DEG))
    throw new RangeError(
      `latitudeDeg: expected a place more than ${2 * STEP_DEG} degrees from a pole, received ${latitudeDeg}`,
    );
  const north = slope((step) => projection.forward({ latitudeDeg: latitudeDeg + step, longitudeDeg }));
  const east = slope((step) => projection.forward({ latitudeDeg, longitudeDeg: longitudeDeg + step }));
  const meridianScale =
    Math.hypot(north.eastingM, north.northingM) / meridianRadiusM(latitudeDeg, projection.ellipsoid);
  const parallelScale =
    Math.hypot(east.eastingM, east.northingM) /
    (primeVerticalRadiusM(latitudeDeg, projection.ellipsoid) * Math.cos(latitudeDeg * DEG));
  return {
    scale: Math.sqrt(meridianScale * parallelScale),
    meridianScale,
    parallelScale,
    convergenceDeg: 0 - Math.atan2(north.eastingM, north.northingM) / DEG,
  };
}

/** Metres per radian. */
function slope(at: (stepDeg: number) => PlanePosition): PlanePosition {
  const [a, b, c, d] = [at(-2 * STEP_DEG), at(-STEP_DEG), at(STEP_DEG), at(2 * STEP_DEG)] as const;
  const of = (key: keyof PlanePosition) =>
    (8 * (c[key] - b[key]) - (d[key] - a[key])) / (12 * STEP_DEG * DEG);
  return { eastingM: of('eastingM'), northingM: of('northingM') };
}
