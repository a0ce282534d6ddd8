import type { PlanePosition } from './projection.js';

/** How a job's ground coordinates were made from those of a projection. */
export interface GroundGridParameters {
  /** Ground length over grid length: one over the combined factor of the job's middle. */
  readonly factor: number;
  /** The point that scaling leaves where it is; default the origin of the plane. */
  readonly aboutEastingM?: number;
  readonly aboutNorthingM?: number;
  /** Added after scaling, e.g. −400 000 to cut coordinates short. Default 0. */
  readonly shiftEastingM?: number;
  readonly shiftNorthingM?: number;
}

/** Both ways between a projection's plane and another plane, exact. */
export interface PlaneMapping {
  forward(position: PlanePosition): PlanePosition;
  inverse(position: PlanePosition): PlanePosition;
}

/**
 * Ground grid of a job: E' = E₀ + f (E − E₀) + shift, and so for N. `forward` leads from the projection to the job.
 * @throws RangeError for a factor that is not positive or other numbers that are not finite.
 */
export function groundGrid(parameters: GroundGridParameters): PlaneMapping {
  const { factor, aboutEastingM = 0, aboutNorthingM = 0, shiftEastingM = 0, shiftNorthingM = 0 } = parameters;
  if (!(factor > 0 && Number.isFinite(factor)))
    throw new RangeError(`factor: expected a number above 0, near 1, received ${factor}`);
  for (const [name, value] of Object.entries({
    aboutEastingM,
    aboutNorthingM,
    shiftEastingM,
    shiftNorthingM,
  }))
    if (!Number.isFinite(value))
      throw new RangeError(`${name}: expected a finite number of metres, received ${value}`);
  return {
    forward: ({ eastingM, northingM }) => ({
      eastingM: aboutEastingM + factor * (eastingM - aboutEastingM) + shiftEastingM,
      northingM: aboutNorthingM + factor * (northingM - aboutNorthingM) + shiftNorthingM,
    }),
    inverse: ({ eastingM, northingM }) => ({
      eastingM: aboutEastingM + (eastingM - shiftEastingM - aboutEastingM) / factor,
      northingM: aboutNorthingM + (northingM - shiftNorthingM - aboutNorthingM) / factor,
    }),
  };
}
