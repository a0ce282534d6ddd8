import { baselineBetween } from '../geodesy/index.js';
import { type Message, message, quoted } from '../logs/index.js';
import type { Base, Bases } from './bases.js';
import { type FrameStatements, frameMessages } from './frames.js';
import { markNames } from './markNames.js';
import type { Marks } from './marks.js';

/** What the study file states of its coordinates as a whole. */
export interface ControlStatements extends FrameStatements {
  /** One geoid separation leads from one kind of height to the other. */
  readonly constantSeparation: boolean;
}

/** An error of the base's own coordinate over the distance of a satellite: 20 m make 1 ppm (common practice). */
const METRES_PER_PPM = 20;
/** Without a stated size an assumed coordinate is taken to be as good as a position without corrections. */
const ASSUMED_M = 5;
/** Slope of the geoid that is common, and one that is steep but not rare, mm per km. */
const GEOID_SLOPE = [10, 50] as const;
const SMALL_SITE_KM = 3;
/** No crew works so far from its base. */
const FARTHEST_KM = 200;

/**
 * What must be told of marks and bases before their coordinates are compared: frames or epochs that differ, coordinates
 * that come from the base itself, a base on an assumed coordinate, one geoid separation for a wide site.
 */
export function comparabilityMessages(
  marks: Marks,
  bases: Bases,
  { constantSeparation, ...frames }: ControlStatements,
): Message[] {
  return [
    ...frameMessages(marks, bases, frames),
    ...circularMessages(marks, bases),
    ...[...bases.values()].flatMap(assumedBase),
    ...farBases(marks, bases),
    ...(constantSeparation ? separationMessage(marks, bases) : []),
  ];
}

function circularMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.keys()].flatMap((base) => {
    const from = [...marks.values()].filter(({ versions }) =>
      versions.some(({ source }) => holdsName(source, base)),
    );
    if (from.length === 0) return [];
    return [
      message(
        'warning',
        'circular-control',
        `The coordinates of ${markNames(from)} are from base ${quoted(base)} itself, as their source says: an error that the base makes on all days is in both and cannot show. Use marks that were determined without this base for absolute errors.`,
      ),
    ];
  });
}

/** Whether a text such as `static from B1, 2023` holds a name as words of its own, in any case. */
function holdsName(text: string, name: string): boolean {
  const [plain, wanted] = [text.toLowerCase(), name.toLowerCase()];
  const isWord = (character: string | undefined): boolean =>
    character !== undefined && /[\p{L}\p{N}_-]/u.test(character);
  for (let at = plain.indexOf(wanted); at >= 0; at = plain.indexOf(wanted, at + 1)) {
    if (!isWord(plain[at - 1]) && !isWord(plain[at + wanted.length])) return true;
  }
  return false;
}

function assumedBase({ name, source, horizontalSigmaMm, verticalSigmaMm }: Base): Message[] {
  const stated = Math.hypot(horizontalSigmaMm || 0, horizontalSigmaMm || 0, verticalSigmaMm || 0) / 1000;
  const assumed = ['assumed', 'autonomous'].some((word) => holdsName(source, word));
  // Below 0.01 ppm nothing needs to be said.
  if (!assumed && stated < METRES_PER_PPM / 100) return [];
  const sizeM = stated > 0 ? stated : ASSUMED_M;
  const size =
    stated > 0
      ? `its stated uncertainty of ${sizeM.toFixed(2)} m`
      : `an uncertainty of ${ASSUMED_M} m, common for a position without corrections,`;
  const stands = assumed ? 'stands on an assumed coordinate' : 'is known poorly';
  return [
    message(
      'warning',
      'assumed-base',
      `Base ${quoted(name)} ${stands}: ${size} adds about ${(sizeM / METRES_PER_PPM).toFixed(2)} ppm to every baseline (common practice: metres / ${METRES_PER_PPM}), and shifts all positions. Determine the base, and give its coordinates here.`,
    ),
  ];
}

function farBases(marks: Marks, bases: Bases): Message[] {
  const places = [...marks.values()]
    .map(({ position }) => position)
    .filter((place) => !Number.isNaN(place.latitudeDeg));
  if (places.length === 0) return [];
  return [...bases.values()].flatMap(({ name, position }) => {
    const nearest = Math.min(
      ...places.map((place) => baselineBetween(position, { ...place, heightM: position.heightM }).lengthKm),
    );
    if (nearest <= FARTHEST_KM) return [];
    return [
      message(
        'warning',
        'base-far-off',
        `Base ${quoted(name)} is ${nearest.toFixed(0)} km from the nearest mark, farther than any crew works. Check its coordinates: swapped columns, another zone, unit or sign.`,
      ),
    ];
  });
}

function separationMessage(marks: Marks, bases: Bases): Message[] {
  const places = [...marks.values()]
    .map(({ position }) => position)
    .filter(({ latitudeDeg, heightM }) => !Number.isNaN(latitudeDeg + heightM));
  const lengths = [...bases.values()].flatMap(({ position }) =>
    places.map((place) => baselineBetween(position, place).lengthKm),
  );
  const longest = Math.max(0, ...lengths);
  if (longest <= SMALL_SITE_KM) return [];
  const [common, steep] = GEOID_SLOPE.map((slope) => Math.round(slope * longest));
  return [
    message(
      'warning',
      'constant-separation',
      `One geoid separation stands for a site of ${longest.toFixed(0)} km. A geoid commonly slopes by ${GEOID_SLOPE[0]} to ${GEOID_SLOPE[1]} mm per km (common practice), ${common} to ${steep} mm over this site, and its slope looks like vertical ppm. State separations for each mark, or a grid file.`,
    ),
  ];
}
