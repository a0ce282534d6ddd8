import type { Ellipsoid, Geodetic, SitePosition } from '../geodesy/index.js';

/**
 * What must be done to the coordinates of one source (a log, the marks, the bases) so that they can be compared with
 * those of the others. Each step is stated by the study file; none is guessed.
 */
export interface CoordinateChanges {
  /** Undoes what a job did to plane coordinates: a ground grid, a local transformation. */
  readonly plane?: ((position: SitePosition) => SitePosition) | undefined;
  /**
   * Height as written → height of the kind that the study compares.
   * @param separationM geoid separation of the row itself; NaN when it gives none
   * @throws CoordinateFault when no separation is known there
   */
  readonly height?: ((place: Geodetic, separationM: number) => number) | undefined;
  /** Geoid separation of a place, for NMEA sentences that give none. @throws CoordinateFault where it is not known */
  readonly separation?: ((place: Geodetic) => number) | undefined;
  /** The rows themselves give geoid separations. */
  readonly rowSeparations?: boolean | undefined;
  /** Frame of the source, on its ellipsoid → frame of the study, on that of WGS 84. */
  readonly frame?: ((place: Geodetic, ellipsoid: Ellipsoid) => Geodetic) | undefined;
}

/** Applies height and frame to a place; what is not known stays so. */
export function changedPlace(
  place: Geodetic,
  separationM: number,
  { height, frame }: CoordinateChanges,
  ellipsoid: Ellipsoid,
): Geodetic {
  const known = !Number.isNaN(place.heightM);
  const levelled = height !== undefined && known ? { ...place, heightM: height(place, separationM) } : place;
  if (frame === undefined) return levelled;
  const moved = frame(known ? levelled : { ...levelled, heightM: 0 }, ellipsoid);
  return known ? moved : { ...moved, heightM: Number.NaN };
}
