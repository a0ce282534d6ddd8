import { geodeticToGeocentric } from '../geodesy/index.js';
import { type Corrections, type Position, quoted } from '../logs/index.js';
import { distanceM, fieldPlace } from './networkWatch.js';

/** A base so near to the rover is made up for it; a rover is not set up so near to its base but on marks beside it. */
const VIRTUAL_M = 50;

const KIND_WORDS: Readonly<Record<Exclude<Corrections, 'single-base'>, string>> = {
  network: 'a network',
  'virtual-base': 'a virtual base',
  satellite: 'satellites',
};

/**
 * Why a position is not one from a single base, or null. Corrections of a network, of a virtual base or of satellites
 * have another error model, in which the distance to a base is not what counts.
 * @param markFromBaseM distance of the mark from the base of the bases file; NaN when the mark is not known in plan
 */
export function notSingleBase(position: Position, markFromBaseM: number): string | null {
  const { extras, latitudeDeg, longitudeDeg } = position;
  if (extras === null) return null;
  const { corrections } = extras;
  if (corrections !== '' && corrections !== 'single-base') {
    const words = (KIND_WORDS as Readonly<Record<string, string>>)[corrections];
    return words === undefined
      ? `expected single-base, network, virtual-base or satellite as corrections, came ${quoted(corrections)}; say under correctionValues in the layout what it means`
      : `the log says that the corrections are those of ${words}`;
  }
  // A mark beside the base is measured from beside the base.
  if (markFromBaseM <= VIRTUAL_M) return null;
  if (Number.isNaN(extras.baseLatitudeDeg) || Number.isNaN(latitudeDeg)) return null;
  const apartM = distanceM(
    fieldPlace(extras),
    geodeticToGeocentric({ latitudeDeg, longitudeDeg, heightM: 0 }),
  );
  return apartM < VIRTUAL_M
    ? `the base coordinates in the log are ${apartM.toFixed(0)} m from the rover: a virtual base`
    : null;
}
