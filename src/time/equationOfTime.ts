/** 2000-01-01 12:00, the epoch J2000.0, taken on the scale of UTC: the minute between the scales moves nothing here. */
const J2000_MS = Date.UTC(2000, 0, 1, 12);
const DAYS_PER_CENTURY = 36_525;
const radians = (degrees: number): number => (degrees * Math.PI) / 180;

/**
 * Apparent minus mean solar time in minutes, to a few seconds: add it to local mean solar time to have what a sundial
 * shows. Low-precision series of the sun in Meeus, Astronomical Algorithms (2nd ed. 1998), chapters 25 and 28, from
 * memory.
 */
export function equationOfTimeMinutes(utcMs: number): number {
  const t = (utcMs - J2000_MS) / 86_400_000 / DAYS_PER_CENTURY;
  const meanLongitude = radians(280.46646 + 36_000.76983 * t + 0.0003032 * t * t);
  const meanAnomaly = radians(357.52911 + 35_999.05029 * t - 0.0001537 * t * t);
  const eccentricity = 0.016708634 - 0.000042037 * t - 0.0000001267 * t * t;
  const node = radians(125.04 - 1934.136 * t);
  const obliquity = radians(23.4392911 - 0.0130042 * t + 0.00256 * Math.cos(node));
  const y = Math.tan(obliquity / 2) ** 2;
  const angle =
    y * Math.sin(2 * meanLongitude) -
    2 * eccentricity * Math.sin(meanAnomaly) +
    4 * eccentricity * y * Math.sin(meanAnomaly) * Math.cos(2 * meanLongitude) -
    0.5 * y * y * Math.sin(4 * meanLongitude) -
    1.25 * eccentricity ** 2 * Math.sin(2 * meanAnomaly);
  // A degree of rotation takes four minutes.
  return (angle * 180 * 4) / Math.PI;
}
