import { SPEED_OF_LIGHT } from './delays.js';

/** The eight coefficients a navigation message carries for the ionosphere, in its units (s, semicircles). */
export interface KlobucharCoefficients {
  readonly alpha: readonly [number, number, number, number];
  readonly beta: readonly [number, number, number, number];
}

/** A receiver, the direction to a satellite (degrees) and the time. */
export interface KlobucharInput {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly azimuthDeg: number;
  readonly elevationDeg: number;
  /** Seconds of the day; GPS time in the standard, from which UTC differs by less than the model can tell. */
  readonly secondOfDay: number;
}

/** The model works in semicircles: 1 is 180 degrees. */
const DEGREES = 180;

/** Delay at night, s. */
const NIGHT_S = 5e-9;
/** 14:00 local time, the fixed hour of the greatest delay, s. */
const PEAK_S = 50_400;
const SHORTEST_PERIOD_S = 72_000;
const FARTHEST_LATITUDE = 0.416;

/**
 * Delay of the L1 code by the broadcast model, s (Klobuchar 1987, IEEE Trans. AES 23; IS-GPS-200, 20.3.3.5.2.5). The
 * model is a climate of coefficients that change every few days: it takes off about half of the delay, and knows no
 * storm.
 */
export function klobucharDelayS(input: KlobucharInput, { alpha, beta }: KlobucharCoefficients): number {
  const elevation = input.elevationDeg / DEGREES;
  const azimuth = (input.azimuthDeg / DEGREES) * Math.PI;
  const psi = 0.0137 / (elevation + 0.11) - 0.022;
  const latitude = clipped(input.latitudeDeg / DEGREES + psi * Math.cos(azimuth));
  const longitude = input.longitudeDeg / DEGREES + (psi * Math.sin(azimuth)) / Math.cos(latitude * Math.PI);
  const slant = 1 + 16 * (0.53 - elevation) ** 3;
  return slant * verticalS(latitude, longitude, input.secondOfDay, { alpha, beta });
}

/** Delay of the L1 code by the broadcast model, m. */
export const klobucharDelayM = (input: KlobucharInput, coefficients: KlobucharCoefficients): number =>
  SPEED_OF_LIGHT * klobucharDelayS(input, coefficients);

/** Vertical delay of the L1 code above a place by the broadcast model, m. */
export function klobucharVerticalM(
  latitudeDeg: number,
  longitudeDeg: number,
  secondOfDay: number,
  coefficients: KlobucharCoefficients,
): number {
  const latitude = clipped(latitudeDeg / DEGREES);
  return SPEED_OF_LIGHT * verticalS(latitude, longitudeDeg / DEGREES, secondOfDay, coefficients);
}

/** Vertical delay at a pierce point in semicircles, s. */
function verticalS(
  latitude: number,
  longitude: number,
  secondOfDay: number,
  { alpha, beta }: KlobucharCoefficients,
): number {
  const geomagnetic = latitude + 0.064 * Math.cos((longitude - 1.617) * Math.PI);
  const local = 43_200 * longitude + secondOfDay;
  const time = local - 86_400 * Math.floor(local / 86_400);
  const period = Math.max(SHORTEST_PERIOD_S, polynomial(beta, geomagnetic));
  const amplitude = Math.max(0, polynomial(alpha, geomagnetic));
  const x = (2 * Math.PI * (time - PEAK_S)) / period;
  if (Math.abs(x) >= 1.57) return NIGHT_S;
  return NIGHT_S + amplitude * (1 - x ** 2 / 2 + x ** 4 / 24);
}

const clipped = (latitude: number): number =>
  Math.min(FARTHEST_LATITUDE, Math.max(-FARTHEST_LATITUDE, latitude));

const polynomial = ([a, b, c, d]: readonly [number, number, number, number], x: number): number =>
  a + x * (b + x * (c + x * d));
