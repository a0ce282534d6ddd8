/** Two lengths nearer than this read as one. */
const APART_KM = 0.1;

/**
 * The lengths of a table that ends where the data or a rule do, for a reader takes a row as leave to go there: those usual
 * ones that the data support, and the ends themselves.
 * @param usualKm lengths in ascending order
 * @param supportedKm nothing beyond is tabled
 * @param endsKm ends beside the supported length, such as how far a rule reaches; beyond it they are left out
 */
export function tabledLengths(
  usualKm: readonly number[],
  supportedKm: number,
  endsKm: readonly number[] = [],
): number[] {
  const ends = endsKm
    .filter((km) => km > 0 && km <= supportedKm - APART_KM)
    .concat(supportedKm)
    .sort((a, b) => a - b);
  const usual = usualKm.filter(
    (km) => km < supportedKm && ends.every((end) => Math.abs(end - km) >= APART_KM),
  );
  return [...new Set([...usual, ...ends])].sort((a, b) => a - b);
}
