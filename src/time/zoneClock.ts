import { expectedZone, fixedOffsetMs } from './fixedOffset.js';
import { quoted } from './quoted.js';
import { isTimeZone, type LocalToUtc, localToUtc } from './zones.js';

/** Clock minus UTC of a zone that never changes its offset, ms; null when the text names none. */
const constantOffsetMs = (zone: string): number | null =>
  zone.toUpperCase() === 'UTC' || zone === 'Z' ? 0 : fixedOffsetMs(zone);

/**
 * The function that turns a clock reading (milliseconds since 1970-01-01T00:00 of that clock) into UTC for a zone: an
 * IANA name, `UTC`, or a fixed offset ahead of UTC such as `+02:00`, `-0330`, `-3`. The function throws as localToUtc.
 * @throws Error for a zone that is none of these.
 */
export function zoneClock(zone: string): (wallMs: number) => LocalToUtc {
  const offset = constantOffsetMs(zone);
  if (offset !== null) return (wallMs) => ({ kind: 'one', utcMs: wallMs - offset });
  if (!isTimeZone(zone)) throw new Error(`zone: expected ${expectedZone(zone)}, came ${quoted(zone)}`);
  return (wallMs) => localToUtc(zone, wallMs);
}
