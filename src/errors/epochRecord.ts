import type { LocalVector } from '../geodesy/index.js';
import type { Fix, Position } from '../logs/index.js';

/** An epoch as numbers, so that millions of them can wait outside the garbage collector or on disk. */
export const RECORD = {
  utcMs: 0,
  eastM: 1,
  northM: 2,
  upM: 3,
  /** 0 fixed, 1 not fixed, 2 without coordinates. */
  state: 4,
  satellites: 5,
  pdop: 6,
  ageSeconds: 7,
  horizontalSigmaM: 8,
  verticalSigmaM: 9,
  file: 10,
  row: 11,
  crew: 12,
  /** Epochs that the row is the mean of. */
  epochs: 13,
  /** How the log shows the rover to come and go on: CAME_MOVING and LEFT_MOVING, or 0. */
  motion: 14,
  tiltDeg: 15,
  support: 16,
} as const;

/** What a row measures: these are averaged over an occupation. */
export const MEASURED = [
  RECORD.eastM,
  RECORD.northM,
  RECORD.upM,
  RECORD.satellites,
  RECORD.pdop,
  RECORD.ageSeconds,
  RECORD.horizontalSigmaM,
  RECORD.verticalSigmaM,
  RECORD.tiltDeg,
] as const;

export const RECORD_WIDTH = 17;
export const CAME_MOVING = 1;
export const LEFT_MOVING = 2;
export const FIXED = 0;
const NOT_FIXED = 1;
export const NO_POSITION = 2;

const stateOf = (fix: Fix, hasPosition: boolean): number =>
  hasPosition ? (fix === 'fixed' ? FIXED : NOT_FIXED) : NO_POSITION;

/** Fills `record`; a row without a time of day stands at the beginning of its day. `local` is null when the row has no coordinates. */
export function writeRecord(
  record: Float64Array,
  position: Position,
  local: LocalVector | null,
  fileIndex: number,
  crewIndex: number,
  supportIndex: number,
  motion: number,
): void {
  record[RECORD.utcMs] = position.dateOnly === '' ? position.utcMs : Date.parse(position.dateOnly);
  record[RECORD.eastM] = local?.eastM ?? Number.NaN;
  record[RECORD.northM] = local?.northM ?? Number.NaN;
  record[RECORD.upM] = local?.upM ?? Number.NaN;
  record[RECORD.state] = stateOf(position.fix, local !== null);
  record[RECORD.satellites] = position.satellites;
  record[RECORD.pdop] = position.pdop;
  record[RECORD.ageSeconds] = position.ageSeconds;
  record[RECORD.horizontalSigmaM] = position.horizontalSigmaM;
  record[RECORD.verticalSigmaM] = position.verticalSigmaM;
  record[RECORD.file] = fileIndex;
  record[RECORD.row] = position.row;
  record[RECORD.crew] = crewIndex;
  record[RECORD.epochs] = position.epochs;
  record[RECORD.motion] = motion;
  record[RECORD.tiltDeg] = position.extras?.tiltDeg ?? Number.NaN;
  record[RECORD.support] = supportIndex;
}
