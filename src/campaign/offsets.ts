import { normalDeviates, type Random } from '../stats/index.js';
import type { Axes } from './options.js';

/** One normal error a name (a mark's, a setup's), with a standard deviation for each axis, mm. */
export function drawOffsets(names: readonly string[], sigmaMm: Axes, random: Random): Map<string, Axes> {
  const normal = normalDeviates(random);
  return new Map(
    names.map((name) => {
      const [east, north, up] = [normal(), normal(), normal()];
      return [name, { east: sigmaMm.east * east, north: sigmaMm.north * north, up: sigmaMm.up * up }];
    }),
  );
}
