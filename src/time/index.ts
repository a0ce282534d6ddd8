export { equationOfTimeMinutes } from './equationOfTime.js';
export { expectedZone } from './fixedOffset.js';
export type { TimeKind } from './formatFields.js';
export {
  type GpsWeekOutcome,
  gpsMinusUtcSeconds,
  gpsToUtcMs,
  gpsWeekToUtcMs,
  LEAP_SECONDS,
  LEAP_SECONDS_KNOWN_UNTIL,
  type LeapSecond,
} from './gpsTime.js';
export { guessTimeFormats, type TimeGuess } from './guessTimeFormat.js';
export {
  type DateOnly,
  type InstantTime,
  type InvalidTime,
  type IsoTime,
  type LocalTime,
  parseIsoTime,
} from './isoTime.js';
export { quoted } from './quoted.js';
export { solarDay, solarHour } from './solarTime.js';
export { compileTimeFormat, type ParsedWallTime, type TimeFormatReader } from './timeFormat.js';
export { type TimeLayout, type TimeOutcome, timeReader } from './timeReader.js';
export {
  type ClockGap,
  type ClockOverlap,
  calendarDay,
  isTimeZone,
  type LocalToUtc,
  localToUtc,
  type OneInstant,
  zoneOffsetMs,
} from './zones.js';
