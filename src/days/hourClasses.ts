import { quantile } from '../stats/index.js';

const CLASSES = 3;
/** All but the earliest and the latest 1 % of the shots span the working hours. */
const TAIL = 0.01;

/** Working hours in equal thirds of solar time. */
export interface HourClasses {
  /** Limits of the classes on a clock that does not jump at midnight: first, two between, last. */
  readonly edges: readonly number[];
  readonly spanHours: number;
  /** Class of every row; -1 for a row without a time. */
  readonly classOf: Int32Array;
}

/**
 * Equal thirds of the solar time between its 1 % and 99 % quantiles; what lies beyond belongs to the nearest third.
 * Night work is cut where nobody works, not at midnight.
 * @param hours solar time of every row, [0, 24); NaN where it is not known
 * @returns null when no row has a time
 */
export function hourClasses(hours: Float64Array): HourClasses | null {
  const known = hours.filter((hour) => !Number.isNaN(hour));
  if (known.length === 0) return null;
  const start = afterLongestBreak(known);
  const onward = (hour: number): number => (hour < start ? hour + 24 : hour);
  const clock = known.map(onward);
  const [first, last] = [quantile(clock, TAIL), quantile(clock, 1 - TAIL)];
  const width = (last - first) / CLASSES;
  const edges = [first, first + width, first + 2 * width, last];
  return {
    edges,
    spanHours: last - first,
    classOf: Int32Array.from(hours, (hour) => {
      if (Number.isNaN(hour)) return -1;
      const at = onward(hour);
      return at < edges[1]! ? 0 : at < edges[2]! ? 1 : 2;
    }),
  };
}

/** The hour at which work begins again after the longest break of the day. */
function afterLongestBreak(hours: Float64Array): number {
  const sorted = Float64Array.from(hours).sort();
  let [start, longest] = [sorted[0]!, sorted[0]! + 24 - sorted[sorted.length - 1]!];
  for (let i = 1; i < sorted.length; i++) {
    const gap = sorted[i]! - sorted[i - 1]!;
    if (gap > longest) [start, longest] = [sorted[i]!, gap];
  }
  return start;
}
