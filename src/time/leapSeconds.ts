/** A step of TAI − UTC. */
export interface LeapSecond {
  /** UTC day, YYYY-MM-DD, at whose first midnight the difference began to hold. */
  readonly from: string;
  /** That midnight, UTC milliseconds. */
  readonly utcMs: number;
  /** TAI − UTC from then on, seconds. GPS time is TAI − 19 s at all times. */
  readonly taiMinusUtcSeconds: number;
}

function step(year: number, month: number, taiMinusUtcSeconds: number): LeapSecond {
  const utcMs = Date.UTC(year, month - 1, 1);
  return { from: new Date(utcMs).toISOString().slice(0, 10), utcMs, taiMinusUtcSeconds };
}

/**
 * TAI − UTC since the year GPS time began, oldest first. Source: the leap-second list of the International Earth
 * Rotation and Reference Systems Service (IERS Bulletin C), as shipped with the IANA time zone database 2025b.
 */
export const LEAP_SECONDS: readonly LeapSecond[] = [
  step(1980, 1, 19),
  step(1981, 7, 20),
  step(1982, 7, 21),
  step(1983, 7, 22),
  step(1985, 7, 23),
  step(1988, 1, 24),
  step(1990, 1, 25),
  step(1991, 1, 26),
  step(1992, 7, 27),
  step(1993, 7, 28),
  step(1994, 7, 29),
  step(1996, 1, 30),
  step(1997, 7, 31),
  step(1999, 1, 32),
  step(2006, 1, 33),
  step(2009, 1, 34),
  step(2012, 7, 35),
  step(2015, 7, 36),
  step(2017, 1, 37),
];

/**
 * The day that list expires: up to it no step after the last one of `LEAP_SECONDS` was announced. Later times are
 * converted as if none came (GPS − UTC stays at 18 s), which is an assumption: a step is announced half a year ahead.
 */
export const LEAP_SECONDS_KNOWN_UNTIL = '2026-06-28';
