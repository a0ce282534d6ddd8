import { median } from '../../stats/index.js';

/** Neighbours in baseline length from which the usual size of an error is taken. */
const NEIGHBOURS = 60;
const MAD_TO_SIGMA = 1.4826022185;

/**
 * The usual size (standard deviation by the median of absolute values) of residuals near each baseline length: of the
 * neighbours in length, so that far shots are held against far shots.
 * @param lengths km; residuals of one or more components, mm, entry by entry
 */
export function localScale(
  lengths: ArrayLike<number>,
  ...components: readonly ArrayLike<number>[]
): Float64Array {
  const order = Array.from({ length: lengths.length }, (_, i) => i).sort((a, b) => lengths[a]! - lengths[b]!);
  const scale = new Float64Array(lengths.length);
  // One value for a stretch of neighbours: medians for every single one would cost more and say the same.
  const stretch = Math.max(1, NEIGHBOURS / 2);
  for (let start = 0; start < order.length; start += stretch) {
    const from = Math.max(0, Math.min(start - stretch / 2, order.length - NEIGHBOURS));
    const near = order.slice(from, from + NEIGHBOURS);
    const sizes = near.flatMap((i) =>
      components.map((component) => Math.abs(component[i]!)).filter((value) => !Number.isNaN(value)),
    );
    const value = sizes.length === 0 ? Number.NaN : MAD_TO_SIGMA * median(sizes);
    for (const i of order.slice(start, start + stretch)) scale[i] = value;
  }
  return scale;
}
