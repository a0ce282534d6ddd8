export { type Baseline, baselineBetween } from './baseline.js';
export type { Geocentric, Geodetic, LocalVector } from './coordinates.js';
export { type CrsDefinition, type CrsKind, crsDefinition, crsOfKind } from './crs/index.js';
export {
  type Ellipsoid,
  ellipsoid,
  GRS80,
  meridianRadiusM,
  primeVerticalRadiusM,
  WGS84,
} from './ellipsoid.js';
export { geocentricToGeodetic, geodeticToGeocentric } from './geocentric.js';
export { distanceErrorMm, type LengthUnit, metresPer } from './lengthUnits.js';
export { type LocalFrame, localFrame } from './localFrame.js';
export { type Geographic, type PlanePosition, type Projection, projection } from './projection.js';
