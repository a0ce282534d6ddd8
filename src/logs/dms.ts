/** The longest text that can be an angle; longer ones are not looked at. */
const LONGEST = 40;

/**
 * Degrees, minutes and seconds in any usual writing: `53 48 33.82 N`, `53°48'33.82"N`, `-2-07-46.4`, `W 2:07:46.4`,
 * also degrees and decimal minutes. A letter N, S, E or W (or a sign) gives the sign.
 * @returns degrees; NaN for a blank cell, null when it is no such angle
 */
export function parseDms(cell: string): number | null {
  const text = cell.trim();
  if (text === '') return Number.NaN;
  if (text.length > LONGEST) return null;
  const letters = text.match(/[A-Za-z]/g) ?? [];
  if (letters.length > 1 || (letters.length === 1 && !/^[NSEW]|[NSEW]$/i.test(text))) return null;
  const body = text.replace(/[A-Za-z]/, '').trim();
  const signed = /^[-+]/.test(body);
  if (signed && letters.length > 0) return null;
  const numbers = body
    .slice(signed ? 1 : 0)
    .split(/[^\d.]+/)
    .filter((part) => part !== '');
  if (numbers.length < 2 || numbers.length > 3) return null;
  const values = numbers.map(Number);
  // Only the last number may have decimals.
  if (values.some(Number.isNaN) || numbers.slice(0, -1).some((part) => part.includes('.'))) return null;
  const [degrees, minutes, seconds = 0] = values as [number, number, number?];
  if (degrees > 360 || minutes >= 60 || seconds >= 60) return null;
  const size = degrees + (minutes + seconds / 60) / 60;
  const negative = body.startsWith('-') || /[SW]/i.test(letters[0] ?? '');
  return negative ? -size : size;
}
