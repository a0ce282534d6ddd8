import { delayPerTecuM, L1_HZ } from './delays.js';
import { EARTH_RADIUS_KM, USUAL_SHELL_KM } from './thinShell.js';

/** Distance of GPS satellites from the Earth's centre, km. */
const ORBIT_RADIUS_KM = 26_560;

/** Even; Simpson's rule on these smooth integrands is then good to far more digits than are ever shown. */
const STEPS = 400;

const RADIANS = Math.PI / 180;

export interface ShorteningOptions {
  /** Elevation mask, degrees; 0 to 80, default 15. */
  readonly maskDeg?: number | undefined;
  /** Height of the shell, km; default 450. */
  readonly shellHeightKm?: number | undefined;
  /** Carrier of the positions, Hz; default L1. A fixed solution counts as that of its carrier. */
  readonly frequencyHz?: number | undefined;
}

/**
 * Change in length of a single-frequency baseline that one TECU of a uniform, unmodelled layer causes, ppm per TECU;
 * negative, since the phase is advanced more at the end from which a satellite stands lower (Georgiadou & Kleusberg
 * 1988, manuscripta geodaetica 13; Beutler et al. 1988).
 *
 * Computed for satellites spread evenly over the sky above the mask, with ambiguities fixed and the clock estimated.
 * A satellite at zenith angle z in the direction α from the baseline stands at another zenith angle at its other end, by
 * d (1/R + cos z/ρ) cos α: the turn of the vertical, and the parallax at the distance ρ of the satellite. Its slant
 * delay differs by K M′(z) times that. By the symmetry of the sky clock, height and the direction across take no part,
 * and the least-squares change of length is −K ∫ M′ (1/R + cos z/ρ) sin² z dz / ∫ sin³ z dz.
 * @throws RangeError for an impossible mask, height or frequency
 */
export function shorteningPpmPerTecu(options: ShorteningOptions = {}): number {
  const { maskDeg = 15, shellHeightKm = USUAL_SHELL_KM, frequencyHz = L1_HZ } = options;
  if (!(maskDeg >= 0 && maskDeg <= 80))
    throw new RangeError(`maskDeg: expected 0 to 80, received ${maskDeg}`);
  if (!(shellHeightKm > 0 && shellHeightKm < ORBIT_RADIUS_KM - EARTH_RADIUS_KM))
    throw new RangeError(`shellHeightKm: expected a height below the satellites, received ${shellHeightKm}`);
  if (!(frequencyHz > 0 && frequencyHz < Number.POSITIVE_INFINITY))
    throw new RangeError(`frequencyHz: expected a positive number, received ${frequencyHz}`);
  const ratio = EARTH_RADIUS_KM / (EARTH_RADIUS_KM + shellHeightKm);
  const widest = (90 - maskDeg) * RADIANS;
  let [change, weight] = [0, 0];
  for (let k = 0; k <= STEPS; k++) {
    const z = (widest * k) / STEPS;
    const [sine, cosine] = [Math.sin(z), Math.cos(z)];
    const simpson = k === 0 || k === STEPS ? 1 : k % 2 === 1 ? 4 : 2;
    // derivative of the mapping function with respect to z
    const slope = (ratio ** 2 * sine * cosine) / (1 - (ratio * sine) ** 2) ** 1.5;
    const distanceKm =
      Math.sqrt(ORBIT_RADIUS_KM ** 2 - (EARTH_RADIUS_KM * sine) ** 2) - EARTH_RADIUS_KM * cosine;
    change += simpson * slope * (1 / EARTH_RADIUS_KM + cosine / distanceKm) * sine ** 2;
    weight += simpson * sine ** 3;
  }
  // m per km is 1000 ppm
  return (-1000 * delayPerTecuM(frequencyHz) * change) / weight;
}

/** Change in length that a layer of `tecu` causes, ppm; negative is shorter. */
export function expectedShorteningPpm(tecu: number, options: ShorteningOptions = {}): number {
  return tecu * shorteningPpmPerTecu(options);
}
