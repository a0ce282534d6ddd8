import type { Control } from '../control/index.js';
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
  readonly file: string;
  readonly row: number;
}

/** An occupation that takes no part in any fit, with its error. */
export interface SetAsideOccupation {
  readonly reason: OccupationReason;
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
    if (farOff) setAside.push({ reason: 'error-over-10-m', error });
    else errors.push(error);
  }
  return { errors, setAside, messages: suspectMarks(errors, setAside) };
}

function errorFunction(control: Control): (occupation: Occupation) => OccupationError {
  const geometries = new Map<string, ReturnType<typeof geometry>>();
  return (occupation) => {
    const { mark, base, position } = occupation;
    const key = `${mark}\u0000${base}`;
    let line = geometries.get(key);
    if (line === undefined) {
      line = geometry(control, mark, base, occupation);
      geometries.set(key, line);
    }
    const measured = line.frame.toLocal(geodeticToGeocentric(position));
    const east = line.planKnown ? measured.eastM * 1000 : Number.NaN;
    const north = line.planKnown ? measured.northM * 1000 : Number.NaN;
    const up = line.heightKnown ? (position.heightM - line.heightM) * 1000 : Number.NaN;
    const { day, setup, rover, crew, startMs, epochs, satellites, pdop, ageSeconds, file, row } = occupation;
    return {
      day,
      base,
      setup,
      mark,
      rover,
      crew,
      startMs,
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
      file,
      row,
    };
  };
}

/** What is the same for all occupations of a mark from a base. What is not known of the mark is taken as measured. */
function geometry(control: Control, markName: string, baseName: string, occupation: Occupation) {
  const mark = control.marks.get(markName);
  const base = control.bases.get(baseName);
  if (mark === undefined || base === undefined) {
    throw new RangeError(
      `Expected an occupation of a known mark from a known base, came mark "${markName}" and base "${baseName}". Use the control with which the occupations were formed.`,
    );
  }
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
