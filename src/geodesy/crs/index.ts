export { type CrsDefinition, type CrsKind, crsDefinition, crsOfKind } from './crsDefinition.js';
export { crsEllipsoid } from './crsEllipsoid.js';
