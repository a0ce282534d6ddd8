import type { Geographic } from '../../geodesy/index.js';
import { type TimeScheme, tecAt } from './tecAt.js';
import type { TecMaps } from './tecMaps.js';

/** Slope of vertical TEC at a site. A kilometre is one on the shell, so that it compares with pierce points. */
export interface TecGradient {
  /** TECU per km towards north; NaN where the maps give none. */
  readonly northTecuPerKm: number;
  /** TECU per km towards east. */
  readonly eastTecuPerKm: number;
}

const RADIANS = Math.PI / 180;

/**
 * Gradient of vertical TEC: central difference over one step of the grid in each direction, half of it to either side,
 * so that it does not jump where a bilinear surface has its edges. Features smaller than the grid (some 280 km by 350 km
 * at middle latitudes) are not in a map, so that real gradients over a baseline can be many times steeper.
 */
export function tecGradientAt(
  maps: TecMaps,
  utcMs: number,
  { latitudeDeg, longitudeDeg }: Geographic,
  scheme: TimeScheme = 'rotated',
): TecGradient {
  const kmPerDegree = (maps.baseRadiusKm + maps.shellHeightKm) * RADIANS;
  const half = (nodes: Float64Array): number => Math.abs(nodes[1]! - nodes[0]!) / 2;
  const [north, east] = [half(maps.latitudesDeg), half(maps.longitudesDeg)];
  const at = (latitude: number, longitude: number): number =>
    tecAt(maps, utcMs, { latitudeDeg: latitude, longitudeDeg: longitude }, scheme);
  const northward = at(latitudeDeg + north, longitudeDeg) - at(latitudeDeg - north, longitudeDeg);
  const eastward = at(latitudeDeg, longitudeDeg + east) - at(latitudeDeg, longitudeDeg - east);
  return {
    northTecuPerKm: northward / (2 * north * kmPerDegree),
    eastTecuPerKm: eastward / (2 * east * kmPerDegree * Math.cos(latitudeDeg * RADIANS)),
  };
}

/** Gradient along a direction, TECU per km. */
export function gradientAlong({ northTecuPerKm, eastTecuPerKm }: TecGradient, azimuthDeg: number): number {
  const azimuth = azimuthDeg * RADIANS;
  return northTecuPerKm * Math.cos(azimuth) + eastTecuPerKm * Math.sin(azimuth);
}

/** Steepest gradient over all directions, TECU per km. */
export const steepestGradient = ({ northTecuPerKm, eastTecuPerKm }: TecGradient): number =>
  Math.hypot(northTecuPerKm, eastTecuPerKm);
