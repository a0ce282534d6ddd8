import type { Geodetic } from '../geodesy/index.js';

/** A place on a plane with its height, metres. */
export interface PlanePoint {
  readonly eastingM: number;
  readonly northingM: number;
  /** NaN when not known. */
  readonly heightM: number;
}

/**
 * What must be done to the coordinates of one source (a log, the marks, the bases) so that they can be compared with
 * those of the others. Each step is stated by the study file; none is guessed.
 */
export interface CoordinateChanges {
  /** Undoes what a job did to plane coordinates: a ground grid, a local transformation. */
  readonly plane?: ((point: PlanePoint) => PlanePoint) | undefined;
  /**
   * Height as written → height of the kind that the study compares.
   * @param separationM geoid separation of the row itself; NaN when it gives none
   * @throws CoordinateFault when no separation is known there
   */
  readonly height?: ((place: Geodetic, separationM: number) => number) | undefined;
  /** The rows themselves give geoid separations. */
  readonly rowSeparations?: boolean | undefined;
  /** Frame of the source → frame of the study; null for a study of orthometric heights, which a frame does not move. */
  readonly frame?: ((place: Geodetic) => Geodetic) | undefined;
}

/** Applies height and frame to a place; what is not known stays so. */
export function changedPlace(
  place: Geodetic,
  separationM: number,
  { height, frame }: CoordinateChanges,
): Geodetic {
  const known = !Number.isNaN(place.heightM);
  const levelled = height !== undefined && known ? { ...place, heightM: height(place, separationM) } : place;
  if (frame === undefined) return levelled;
  const moved = frame(known ? levelled : { ...levelled, heightM: 0 });
  return known ? moved : { ...moved, heightM: Number.NaN };
}
