import { type Geodetic, WGS84 } from '../geodesy/index.js';
import { type CoordinateChanges, changedPlace } from './coordinateChanges.js';
import { coordinateColumns } from './coordinateColumns.js';

const { toGeodetic } = coordinateColumns('geographic');

/**
 * What brings the base's coordinates in the field (degrees, WGS 84, height of the kind of the log's own) to what the
 * study compares. Where separations stand in the rows they are those of the rover and not of the base: its height is
 * then not known.
 * @returns a function that throws CoordinateFault for coordinates that cannot be
 */
export function fieldBasePlace(changes: CoordinateChanges): (place: Geodetic) => Geodetic {
  const known = changes.rowSeparations !== true;
  return ({ latitudeDeg, longitudeDeg, heightM }) =>
    changedPlace(
      toGeodetic(latitudeDeg, longitudeDeg, known ? heightM : Number.NaN),
      Number.NaN,
      changes,
      WGS84,
    );
}
