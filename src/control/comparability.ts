import { baselineBetween } from '../geodesy/index.js';
import { type Message, message, quoted, quotedList } from '../logs/index.js';
import type { Base, Bases } from './bases.js';
import type { Mark, Marks } from './marks.js';

/** What is stated of frames beyond marks and bases. */
export interface FrameStatements {
  /** Frames that logs state; their positions are in that of the base all the same, unless they are transformed. */
  readonly logFrames: readonly {
    readonly frame: string;
    readonly epoch: number;
    readonly transformed: boolean;
  }[];
  /** Marks or bases are transformed to one frame by the study file. */
  readonly controlTransformed: boolean;
  /** One geoid separation stands for the whole study. */
  readonly constantSeparation: boolean;
}

/** Strain that adds up between two epochs, ppm a year: a common upper size within a plate's deforming zones. */
const STRAIN_PPM_PER_YEAR = 0.1;
const SAME_EPOCH_YEARS = 0.5;
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
  { logFrames, controlTransformed, constantSeparation }: FrameStatements,
): Message[] {
  return [
    ...(controlTransformed ? [] : [...frameMessages(marks, bases), ...epochMessages(marks, bases)]),
    ...logFrameMessages(logFrames, bases),
    ...circularMessages(marks, bases),
    ...[...bases.values()].flatMap(assumedBase),
    ...farBases(marks, bases),
    ...(constantSeparation ? separationMessage(marks, bases) : []),
  ];
}

const same = (a: string, b: string): boolean =>
  a.toLowerCase().replace(/[\s_-]/g, '') === b.toLowerCase().replace(/[\s_-]/g, '');

function frameMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.values()].flatMap((base) => {
    if (base.frame === '') return [];
    const other = [...marks.values()].filter(({ frame }) => frame !== '' && !same(frame, base.frame));
    const [first] = other;
    if (first === undefined) return [];
    return [
      message(
        'warning',
        'frames-differ',
        `Positions are in the frame of their base, whatever their label: base ${quoted(base.name)} is in ${quoted(base.frame)}, ${markList(other)} in ${quoted(first.frame)}. Frames of the satellite age differ by shifts up to metres and by a scale of up to 0.01 ppm, older ones by 1 to 10 ppm (common practice). State the transformation of the marks, or give both in one frame.`,
      ),
    ];
  });
}

function epochMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.values()].flatMap((base) => {
    if (Number.isNaN(base.epoch)) return [];
    const years = ({ epoch }: Mark): number => Math.abs(epoch - base.epoch);
    const other = [...marks.values()].filter((mark) => years(mark) > SAME_EPOCH_YEARS);
    if (other.length === 0) return [];
    const most = Math.max(...other.map(years));
    const ppm = most * STRAIN_PPM_PER_YEAR;
    return [
      message(
        'warning',
        'epochs-differ',
        `Coordinates of base ${quoted(base.name)} belong to ${base.epoch}, those of ${markList(other)} to epochs up to ${most.toFixed(1)} years away. Where the ground is strained by ${STRAIN_PPM_PER_YEAR} ppm a year this adds up to ${ppm.toFixed(1)} ppm, and a motion that both share drops out. Bring both to one epoch.`,
      ),
    ];
  });
}

function markList(marks: readonly Mark[]): string {
  const names = quotedList(marks.slice(0, 3).map(({ name }) => name));
  return marks.length > 3
    ? `${names} and ${marks.length - 3} more marks are`
    : marks.length === 1
      ? `mark ${names} is`
      : `marks ${names} are`;
}

function logFrameMessages(logFrames: FrameStatements['logFrames'], bases: Bases): Message[] {
  const [base] = bases.values();
  const stated = logFrames.filter(({ frame, transformed }) => frame !== '' && !transformed);
  const differs = stated.find(
    ({ frame }) => base !== undefined && base.frame !== '' && !same(frame, base.frame),
  );
  if (differs === undefined) return [];
  return [
    message(
      'warning',
      'frames-differ',
      `The logs are labelled ${quoted(differs.frame)} and base ${quoted(base!.name)} stands in ${quoted(base!.frame)}: positions are in the frame of the coordinate that the base was run with. Check which coordinate that was, or state the transformation of the logs.`,
    ),
  ];
}

function circularMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.keys()].flatMap((base) => {
    const from = [...marks.values()].filter(({ source }) => words(source).includes(base.toLowerCase()));
    if (from.length === 0) return [];
    return [
      message(
        'warning',
        'circular-control',
        `The coordinates of ${markList(from)} from base ${quoted(base)} itself, as their source says: an error that the base makes on all days is in both and cannot show. Use marks that were determined without this base for absolute errors.`,
      ),
    ];
  });
}

/** Names in a text such as `static from B1, 2023`. */
const words = (text: string): string[] => text.toLowerCase().split(/[^\p{L}\p{N}_-]+/u);

function assumedBase({ name, source, horizontalSigmaMm, verticalSigmaMm }: Base): Message[] {
  const stated = Math.hypot(horizontalSigmaMm || 0, horizontalSigmaMm || 0, verticalSigmaMm || 0) / 1000;
  const assumed = words(source).some((word) => word === 'assumed' || word === 'autonomous');
  // Below 0.01 ppm nothing needs to be said.
  if (!assumed && stated < METRES_PER_PPM / 100) return [];
  const sizeM = stated > 0 ? stated : ASSUMED_M;
  const size =
    stated > 0
      ? `its stated uncertainty of ${sizeM.toFixed(2)} m`
      : `an uncertainty of ${ASSUMED_M} m, common for a position without corrections,`;
  return [
    message(
      'warning',
      'assumed-base',
      `Base ${quoted(name)} stands on an assumed coordinate: ${size} adds about ${(sizeM / METRES_PER_PPM).toFixed(2)} ppm to every baseline (common practice: metres / ${METRES_PER_PPM}), and shifts all positions. Determine the base, and give its coordinates here.`,
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
  const [base] = bases.values();
  const lengths = [...marks.values()]
    .map(({ position }) => position)
    .filter(({ latitudeDeg, heightM }) => !Number.isNaN(latitudeDeg + heightM))
    .map((place) => baselineBetween(base!.position, place).lengthKm);
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
