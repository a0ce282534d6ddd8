/** Position on an ellipsoid: degrees north and east, metres above the ellipsoid along its normal. */
export interface Geodetic {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
}

/** Earth-centred, earth-fixed Cartesian coordinates (or a difference of such), metres. */
export interface Geocentric {
  readonly xM: number;
  readonly yM: number;
  readonly zM: number;
}

/** Vector in the horizon of a point: along its parallel, its meridian and its ellipsoidal normal, metres. */
export interface LocalVector {
  readonly eastM: number;
  readonly northM: number;
  readonly upM: number;
}
