/** A pair of coordinates: longitude and latitude in radians, or easting and northing in metres. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A map projection or its inverse; nothing, NaN or infinity where it has no answer. */
export type PointMapping = (point: Point) => Point | null | undefined;

/** An inverse this near is as good as the rounding of a log's coordinates. */
const GOOD_M = 1e-6;
/** A position that cannot be reached nearer than this is not on the projection. */
const REACHED_M = 1e-3;
const MAX_STEPS = 5;
const STEP_RAD = 1e-6;

/** The point if it is finite and on the plane within 1e9 m (beyond lie only the poles of a projection). */
export function finitePoint(point: Point | null | undefined): Point | undefined {
  return point && Math.abs(point.x) < 1e9 && Math.abs(point.y) < 1e9 ? point : undefined;
}

/** Newton's step for forward(place) = place's image plus (dx, dy), with slopes by differences. */
function newtonStep(
  forward: PointMapping,
  place: Point,
  image: Point,
  dx: number,
  dy: number,
): Point | undefined {
  const east = forward({ x: place.x + STEP_RAD, y: place.y });
  const north = forward({ x: place.x, y: place.y + STEP_RAD });
  if (!east || !north) return undefined;
  const [exx, exy] = [(east.x - image.x) / STEP_RAD, (east.y - image.y) / STEP_RAD];
  const [nxx, nxy] = [(north.x - image.x) / STEP_RAD, (north.y - image.y) / STEP_RAD];
  const determinant = exx * nxy - exy * nxx;
  return {
    x: place.x + (dx * nxy - dy * nxx) / determinant,
    y: place.y + (dy * exx - dx * exy) / determinant,
  };
}

/**
 * Inverse of a projection that holds to `forward`: the series of a published inverse may be short by fractions of a
 * millimetre, or give an answer where there is none. The answer is projected again and improved by Newton steps until it
 * stands within a micrometre.
 * @returns longitude and latitude in radians, or undefined when the position is not on the projection.
 */
export function refinedInverse(
  forward: PointMapping,
  inverse: PointMapping,
  target: Point,
): Point | undefined {
  let place = finitePoint(inverse(target));
  let best: Point | undefined;
  let bestDistance = REACHED_M;
  for (let i = 0; i <= MAX_STEPS && place; i += 1) {
    const image = finitePoint(forward(place));
    if (!image) break;
    const [dx, dy] = [target.x - image.x, target.y - image.y];
    const distance = Math.hypot(dx, dy);
    if (!(distance < bestDistance) && best) break;
    if (distance < bestDistance) {
      best = place;
      bestDistance = distance;
    }
    if (distance < GOOD_M) break;
    place = finitePoint(newtonStep(forward, place, image, dx, dy));
  }
  return best;
}
