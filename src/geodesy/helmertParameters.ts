/** Three values along or about the geocentric x, y and z axes. */
export type Triple = readonly [number, number, number];

/**
 * Which way the rotations are counted. `position-vector`: positive rotations turn the position anticlockwise as seen
 * from the positive end of the axis towards the origin (EPSG methods 1033 and 1053); `coordinate-frame`: they turn the
 * axes that way, so the same transformation has rotations of opposite sign (EPSG 1032 and 1056).
 */
export type RotationConvention = 'position-vector' | 'coordinate-frame';

/** Shift, rotation and scale, each in one of the units that are published; what is left out is zero. */
export interface HelmertSet {
  /** Metres. */
  readonly shiftM?: Triple;
  readonly shiftMm?: Triple;
  readonly rotationArcSeconds?: Triple;
  /** Thousandths of an arc second. */
  readonly rotationMas?: Triple;
  /** Parts per million: positive makes lengths longer. */
  readonly scalePpm?: number;
  readonly scalePpb?: number;
}

/** Parameters of a change of frame in geocentric coordinates: 7, or 14 with rates. */
export interface HelmertParameters extends HelmertSet {
  /** Needed as soon as a rotation or its rate is not zero. */
  readonly convention?: RotationConvention;
  /** Changes per year. */
  readonly rates?: HelmertSet;
  /** Year (decimal) that the values hold for; needed with rates. */
  readonly referenceYear?: number;
  /**
   * `exact`: the rotation matrix R₃(rz) R₂(ry) R₁(rx) (coordinate frame), or its transpose (position vector).
   * `small-angle`: the matrix of the EPSG methods, 1 on the diagonal and the angles themselves beside it. They differ by
   * 0.1 mm on the earth's surface at 1.2″ and by 5 cm at 26″. Default `exact`.
   */
  readonly rotation?: 'exact' | 'small-angle';
}

/** The seven values in one set of units: metres, radians, and the scale's excess over 1. */
export interface SevenValues {
  readonly shiftM: Triple;
  readonly rotationRad: Triple;
  readonly scale: number;
}

const ARC_SECOND = Math.PI / 180 / 3600;

/**
 * Values in metres, radians and parts of 1.
 * @throws RangeError for a value that is not finite, is given twice in different units, or has not three parts.
 */
export function sevenValues(set: HelmertSet, what: string): SevenValues {
  const [tx = 0, ty = 0, tz = 0] = inUnits(set, what, 3, { shiftM: 1, shiftMm: 1e-3 });
  const [rx = 0, ry = 0, rz = 0] = inUnits(set, what, 3, {
    rotationArcSeconds: ARC_SECOND,
    rotationMas: ARC_SECOND / 1000,
  });
  const [scale = 0] = inUnits(set, what, 1, { scalePpm: 1e-6, scalePpb: 1e-9 });
  return { shiftM: [tx, ty, tz], rotationRad: [rx, ry, rz], scale };
}

/** The numbers that stand under one of the keys, times the key's factor; none if none of them is given. */
function inUnits(
  set: HelmertSet,
  what: string,
  count: 1 | 3,
  factors: Partial<Record<keyof HelmertSet, number>>,
): readonly number[] {
  const names = Object.keys(factors) as (keyof HelmertSet)[];
  const given = names.filter((name) => set[name] !== undefined);
  if (given.length > 1) throw new RangeError(`${what}: expected ${names.join(' or ')}, received both`);
  const [name] = given;
  if (name === undefined) return [];
  const values = [set[name]].flat() as readonly number[];
  if (values.length !== count || !values.every(Number.isFinite))
    throw new RangeError(
      `${what}.${name}: expected ${count === 1 ? 'a finite number' : 'three finite numbers'}, received ${values.join(', ')}`,
    );
  return values.map((value) => value * (factors[name] as number));
}
