import { eigenSymmetric2, leastSquares } from '../../stats/index.js';
import { meridianRadiusM, primeVerticalRadiusM, WGS84 } from '../ellipsoid.js';
import { wrappedLongitude } from '../longitude.js';
import type { Geographic } from '../projection.js';
import type { GeoidSlope } from './geoidGrid.js';

/** A point whose ellipsoidal and orthometric heights are known; their difference is the separation. */
export interface SeparationPoint extends Geographic {
  readonly separationM: number;
}

/** A plane through separations. */
export interface EstimatedSlope extends GeoidSlope {
  /** Separation at the mean latitude and longitude of the points. */
  readonly middleM: number;
  readonly points: number;
  /** Root of the mean square of what the plane leaves, divisor points − 3, mm. Null with three points. */
  readonly residualMm: number | null;
}

const DEG = Math.PI / 180;
/** Points this narrow across, for their length, tell nothing of the slope across. */
const NARROW = 0.02;

/**
 * Slope of the geoid from three or more points with known separation, by least squares: what one constant separation does to
 * heights along a baseline.
 * @throws RangeError for fewer than three points, values that are not finite, and points almost on one line.
 */
export function estimatedSlope(points: readonly SeparationPoint[]): EstimatedSlope {
  if (points.length < 3)
    throw new RangeError(`points: expected at least three to lay a plane through, received ${points.length}`);
  const bad = points.findIndex((p) => ![p.latitudeDeg, p.longitudeDeg, p.separationM].every(Number.isFinite));
  if (bad >= 0)
    throw new RangeError(
      `points[${bad}]: expected latitude, longitude and separation, received ${JSON.stringify(points[bad])}`,
    );
  const { east, north } = planeKm(points);
  const moments = [dotOf(east, east), dotOf(east, north), dotOf(north, north)] as const;
  const { values } = eigenSymmetric2(moments);
  const spread = [...values].map((value) => Math.sqrt(Math.max(value, 0))).sort((a, b) => a - b);
  if (!(spread[0]! > NARROW * spread[1]!))
    throw new RangeError(
      'points: expected points that spread to the sides, received points almost on one line',
    );
  const ones = new Float64Array(points.length).fill(1);
  const y = Float64Array.from(points, ({ separationM }) => separationM * 1000);
  const { coefficients, residualSumOfSquares } = leastSquares([ones, east, north], y);
  const [middleMm = 0, eastMmPerKm = 0, northMmPerKm = 0] = coefficients;
  const freedom = points.length - 3;
  return {
    middleM: middleMm / 1000,
    eastMmPerKm,
    northMmPerKm,
    steepestMmPerKm: Math.hypot(eastMmPerKm, northMmPerKm),
    points: points.length,
    residualMm: freedom === 0 ? null : Math.sqrt(residualSumOfSquares / freedom),
  };
}

/** Kilometres east and north of the middle, on the parallel and meridian there. */
function planeKm(points: readonly Geographic[]): {
  readonly east: Float64Array;
  readonly north: Float64Array;
} {
  const first = points[0]!.longitudeDeg;
  const mean = (values: readonly number[]) =>
    values.reduce((total, value) => total + value, 0) / values.length;
  const latitude = mean(points.map(({ latitudeDeg }) => latitudeDeg));
  const turns = points.map(({ longitudeDeg }) => wrappedLongitude(longitudeDeg - first));
  const middle = mean(turns);
  const perEast = (primeVerticalRadiusM(latitude, WGS84) * Math.cos(latitude * DEG) * DEG) / 1000;
  const perNorth = (meridianRadiusM(latitude, WGS84) * DEG) / 1000;
  return {
    east: Float64Array.from(turns, (turn) => (turn - middle) * perEast),
    north: Float64Array.from(points, ({ latitudeDeg }) => (latitudeDeg - latitude) * perNorth),
  };
}

function dotOf(a: Float64Array, b: Float64Array): number {
  return a.reduce((total, value, i) => total + value * b[i]!, 0);
}
