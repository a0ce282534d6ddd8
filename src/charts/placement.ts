/** A rectangle in pixels, y downwards. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Area that two boxes share, px². */
export function overlapArea(a: Box, b: Box): number {
  const width = Math.min(a.right, b.right) - Math.max(a.left, b.left);
  const height = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
  return width > 0 && height > 0 ? width * height : 0;
}

/** Area of a box that lies outside another one, px². */
export function areaOutside(box: Box, outer: Box): number {
  return (box.right - box.left) * (box.bottom - box.top) - overlapArea(box, outer);
}

/** A place that a label could take. `wish` is a small extra cost, px², of the less natural places. */
export interface LabelPlace<T> {
  readonly box: Box;
  readonly wish: number;
  readonly place: T;
}

/** A chosen place with the area, px², by which it covers what stood there before. */
export interface ChosenPlace<T> extends LabelPlace<T> {
  readonly coveredPx2: number;
}

/**
 * Chooses a place for each label, one after the other: the one that covers least of what stands there already, with
 * everything outside the plot counting ten times.
 * @param labels for each label the places it could take
 * @param obstacles what must not be covered
 * @returns the chosen places, in the order of the labels
 */
export function placeLabels<T>(
  labels: readonly (readonly LabelPlace<T>[])[],
  obstacles: readonly Box[],
  plot: Box,
): ChosenPlace<T>[] {
  const taken = [...obstacles];
  return labels.map((places) => {
    const judged = places.map((place) => ({ ...place, coveredPx2: coveredArea(place.box, taken, plot) }));
    const best = judged.reduce((a, b) => (b.coveredPx2 + b.wish < a.coveredPx2 + a.wish ? b : a));
    taken.push(best.box);
    return best;
  });
}

const coveredArea = (box: Box, taken: readonly Box[], plot: Box): number =>
  taken.reduce((total, other) => total + overlapArea(box, other), 10 * areaOutside(box, plot));

/**
 * Moves centres of labels of given heights apart so that none overlap, each as little as possible (pool adjacent
 * violators on the centres less the room that the labels before need).
 * @param centres wished centres, px
 * @param heights heights of the labels, px
 * @returns the centres, in the order given
 */
export function spreadLabels(centres: readonly number[], heights: readonly number[]): number[] {
  const order = Array.from(centres.keys()).sort((i, j) => centres[i]! - centres[j]! || i - j);
  let room = 0;
  const rooms = order.map((i, k) => {
    room += k === 0 ? 0 : (heights[order[k - 1]!]! + heights[i]!) / 2;
    return room;
  });
  const pools: { total: number; count: number }[] = [];
  order.forEach((i, k) => {
    pools.push({ total: centres[i]! - rooms[k]!, count: 1 });
    for (
      let [b, a] = lastTwo(pools);
      a && b && b.total / b.count < a.total / a.count;
      [b, a] = lastTwo(pools)
    ) {
      pools.splice(-2, 2, { total: a.total + b.total, count: a.count + b.count });
    }
  });
  const levels = pools.flatMap(({ total, count }) => new Array<number>(count).fill(total / count));
  const result = new Array<number>(centres.length);
  order.forEach((i, k) => {
    result[i] = levels[k]! + rooms[k]!;
  });
  return result;
}

const lastTwo = <T>(list: readonly T[]): [T | undefined, T | undefined] => [list.at(-1), list.at(-2)];
