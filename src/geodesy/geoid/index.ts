export { type EstimatedSlope, estimatedSlope, type SeparationPoint } from './estimatedSlope.js';
export { type GeoidGrid, type GeoidSlope, geoidGrid } from './geoidGrid.js';
