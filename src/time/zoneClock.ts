import { quoted } from './quoted.js';
import { isTimeZone, type LocalToUtc, localToUtc } from './zones.js';

const OFFSET = /^([+\u2212-])(\d{1,2})(?::([0-5]\d))?$|^([+\u2212-])(\d{2})([0-5]\d)$/;
/** No clock was ever farther from UTC. */
const LARGEST_OFFSET_MS = 16 * 3_600_000;

/** Clock minus UTC of a fixed offset as written in a layout, ms; null when the text is none. */
function fixedOffsetMs(zone: string): number | null {
  if (zone.toUpperCase() === 'UTC' || zone === 'Z') return 0;
  const match = OFFSET.exec(zone);
  if (!match) return null;
  const hours = Number(match[2] ?? match[5]);
  const minutes = Number(match[3] ?? match[6] ?? 0);
  const size = (hours * 60 + minutes) * 60_000;
  if (size > LARGEST_OFFSET_MS) return null;
  return (match[1] ?? match[4]) === '+' ? size : -size;
}

/**
 * The function that turns a clock reading (milliseconds since 1970-01-01T00:00 of that clock) into UTC for a zone: an
 * IANA name, `UTC`, or a fixed offset ahead of UTC such as `+02:00`, `-0330`, `-3`. The function throws as localToUtc.
 * @throws Error for a zone that is none of these.
 */
export function zoneClock(zone: string): (wallMs: number) => LocalToUtc {
  const offset = fixedOffsetMs(zone);
  if (offset !== null) return (wallMs) => ({ kind: 'one', utcMs: wallMs - offset });
  // newer run-times take offsets as names too; they are read above or not at all
  if (/^[+\u2212-]/.test(zone) || !isTimeZone(zone))
    throw new Error(
      `zone: expected an IANA name such as Europe/Oslo, UTC, or an offset such as +02:00, came ${quoted(zone)}`,
    );
  return (wallMs) => localToUtc(zone, wallMs);
}
