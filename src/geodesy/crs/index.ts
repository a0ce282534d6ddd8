export { type CrsDefinition, type CrsKind, crsDefinition, crsOfKind } from './crsDefinition.js';
