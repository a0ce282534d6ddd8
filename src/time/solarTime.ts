import { calendarDay } from './zones.js';

/** Local mean solar time minus UTC: four minutes a degree. */
function solarOffsetMs(longitudeDeg: number): number {
  return longitudeDeg * 240_000;
}

/** Local mean solar time at a longitude (degrees east), hours in [0, 24): UTC + longitude / 15. NaN stays NaN. */
export function solarHour(utcMs: number, longitudeDeg: number): number {
  const hours = (utcMs + solarOffsetMs(longitudeDeg)) / 3_600_000;
  const hour = hours - 24 * Math.floor(hours / 24);
  // rounding may put a time next to midnight on 24, or just below 0
  return hour >= 24 || hour < 0 ? 0 : hour;
}

/**
 * Day of local mean solar time at a longitude (degrees east), YYYY-MM-DD.
 * @throws RangeError when the time or longitude is not finite.
 */
export function solarDay(utcMs: number, longitudeDeg: number): string {
  return calendarDay(utcMs, solarOffsetMs(longitudeDeg));
}
