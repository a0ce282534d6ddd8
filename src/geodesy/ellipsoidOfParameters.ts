import proj4 from 'proj4';
import { type Ellipsoid, ellipsoid } from './ellipsoid.js';

/** What the projection library reads from a definition. */
interface Axes {
  readonly a: number;
  readonly b: number;
  readonly rf?: number;
}

/** The ellipsoid that the parameters of a proj string give, e.g. `+ellps=bessel`; a sphere has 1/f Infinity. */
export function ellipsoidOfParameters(parameters: string): Ellipsoid {
  const { a, b, rf } = new proj4.Proj(`+proj=longlat ${parameters}`) as unknown as Axes;
  const name = /\+ellps=(\S+)/.exec(parameters)?.[1] ?? parameters;
  // by the inverse flattening if one is stated: the library rounds some semi-minor axes
  return ellipsoid(name, a, rf ?? (a === b ? Number.POSITIVE_INFINITY : a / (a - b)));
}
