export { type IsoTime, parseIsoTime } from './isoTime.js';
export { solarDay, solarHour } from './solarTime.js';
export { calendarDay, isTimeZone, type LocalToUtc, localToUtc, zoneOffsetMs } from './zones.js';
