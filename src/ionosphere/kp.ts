/** ap of the 28 values of Kp: 0, 0+, 1-, 1, 1+ … 9-, 9 (Bartels 1949, 1957; Matzka et al. 2021, Space Weather). */
const AP_BY_THIRDS = [
  0, 2, 3, 4, 5, 6, 7, 9, 12, 15, 18, 22, 27, 32, 39, 48, 56, 67, 80, 94, 111, 132, 154, 179, 207, 236, 300,
  400,
] as const;

/** Kp is printed with three decimals: 2.667 stands for 3-. */
const ROUNDING = 0.002;

/** The geomagnetic storm scale of NOAA's Space Weather Prediction Center. */
export type StormScale = 'G0' | 'G1' | 'G2' | 'G3' | 'G4' | 'G5';

/** Whole number of thirds, or null for what is no value of Kp. */
function thirdsOf(kp: number): number | null {
  const thirds = Math.round(kp * 3);
  return Math.abs(kp - thirds / 3) < ROUNDING && thirds >= 0 && thirds < AP_BY_THIRDS.length ? thirds : null;
}

/** Kp of a whole number of thirds as the index files print it, three decimals. */
export const kpOfThirds = (thirds: number): number => Math.round((thirds / 3) * 1000) / 1000;

/** ap (unit 2 nT) that goes with a Kp; NaN for what is no value of Kp. */
export function apOfKp(kp: number): number {
  const thirds = thirdsOf(kp);
  return thirds === null ? Number.NaN : AP_BY_THIRDS[thirds]!;
}

/** Kp, three decimals, that goes with an ap; NaN for what is no value of ap. */
export function kpOfAp(ap: number): number {
  const thirds = (AP_BY_THIRDS as readonly number[]).indexOf(ap);
  return thirds < 0 ? Number.NaN : kpOfThirds(thirds);
}

/** Kp as it is spoken of: `5-`, `5o`, `5+`; null for what is no value of Kp. */
export function kpWords(kp: number): string | null {
  const thirds = thirdsOf(kp);
  if (thirds === null) return null;
  return `${Math.round(thirds / 3)}${['o', '+', '-'][thirds % 3]}`;
}

/**
 * Class of a geomagnetic storm: G1 from Kp 5-, G2 from 6-, G3 from 7-, G4 from 8- up to 9-, G5 at 9o; G0 below. The
 * scale counts whole Kp, so that 5-, 5o and 5+ are one class, except that 9- still belongs to G4 (NOAA Space Weather
 * Scales). Null for a missing Kp (NaN).
 */
export function stormScale(kp: number): StormScale | null {
  if (Number.isNaN(kp)) return null;
  if (kp > 9 - ROUNDING) return 'G5';
  const whole = Math.min(8, Math.round(kp));
  return `G${Math.max(0, whole - 4)}` as StormScale;
}
