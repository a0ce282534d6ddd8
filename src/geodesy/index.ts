export { type Baseline, baselineBetween } from './baseline.js';
export {
  type CombinedFactor,
  combinedFactor,
} from './combinedFactor.js';
export type { Geocentric, Geodetic, LocalVector } from './coordinates.js';
export { type CrsDefinition, type CrsKind, crsDefinition } from './crs/index.js';
export {
  type Ellipsoid,
  WGS84,
} from './ellipsoid.js';
export { type FrameDifference, frameDifference } from './frameDifference.js';
export { geocentricToGeodetic, geodeticToGeocentric } from './geocentric.js';
export { type Geodesic, geodesicBetween } from './geodesic.js';
export {
  type GeographicProblem,
  type GeographicProblemKind,
  geographicProblem,
} from './geographicProblem.js';
export {
  type EstimatedSlope,
  estimatedSlope,
  type GeoidGrid,
  type GeoidSlope,
  geoidGrid,
  type SeparationPoint,
} from './geoid/index.js';
export { type GroundGridParameters, groundGrid, type PlaneMapping } from './groundGrid.js';
export { type FrameTransformation, frameTransformation } from './helmert.js';
export type { HelmertParameters, HelmertSet, RotationConvention, Triple } from './helmertParameters.js';
export { type LengthUnit, metresPer } from './lengthUnits.js';
export { type LineLengths, lineLengths } from './lineLengths.js';
export { type LocalFrame, localFrame } from './localFrame.js';

export {
  type GeocentricVelocity,
  geocentricVelocity,
  type LocalVelocity,
  movedInTime,
} from './movedInTime.js';
export { type PointScale, pointScale } from './pointScale.js';
export { type Geographic, type PlanePosition, type Projection, projection } from './projection.js';
export { type SitePlane, type SitePlaneParameters, type SitePosition, sitePlane } from './sitePlane.js';
