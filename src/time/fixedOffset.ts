const OFFSET = /^([+\u2212-])(\d{1,2})(?::([0-5]\d))?$|^([+\u2212-])(\d{2})([0-5]\d)$/;
/** No clock was ever farther from UTC. */
const LARGEST_OFFSET_MS = 16 * 3_600_000;

/**
 * Clock minus UTC of a fixed offset such as `+02:00`, `-0330` or `-3`, ms; null when the text is none. Run-times differ
 * in which offsets they take as names of zones, so none is left to them.
 */
export function fixedOffsetMs(zone: string): number | null {
  const match = OFFSET.exec(zone);
  if (!match) return null;
  const hours = Number(match[2] ?? match[5]);
  const minutes = Number(match[3] ?? match[6] ?? 0);
  const size = (hours * 60 + minutes) * 60_000;
  if (size > LARGEST_OFFSET_MS) return null;
  return (match[1] ?? match[4]) === '+' ? size : -size;
}

/** Whether a text is written like an offset, whether or not it is one. */
export const looksLikeOffset = (zone: string): boolean => /^[+\u2212-]/.test(zone);

/** What was expected as a time zone, for messages; of `UTC+2` and its like the offset that was surely meant. */
export function expectedZone(came: string): string {
  const offset = meantOffset(came);
  const example = offset === null ? ' like +02:00' : `, which for ${came.trim()} is written "${offset}"`;
  return `an IANA time zone like Europe/Lisbon or an offset from UTC${example}`;
}

/** `UTC+2`, `GMT-3:30` → `+02:00`, `-03:30`; null for anything else. */
function meantOffset(text: string): string | null {
  const match = /^(?:UTC|GMT)\s*([+\u2212-].*)$/i.exec(text.trim());
  const offsetMs = match === null ? null : fixedOffsetMs(match[1]!.replace(/^(.)\s+/, '$1'));
  if (offsetMs === null) return null;
  const minutes = Math.abs(offsetMs) / 60_000;
  const digits = [Math.floor(minutes / 60), minutes % 60].map((part) => String(part).padStart(2, '0'));
  return `${offsetMs < 0 ? '-' : '+'}${digits.join(':')}`;
}
