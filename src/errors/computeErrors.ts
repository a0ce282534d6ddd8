import {
  type Base,
  type Control,
  coordinatesOn,
  type Mark,
  type PointCoordinates,
} from '../control/index.js';
import { baselineBetween, geodeticToGeocentric, localFrame } from '../geodesy/index.js';
import type { Message, OccupationReason } from '../logs/index.js';
import { solarHour } from '../time/index.js';
import type { Occupation } from './occupation.js';
import { suspectMarks } from './suspectMarks.js';

/** The error of one occupation, measured minus known, with everything it can be split by. Errors are mm. */
export interface OccupationError {
  readonly day: string;
  readonly base: string;
  readonly setup: string;
  readonly mark: string;
  readonly rover: string;
  readonly crew: string;
  readonly startMs: number;
  readonly endMs: number;
  /** Local mean solar time at the mark, hours. */
  readonly solarHour: number;
  /** Straight distance from base to mark, km. */
  readonly baselineKm: number;
  /** Direction base → mark at the base, degrees from north. */
  readonly azimuthDeg: number;
  /** Mark minus base, m. */
  readonly heightDifferenceM: number;
  /** In the mark's ellipsoidal normal frame; NaN for what is not known of the mark. */
  readonly east: number;
  readonly north: number;
  readonly up: number;
  /** Components along and across (to the right of) the direction base → mark, as seen at the mark. */
  readonly along: number;
  readonly across: number;
  readonly epochs: number;
  readonly scatterEastMm: number;
  readonly scatterNorthMm: number;
  readonly scatterUpMm: number;
  readonly satellites: number;
  readonly pdop: number;
  readonly ageSeconds: number;
  /** The receiver's own figures, mm; NaN where the log gives none. */
  readonly reportedHorizontalMm: number;
  readonly reportedVerticalMm: number;
  /** Tilt of the rod, degrees from plumb. */
  readonly tiltDeg: number;
  /** What held the rod, in the log's words; empty where it does not tell. */
  readonly support: string;
  /** Sky of the mark: `open`, `partly`, `obstructed`, or empty where it is not stated. */
  readonly sky: string;
  readonly file: string;
  readonly row: number;
}

/** An occupation that takes no part in any fit, with its error. */
export interface SetAsideOccupation {
  readonly reason: OccupationReason;
  /** The cause, where one is known; else empty. */
  readonly detail: string;
  readonly error: OccupationError;
}

export interface ComputedErrors {
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly messages: readonly Message[];
}

const FAR_OFF_MM = 10_000;

/**
 * Errors of occupations against the known coordinates of their marks. An occupation more than 10 m off is set aside;
 * nothing smaller is.
 * @throws RangeError when an occupation names a mark or base that control does not hold
 */
export function computeErrors(occupations: readonly Occupation[], control: Control): ComputedErrors {
  const errorOf = errorFunction(control);
  const errors: OccupationError[] = [];
  const setAside: SetAsideOccupation[] = [];
  for (const occupation of occupations) {
    const error = errorOf(occupation);
    const farOff = [error.east, error.north, error.up].some((value) => Math.abs(value) > FAR_OFF_MM);
    if (farOff) setAside.push({ reason: 'error-over-10-m', detail: '', error });
    else errors.push(error);
  }
  return { errors, setAside, messages: suspectMarks(errors, setAside) };
}

function errorFunction(control: Control): (occupation: Occupation) => OccupationError {
  const geometries = new Map<PointCoordinates, Map<PointCoordinates, ReturnType<typeof geometry>>>();
  return (occupation) => {
    const { mark, base, position } = occupation;
    const [markAt, baseAt] = pointsOf(control, occupation);
    // Coordinates are one object for all the days on which they hold.
    let byMark = geometries.get(markAt);
    if (byMark === undefined) {
      byMark = new Map();
      geometries.set(markAt, byMark);
    }
    let line = byMark.get(baseAt);
    if (line === undefined) {
      line = geometry(markAt, baseAt, occupation);
      byMark.set(baseAt, line);
    }
    const measured = line.frame.toLocal(geodeticToGeocentric(position));
    const east = line.planKnown ? measured.eastM * 1000 : Number.NaN;
    const north = line.planKnown ? measured.northM * 1000 : Number.NaN;
    const up = line.heightKnown ? (position.heightM - line.heightM) * 1000 : Number.NaN;
    const { day, setup, rover, crew, startMs, endMs, epochs, satellites, pdop, ageSeconds, file, row } =
      occupation;
    return {
      day,
      base,
      setup,
      mark,
      rover,
      crew,
      startMs,
      endMs,
      solarHour: solarHour(startMs, position.longitudeDeg),
      baselineKm: line.baselineKm,
      azimuthDeg: line.azimuthDeg,
      heightDifferenceM: line.heightDifferenceM,
      east,
      north,
      up,
      along: east * line.sine + north * line.cosine,
      across: east * line.cosine - north * line.sine,
      epochs,
      scatterEastMm: occupation.scatterEastMm,
      scatterNorthMm: occupation.scatterNorthMm,
      scatterUpMm: occupation.scatterUpMm,
      satellites,
      pdop,
      ageSeconds,
      reportedHorizontalMm: occupation.horizontalSigmaM * 1000,
      reportedVerticalMm: occupation.verticalSigmaM * 1000,
      tiltDeg: occupation.tiltDeg,
      support: occupation.support,
      sky: control.marks.get(mark)!.sky,
      file,
      row,
    };
  };
}

/** The coordinates of mark and base that hold on the day of an occupation. */
function pointsOf(
  control: Control,
  { mark: markName, base: baseName, day }: Occupation,
): readonly [PointCoordinates, PointCoordinates] {
  const mark: Mark | undefined = control.marks.get(markName);
  const base: Base | undefined = control.bases.get(baseName);
  const markAt = mark && coordinatesOn(mark, day);
  const baseAt = base && coordinatesOn(base, day);
  if (markAt && baseAt) return [markAt, baseAt];
  throw new RangeError(
    `Expected an occupation of a known mark from a known base, came mark "${markName}" and base "${baseName}" on ${day}. Use the control with which the occupations were formed.`,
  );
}

/** What is the same for all occupations of a mark from a base. What is not known of the mark is taken as measured. */
function geometry(mark: PointCoordinates, base: PointCoordinates, occupation: Occupation) {
  const planKnown = !Number.isNaN(mark.position.latitudeDeg);
  const heightKnown = !Number.isNaN(mark.position.heightM);
  const point = {
    latitudeDeg: planKnown ? mark.position.latitudeDeg : occupation.position.latitudeDeg,
    longitudeDeg: planKnown ? mark.position.longitudeDeg : occupation.position.longitudeDeg,
    heightM: heightKnown ? mark.position.heightM : occupation.position.heightM,
  };
  const { lengthKm, azimuthDeg, azimuthAtRoverDeg, heightDifferenceM } = baselineBetween(
    base.position,
    point,
  );
  const direction = (azimuthAtRoverDeg * Math.PI) / 180;
  return {
    frame: localFrame(point),
    planKnown,
    heightKnown,
    heightM: point.heightM,
    baselineKm: lengthKm,
    azimuthDeg,
    heightDifferenceM,
    sine: Math.sin(direction),
    cosine: Math.cos(direction),
  };
}
