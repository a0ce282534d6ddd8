const NAMES = [
  'january',
  'february',
  'march',
  'april',
  'may',
  'june',
  'july',
  'august',
  'september',
  'october',
  'november',
  'december',
] as const;

/**
 * The month (1 to 12) of an English name, three letters or full, in any case (also `Sept`, the usual four-letter
 * form), or 0.
 */
export function monthOfName(name: string): number {
  const lower = name.toLowerCase();
  if (lower === 'sept') return 9;
  return NAMES.findIndex((full) => lower === full || lower === full.slice(0, 3)) + 1;
}
