/**
 * The number a cell spells: NaN for a blank cell, null for anything that is not a plain decimal number
 * (words, `NaN`, `0x1F`, `1,5`).
 */
export function parseNumber(cell: string): number | null {
  const text = cell.trim();
  if (text === '') return Number.NaN;
  const value = Number(text);
  if (!Number.isFinite(value)) return null;
  const second = text.charCodeAt(1);
  // Number() also reads 0x, 0b and 0o: their second character is a letter other than the e of an exponent.
  return second > 57 && second !== 69 && second !== 101 ? null : value;
}
