import { baselineBetween } from '../geodesy/index.js';
import { type Message, message, quoted } from '../logs/index.js';
import { assumedBase, holdsWords } from './assumedBase.js';
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
    ...[...bases.values()].flatMap(assumedBaseMessages),
    ...farBases(marks, bases),
    ...(constantSeparation ? separationMessage(marks, bases) : []),
  ];
}

function circularMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.keys()].flatMap((base) => {
    const from = [...marks.values()].filter(({ versions }) =>
      versions.some(({ source }) => holdsWords(source, base)),
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

function assumedBaseMessages(base: Base): Message[] {
  const found = assumedBase(base);
  if (found === null) return [];
  const { sizeM, stated, assumed } = found;
  const size = stated
    ? `its stated uncertainty of ${sizeM.toFixed(2)} m`
    : `an uncertainty of ${sizeM} m, common for a position without corrections,`;
  const stands = assumed ? 'stands on an assumed coordinate' : 'is known poorly';
  return [
    message(
      'warning',
      'assumed-base',
      `Base ${quoted(base.name)} ${stands}: ${size} adds about ${(sizeM / METRES_PER_PPM).toFixed(2)} ppm to every baseline (common practice: metres / ${METRES_PER_PPM}), and shifts all positions. Determine the base, and give its coordinates here.`,
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
