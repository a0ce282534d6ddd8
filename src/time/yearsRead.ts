/** Satellite positioning is not older, and the tables of time zones reach farther. */
export const FIRST_YEAR_READ = 1980;
export const LAST_YEAR_READ = 2099;

const FIRST_MS = Date.UTC(FIRST_YEAR_READ, 0, 1);
const END_MS = Date.UTC(LAST_YEAR_READ + 1, 0, 1);

/** Whether a clock reading (milliseconds since 1970-01-01T00:00 of its clock) lies in the years a log may come from. */
export function isYearRead(wallMs: number): boolean {
  return wallMs >= FIRST_MS && wallMs < END_MS;
}
