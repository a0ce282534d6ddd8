import { geodeticToGeocentric } from '../geodesy/index.js';
import { type Position, quoted } from '../logs/index.js';
import { distanceM } from './networkWatch.js';

/** A base so near to the rover is made up for it; a rover is not set up so near to its base but on marks beside it. */
const VIRTUAL_M = 50;

/**
 * Why a position is not one from a single base, or null. Corrections of a network, of a virtual base or of satellites
 * have another error model, in which the distance to a base is not what counts.
 * @param markFromBaseM distance of the mark from the base of the bases file
 */
export function notSingleBase({ extras, ...position }: Position, markFromBaseM: number): string | null {
  if (extras === null) return null;
  const word = extras.corrections.toLowerCase().replace(/[\s_]+/g, '-');
  if (word !== '' && word !== 'single-base') {
    const known = ['network', 'virtual-base', 'satellite'].includes(word);
    return known
      ? `the log says corrections ${quoted(extras.corrections)}`
      : `expected single-base, network, virtual-base or satellite as corrections, came ${quoted(extras.corrections)}; state what it means under correctionValues in the layout`;
  }
  if (Number.isNaN(extras.baseLatitudeDeg) || Number.isNaN(position.latitudeDeg)) return null;
  if (!(markFromBaseM > VIRTUAL_M)) return null;
  const base = {
    latitudeDeg: extras.baseLatitudeDeg,
    longitudeDeg: extras.baseLongitudeDeg,
    heightM: extras.baseHeightM,
  };
  const apartM = distanceM(geodeticToGeocentric(base), geodeticToGeocentric(position));
  return apartM < VIRTUAL_M
    ? `the base coordinates in the log are ${apartM.toFixed(0)} m from the rover: a virtual base`
    : null;
}
