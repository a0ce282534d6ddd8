import type { TecMaps } from './tecMaps.js';

/** Coordinates of a grid stand in the file with one decimal; a place this near to its edge is on it. */
const EDGE_DEG = 1e-6;

/**
 * Value of one map at a place, bilinear between the four nodes around it: (1-p)(1-q) E00 + p(1-q) E10 + q(1-p) E01 +
 * pq E11. Longitudes may be given in any turn; a grid that goes around the globe is closed. NaN outside the grid, or
 * where a node that counts has no value.
 * @param values one of the arrays of `maps`
 */
export function valueAt(
  maps: TecMaps,
  values: Float64Array,
  latitudeDeg: number,
  longitudeDeg: number,
): number {
  const { latitudesDeg, longitudesDeg } = maps;
  const row = place(latitudesDeg, latitudeDeg);
  const column = longitudePlace(longitudesDeg, longitudeDeg);
  if (row === null || column === null) return Number.NaN;
  const width = longitudesDeg.length;
  const top = row.index * width;
  const bottom = Math.min(row.index + 1, latitudesDeg.length - 1) * width;
  const left = column.index;
  const right = (column.index + 1) % width;
  const [p, q] = [column.share, row.share];
  return (
    part((1 - p) * (1 - q), values[top + left]!) +
    part(p * (1 - q), values[top + right]!) +
    part((1 - p) * q, values[bottom + left]!) +
    part(p * q, values[bottom + right]!)
  );
}

/** A node without weight does not count, even one without a value. */
const part = (weight: number, value: number): number => (weight === 0 ? 0 : weight * value);

/** A place between node `index` and the next. */
interface Between {
  readonly index: number;
  readonly share: number;
}

function place(nodes: Float64Array, at: number): Between | null {
  const steps = (at - nodes[0]!) / (nodes[1]! - nodes[0]!);
  const last = nodes.length - 1;
  const edge = EDGE_DEG / Math.abs(nodes[1]! - nodes[0]!);
  if (!(steps >= -edge && steps <= last + edge)) return null;
  const held = Math.min(Math.max(steps, 0), last);
  const index = Math.min(Math.floor(held), last - 1);
  return { index, share: held - index };
}

function longitudePlace(nodes: Float64Array, longitudeDeg: number): Between | null {
  if (!Number.isFinite(longitudeDeg)) return null;
  const step = nodes[1]! - nodes[0]!;
  const [low, high] = step > 0 ? [nodes[0]!, nodes.at(-1)!] : [nodes.at(-1)!, nodes[0]!];
  // the same meridian, from the western edge of the grid on
  let turned = longitudeDeg - 360 * Math.floor((longitudeDeg - low + EDGE_DEG) / 360);
  const within = place(nodes, turned);
  if (within !== null) return within;
  // a grid that ends one step before its beginning lacks only the meridian that closes it
  if (Math.abs(high - low + Math.abs(step) - 360) > EDGE_DEG) return null;
  if (step > 0) return { index: nodes.length - 1, share: (turned - high) / step };
  turned -= 360;
  return { index: nodes.length - 1, share: (turned - low) / step };
}
