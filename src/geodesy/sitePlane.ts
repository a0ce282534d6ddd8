import type { PlanePosition } from './projection.js';

/** How a job's coordinates were fitted to its site marks: a plane similarity, and for heights a tilted shift. */
export interface SitePlaneParameters {
  /** Pivot of rotation, scale and tilts, in the source plane; default its origin. */
  readonly aboutEastingM?: number;
  readonly aboutNorthingM?: number;
  /** Move of the pivot: target minus source. */
  readonly shiftEastingM?: number;
  readonly shiftNorthingM?: number;
  /** Clockwise, as bearings are counted: positive makes bearings grow, so a point north of the pivot goes east. */
  readonly rotationArcSeconds?: number;
  /** Lengths in the target over lengths in the source, less 1, parts per million. */
  readonly scalePpm?: number;
  /** Added to heights at the pivot. */
  readonly heightShiftM?: number;
  /** Added to heights for every kilometre to the east, or to the north, of the pivot (source plane), mm. 1″ is 4.848 mm/km. */
  readonly tiltEastMmPerKm?: number;
  readonly tiltNorthMmPerKm?: number;
}

/** A position on a plane with its height, metres. */
export interface SitePosition extends PlanePosition {
  readonly heightM: number;
}

/** Both ways between the plane of a projection (source) and that of the job (target), exact. */
export interface SitePlane {
  readonly scalePpm: number;
  forward(position: SitePosition): SitePosition;
  /** From the job's coordinates back to the projection. A height of NaN stays NaN and harms nothing else. */
  undo(position: SitePosition): SitePosition;
}

/**
 * Plane transformation of a job, four parameters for the plane and three for heights:
 * E' = E₀ + ΔE + s (cos θ · e + sin θ · n), N' = N₀ + ΔN + s (cos θ · n − sin θ · e), H' = H + ΔH + tₑ e + tₙ n,
 * with e = E − E₀, n = N − N₀.
 * @throws RangeError for numbers that are not finite and for a scale that is not positive.
 */
export function sitePlane(parameters: SitePlaneParameters): SitePlane {
  const {
    aboutEastingM = 0,
    aboutNorthingM = 0,
    shiftEastingM = 0,
    shiftNorthingM = 0,
    rotationArcSeconds = 0,
    scalePpm = 0,
    heightShiftM = 0,
    tiltEastMmPerKm = 0,
    tiltNorthMmPerKm = 0,
  } = parameters;
  for (const [name, value] of Object.entries(parameters))
    if (value !== undefined && !Number.isFinite(value))
      throw new RangeError(`${name}: expected a finite number, received ${value}`);
  if (!(scalePpm > -1e6)) throw new RangeError(`scalePpm: expected more than -1000000, received ${scalePpm}`);
  const angle = (rotationArcSeconds / 3600 / 180) * Math.PI;
  const scale = 1 + scalePpm * 1e-6;
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
  const rise = (east: number, north: number) =>
    heightShiftM + (tiltEastMmPerKm * east + tiltNorthMmPerKm * north) * 1e-6;
  return {
    scalePpm,
    forward: ({ eastingM, northingM, heightM }) => {
      const [east, north] = [eastingM - aboutEastingM, northingM - aboutNorthingM];
      return {
        eastingM: aboutEastingM + shiftEastingM + scale * (cosine * east + sine * north),
        northingM: aboutNorthingM + shiftNorthingM + scale * (cosine * north - sine * east),
        heightM: heightM + rise(east, north),
      };
    },
    undo: ({ eastingM, northingM, heightM }) => {
      const across = (eastingM - shiftEastingM - aboutEastingM) / scale;
      const along = (northingM - shiftNorthingM - aboutNorthingM) / scale;
      const [east, north] = [cosine * across - sine * along, cosine * along + sine * across];
      return {
        eastingM: aboutEastingM + east,
        northingM: aboutNorthingM + north,
        heightM: heightM - rise(east, north),
      };
    },
  };
}
