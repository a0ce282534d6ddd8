import type { Geocentric } from './coordinates.js';
import { type HelmertParameters, type SevenValues, sevenValues, type Triple } from './helmertParameters.js';
import { inverse3, type Matrix3, times3, transposed3 } from './matrix3.js';

/** A change of frame. Both ways ask for the year of the coordinates when the parameters have rates. */
export interface FrameTransformation {
  readonly dependsOnTime: boolean;
  forward(c: Geocentric, year?: number): Geocentric;
  /** The way back, exact: what `forward` made of a position gives that position to the rounding of a float. */
  inverse(c: Geocentric, year?: number): Geocentric;
  /** Parts per million that lengths grow by. */
  scalePpmAt(year?: number): number;
}

/** Shift and scaled rotation that hold for one year. */
interface Map3 {
  readonly shiftM: Triple;
  readonly forward: Matrix3;
  readonly inverse: Matrix3;
}

/**
 * Similarity transformation in geocentric coordinates by 7 parameters, or by 14 with rates per year: X' = T + (1 + s) R X,
 * with each parameter p + ṗ (t − t₀) (EPSG guidance note 7-2, methods 1032, 1033, 1053, 1056).
 *
 * With rates, `year` is the epoch of the coordinates; forward and inverse of the same year undo each other. Coordinates
 * are not moved in time by it: `movedInTime` does that.
 * @throws RangeError for parameters that are not finite, doubly given, or lack a convention or reference year.
 */
export function frameTransformation(parameters: HelmertParameters): FrameTransformation {
  const values = sevenValues(parameters, 'transformation');
  const rates = parameters.rates && sevenValues(parameters.rates, 'transformation.rates');
  checkWhole(parameters, values, rates);
  let lastYear: number | undefined;
  let last: Map3 | undefined;
  const at = (year: number | undefined): Map3 => {
    if (last && (!rates || year === lastYear)) return last;
    last = mapOf(valuesAt(values, rates, parameters.referenceYear, year), parameters);
    lastYear = year;
    return last;
  };
  return {
    dependsOnTime: rates !== undefined,
    forward: (c, year) => {
      const { shiftM, forward } = at(year);
      const [x, y, z] = times3(forward, c.xM, c.yM, c.zM);
      return { xM: x + shiftM[0], yM: y + shiftM[1], zM: z + shiftM[2] };
    },
    inverse: (c, year) => {
      const { shiftM, inverse } = at(year);
      const [xM, yM, zM] = times3(inverse, c.xM - shiftM[0], c.yM - shiftM[1], c.zM - shiftM[2]);
      return { xM, yM, zM };
    },
    scalePpmAt: (year) => valuesAt(values, rates, parameters.referenceYear, year).scale * 1e6,
  };
}

function checkWhole(
  parameters: HelmertParameters,
  values: SevenValues,
  rates: SevenValues | undefined,
): void {
  const turns = [...values.rotationRad, ...(rates?.rotationRad ?? [])].some((angle) => angle !== 0);
  if (turns && parameters.convention === undefined)
    throw new RangeError(
      'transformation.convention: expected position-vector or coordinate-frame, received none; rotations have opposite signs in the two',
    );
  if (rates && !Number.isFinite(parameters.referenceYear))
    throw new RangeError(
      `transformation.referenceYear: expected the decimal year that the parameters hold for, received ${parameters.referenceYear ?? 'none'}`,
    );
}

function valuesAt(
  values: SevenValues,
  rates: SevenValues | undefined,
  referenceYear: number | undefined,
  year: number | undefined,
): SevenValues {
  if (!rates) return values;
  if (year === undefined || !Number.isFinite(year))
    throw new RangeError(
      `year: expected the decimal year of the coordinates, received ${year ?? 'none'}; this transformation changes with time`,
    );
  const years = year - (referenceYear as number);
  const moved = (a: Triple, b: Triple): Triple => [
    a[0] + b[0] * years,
    a[1] + b[1] * years,
    a[2] + b[2] * years,
  ];
  return {
    shiftM: moved(values.shiftM, rates.shiftM),
    rotationRad: moved(values.rotationRad, rates.rotationRad),
    scale: values.scale + rates.scale * years,
  };
}

function mapOf({ shiftM, rotationRad, scale }: SevenValues, parameters: HelmertParameters): Map3 {
  const frame = parameters.rotation === 'small-angle' ? smallAngles(rotationRad) : eulerMatrix(rotationRad);
  const rotation = parameters.convention === 'coordinate-frame' ? frame : transposed3(frame);
  const forward = rotation.map((value) => value * (1 + scale));
  return { shiftM, forward, inverse: inverse3(forward) };
}

/** Turns the axes: first about x, then about y, then about z. */
function eulerMatrix([rx, ry, rz]: Triple): Matrix3 {
  const [sx, sy, sz] = [Math.sin(rx), Math.sin(ry), Math.sin(rz)];
  const [cx, cy, cz] = [Math.cos(rx), Math.cos(ry), Math.cos(rz)];
  return [
    cy * cz,
    cx * sz + sx * sy * cz,
    sx * sz - cx * sy * cz,
    -cy * sz,
    cx * cz - sx * sy * sz,
    sx * cz + cx * sy * sz,
    sy,
    -sx * cy,
    cx * cy,
  ];
}

function smallAngles([rx, ry, rz]: Triple): Matrix3 {
  return [1, rz, -ry, -rz, 1, rx, ry, -rx, 1];
}
