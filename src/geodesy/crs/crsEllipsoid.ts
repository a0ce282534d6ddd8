import proj4 from 'proj4';
import { type Ellipsoid, ellipsoid } from '../ellipsoid.js';
import type { CrsDefinition } from './crsDefinition.js';

/** What is used of the projection library's own object. */
interface Shape {
  readonly a: number;
  readonly b: number;
  readonly rf?: number;
}

/** The ellipsoid beneath a code of the EPSG register. */
export function crsEllipsoid({ frame, projString }: CrsDefinition): Ellipsoid {
  const { a, b, rf } = new proj4.Proj(projString) as unknown as Shape;
  // By the inverse flattening where it is stated: the library rounds some semi-minor axes.
  return ellipsoid(`of ${frame}`, a, rf ?? (a === b ? Number.POSITIVE_INFINITY : a / (a - b)));
}
