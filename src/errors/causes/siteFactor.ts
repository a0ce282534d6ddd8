import { combinedFactor, type Geodetic } from '../../geodesy/index.js';
import { type CoordinateSystem, systemOf } from '../../logs/index.js';

/** A factor of the site's grid by which lengths may be wrong, ppm, and what it is. */
export interface SiteFactor {
  readonly ppm: number;
  readonly words: string;
}

/**
 * By how much lengths on the grid of a system differ from those on the ground and on the ellipsoid at a place, both
 * ways; none for systems without a grid.
 */
export function siteFactors(system: CoordinateSystem, place: Geodetic): SiteFactor[] {
  const known = systemOf(system);
  if (known.kind !== 'projected') return [];
  const { combinedFactor: combined, pointScale, heightFactor } = combinedFactor(known.projection, place);
  const factors = [
    [combined, 'the combined factor'],
    [pointScale, 'the point scale'],
    [heightFactor, 'the height factor'],
  ] as const;
  return factors.flatMap(([factor, words]) => [
    { ppm: (factor - 1) * 1e6, words: `${words} ${factor.toFixed(7)}` },
    { ppm: (1 / factor - 1) * 1e6, words: `one over ${words} ${factor.toFixed(7)}` },
  ]);
}
