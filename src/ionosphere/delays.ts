/** Speed of light, m/s (exact by definition of the metre). */
export const SPEED_OF_LIGHT = 299_792_458;

/** Carrier frequencies, Hz (IS-GPS-200, IS-GPS-705). */
export const L1_HZ = 1_575.42e6;
export const L2_HZ = 1_227.6e6;
export const L5_HZ = 1_176.45e6;

/** First-order refraction of radio waves by free electrons, m³/s²; with all digits of the constants it is 40.308. */
const REFRACTION = 40.3;

/** Electrons per m² in one unit of total electron content. */
const ELECTRONS_PER_TECU = 1e16;

/** Wave length in vacuum, m. */
export const wavelengthM = (frequencyHz: number): number => SPEED_OF_LIGHT / frequencyHz;

/**
 * Delay of the code, and advance of the carrier phase, that one TECU along the ray causes, m: 40.3e16 / f².
 */
export const delayPerTecuM = (frequencyHz: number): number =>
  (REFRACTION * ELECTRONS_PER_TECU) / frequencyHz ** 2;

/** Square of the ratio of two frequencies. A delay on `firstHz` times this is the delay on `secondHz`. */
export const frequencyRatioSquared = (firstHz: number, secondHz: number): number => (firstHz / secondHz) ** 2;

/**
 * Geometry-free difference that one TECU causes, m: phase of `firstHz` minus phase of `secondHz`, and code of `secondHz`
 * minus code of `firstHz`, both positive for `firstHz` > `secondHz`.
 */
export const geometryFreePerTecuM = (firstHz: number, secondHz: number): number =>
  delayPerTecuM(secondHz) - delayPerTecuM(firstHz);

/** Factors of the combination first × `first` − second × `second` that is free of the first-order delay. */
export function ionosphereFreeFactors(firstHz: number, secondHz: number): { first: number; second: number } {
  const gamma = frequencyRatioSquared(firstHz, secondHz);
  return { first: gamma / (gamma - 1), second: 1 / (gamma - 1) };
}

/**
 * Differential delay over a baseline that a gradient of vertical TEC causes, in ppm (mm per km), on one frequency and
 * one satellite: a slope of TEC along the baseline times the delay per TECU.
 * @param tecuPerKm gradient along the baseline, TECU per km
 * @param mapping slant over vertical, 1 at the zenith
 */
export const gradientPpm = (tecuPerKm: number, mapping = 1, frequencyHz = L1_HZ): number =>
  1000 * delayPerTecuM(frequencyHz) * tecuPerKm * mapping;
