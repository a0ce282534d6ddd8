/**
 * Maps of the vertical total electron content on one thin shell. The values of a map stand latitude by latitude, as the
 * file does: value (i, j) at `i * longitudesDeg.length + j`.
 */
export interface TecMaps {
  /** System or data the maps were made from, as the file says: GPS, GNSS, … */
  readonly system: string;
  /** UTC milliseconds of each map, ascending. */
  readonly epochsMs: Float64Array;
  /** Evenly spaced, in either direction; at least two. */
  readonly latitudesDeg: Float64Array;
  readonly longitudesDeg: Float64Array;
  /** Height of the shell above the base radius, km. */
  readonly shellHeightKm: number;
  readonly baseRadiusKm: number;
  /** One array a map, TECU; NaN where the file has no value. */
  readonly tec: readonly Float64Array[];
  /** Root-mean-square error of each map's values, TECU; null where the file has none. */
  readonly rms: readonly (Float64Array | null)[];
  /** Height of the shell at each node, km; null where the file has none. */
  readonly heights: readonly (Float64Array | null)[];
  /** As the file states: NONE, COSZ, QFAC; blank when it does not. */
  readonly mappingFunction: string;
  /** Lowest elevation of the data behind the maps, degrees; NaN when not stated. */
  readonly elevationCutoffDeg: number;
  /** Stated time between maps, s; 0 for varying or not stated. */
  readonly intervalSeconds: number;
}
