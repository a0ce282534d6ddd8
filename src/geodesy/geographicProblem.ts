import { WGS84 } from './ellipsoid.js';
import { wrappedLongitude } from './longitude.js';
import type { Geographic } from './projection.js';

export type GeographicProblemKind =
  | 'not-a-number'
  | 'out-of-range'
  | 'zero'
  | 'swapped'
  | 'longitude-sign'
  | 'latitude-sign'
  | 'radians'
  | 'far-away';

/** Why a latitude and a longitude cannot be what was meant. */
export interface GeographicProblem {
  readonly kind: GeographicProblemKind;
  /** Full sentences: what was expected, what came, what to do. */
  readonly text: string;
}

const DEG = Math.PI / 180;
/** Other readings are looked for only beyond this, and must then lie within it. */
const NEAR_KM = 200;

/** What may have happened to coordinates on their way, with what undoes it. */
const READINGS: readonly (readonly [GeographicProblemKind, string, (place: Geographic) => Geographic])[] = [
  [
    'swapped',
    'latitude and longitude are probably exchanged: exchange their columns',
    ({ latitudeDeg, longitudeDeg }) => ({ latitudeDeg: longitudeDeg, longitudeDeg: latitudeDeg }),
  ],
  [
    'longitude-sign',
    'the sign of the longitude is probably wrong: west is negative',
    ({ latitudeDeg, longitudeDeg }) => ({ latitudeDeg, longitudeDeg: -longitudeDeg }),
  ],
  [
    'latitude-sign',
    'the sign of the latitude is probably wrong: south is negative',
    ({ latitudeDeg, longitudeDeg }) => ({ latitudeDeg: -latitudeDeg, longitudeDeg }),
  ],
  [
    'radians',
    'these are probably radians: turn them into degrees',
    ({ latitudeDeg, longitudeDeg }) => ({ latitudeDeg: latitudeDeg / DEG, longitudeDeg: longitudeDeg / DEG }),
  ],
];

/**
 * What is wrong with a place in degrees, or undefined. Longitudes from −180 to 360 are right (`wrappedLongitude` brings them
 * into one turn). With a place that must be near, such as the base, also: exchanged, signs, radians, or simply far away.
 * @param withinKm how far from `near` a place may be; default 200.
 */
export function geographicProblem(
  place: Geographic,
  near?: Geographic,
  withinKm: number = NEAR_KM,
): GeographicProblem | undefined {
  const { latitudeDeg, longitudeDeg } = place;
  const came = `latitude ${latitudeDeg}, longitude ${longitudeDeg}`;
  if (!Number.isFinite(latitudeDeg) || !Number.isFinite(longitudeDeg))
    return {
      kind: 'not-a-number',
      text: `Expected a latitude and a longitude in degrees, received ${came}.`,
    };
  const inRange = isOnEarth(place);
  const distance = near && inRange ? distanceKm(place, near) : undefined;
  if (distance !== undefined && distance <= withinKm) return undefined;
  if (near)
    for (const [kind, advice, mended] of READINGS) {
      const other = mended(place);
      if (isOnEarth(other) && distanceKm(other, near) <= withinKm)
        return {
          kind,
          text: `Expected a place within ${withinKm} km of ${shown(near)}, received ${came}; ${advice}.`,
        };
    }
  if (!inRange) return outOfRange(place, came);
  if (latitudeDeg === 0 && longitudeDeg === 0)
    return {
      kind: 'zero',
      text: 'Expected a place, received latitude 0, longitude 0: probably a position that was not known when it was written.',
    };
  if (near && distance !== undefined)
    return {
      kind: 'far-away',
      text: `Expected a place within ${withinKm} km of ${shown(near)}, received ${came}, which is ${Math.round(distance)} km away; check both.`,
    };
  return undefined;
}

function outOfRange({ latitudeDeg, longitudeDeg }: Geographic, came: string): GeographicProblem {
  const exchanged = isOnEarth({ latitudeDeg: longitudeDeg, longitudeDeg: latitudeDeg });
  return exchanged
    ? {
        kind: 'swapped',
        text: `Expected a latitude from -90 to 90, received ${came}; ${READINGS[0]![1]}.`,
      }
    : {
        kind: 'out-of-range',
        text: `Expected a latitude from -90 to 90 and a longitude from -180 to 360 degrees, received ${came}; state the units if they are metres or degrees and minutes.`,
      };
}

function isOnEarth({ latitudeDeg, longitudeDeg }: Geographic): boolean {
  return Math.abs(latitudeDeg) <= 90 && longitudeDeg >= -180 && longitudeDeg <= 360;
}

function shown({ latitudeDeg, longitudeDeg }: Geographic): string {
  return `latitude ${latitudeDeg}, longitude ${longitudeDeg}`;
}

/** On a sphere, by the haversine: good to half a percent. */
function distanceKm(a: Geographic, b: Geographic): number {
  const half = (degrees: number) => Math.sin((degrees * DEG) / 2) ** 2;
  const h =
    half(b.latitudeDeg - a.latitudeDeg) +
    Math.cos(a.latitudeDeg * DEG) *
      Math.cos(b.latitudeDeg * DEG) *
      half(wrappedLongitude(b.longitudeDeg - a.longitudeDeg));
  return (2 * WGS84.semiMajorAxisM * Math.asin(Math.min(1, Math.sqrt(h)))) / 1000;
}
