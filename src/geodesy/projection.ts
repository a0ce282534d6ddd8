import proj4 from 'proj4';
import type { Ellipsoid } from './ellipsoid.js';
import { ellipsoidOfParameters } from './ellipsoidOfParameters.js';
import { wrappedLongitude } from './longitude.js';
import { checkedDefinition } from './projectionDefinition.js';
import { finitePoint, type Point, type PointMapping, refinedInverse } from './projectionInverse.js';

/** A place on an ellipsoid without its height, degrees; longitudes from Greenwich. */
export interface Geographic {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
}

/** A place on a projection plane, metres. */
export interface PlanePosition {
  readonly eastingM: number;
  readonly northingM: number;
}

/** A map projection on the ellipsoid its definition states. */
export interface Projection {
  readonly definition: string;
  /** The ellipsoid that is projected; a sphere has the inverse flattening Infinity. */
  readonly ellipsoid: Ellipsoid;
  /** @throws RangeError for a latitude beyond ±90° or a longitude beyond ±360°, Error when the place cannot be projected. */
  forward(place: Geographic): PlanePosition;
  /** Longitude in (−180, 180]. @throws Error when the position is not on the projection. */
  inverse(position: PlanePosition): Geographic;
}

/** What is used of the projection library's own projection object: radians in, metres out. */
interface PlaneMath {
  readonly from_greenwich?: number;
  readonly forward: PointMapping;
  readonly inverse: PointMapping;
}

const DEG = Math.PI / 180;

function found(point: Point | undefined, definition: string, what: string): Point {
  if (!point)
    throw new Error(
      `${what} cannot be computed with the projection "${definition}": it is outside its reach`,
    );
  return point;
}

/** The parameters of a definition that give its ellipsoid. */
function shapeOf(definition: string): string {
  return definition
    .split(' ')
    .filter((parameter) => /^\+(ellps|datum|a|b|rf|r|r_a)(=|$)/i.test(parameter))
    .join(' ');
}

/**
 * Map projection from a proj string (`+proj=utm +zone=31 +ellps=WGS84`) or a code of the EPSG register (`EPSG:32631`;
 * see `crsDefinition` for its unit, axes and frame).
 *
 * Only the projection on the stated ellipsoid is computed, by proj4. Changes of frame are never done here: `+towgs84`,
 * `+nadgrids` and the shift of a named `+datum` are left aside knowingly (of `+datum` the ellipsoid is kept).
 * Results are metres whatever `+units` or `+to_meter` say; `+x_0` and `+y_0` are metres, as in every proj string.
 * `+axis` is left aside too: easting is east, northing is north. Longitudes count from Greenwich, also with `+pm`.
 * @throws Error for a definition that is unknown, malformed, or no map projection (geographic or geocentric).
 */
export function projection(definition: string): Projection {
  const checked = checkedDefinition(definition);
  const math = new proj4.Proj(checked) as unknown as PlaneMath;
  // the library writes its answer into the point it is given
  const forward: PointMapping = ({ x, y }) => math.forward({ x, y });
  const inverse: PointMapping = ({ x, y }) => math.inverse({ x, y });
  const primeMeridian = math.from_greenwich ?? 0;
  return {
    definition,
    ellipsoid: ellipsoidOfParameters(shapeOf(checked)),
    forward: ({ latitudeDeg, longitudeDeg }) => {
      if (!(Math.abs(latitudeDeg) <= 90))
        throw new RangeError(`latitudeDeg: expected -90 to 90, received ${latitudeDeg}`);
      if (!(Math.abs(longitudeDeg) <= 360))
        throw new RangeError(`longitudeDeg: expected -360 to 360, received ${longitudeDeg}`);
      const longitude = wrappedLongitude(longitudeDeg - primeMeridian / DEG) * DEG;
      const what = `latitude ${latitudeDeg}, longitude ${longitudeDeg}`;
      const { x, y } = found(finitePoint(forward({ x: longitude, y: latitudeDeg * DEG })), definition, what);
      return { eastingM: x, northingM: y };
    },
    inverse: ({ eastingM, northingM }) => {
      const what = `easting ${eastingM}, northing ${northingM}`;
      const { x, y } = found(
        refinedInverse(forward, inverse, { x: eastingM, y: northingM }),
        definition,
        what,
      );
      return { latitudeDeg: y / DEG, longitudeDeg: wrappedLongitude((x + primeMeridian) / DEG) };
    },
  };
}
