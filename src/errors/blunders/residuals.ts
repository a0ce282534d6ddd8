import { median } from '../../stats/index.js';
import type { OccupationError } from '../computeErrors.js';
import { groupIndices } from '../groupIndices.js';
import { localScale } from './localScale.js';

/** Errors without what is the same on all days of a mark, and how large they usually are at their distance. */
export interface Residuals {
  readonly east: Float64Array;
  readonly north: Float64Array;
  readonly up: Float64Array;
  /** Usual size of one axis of the plan, and of the height, mm. */
  readonly planScale: Float64Array;
  readonly upScale: Float64Array;
}

/** Marks on fewer days have no middle of their own: their errors stand as they are. */
const FEWEST_DAYS = 3;

/** Residuals from the median of day medians of each mark from each base. */
export function markResiduals(errors: readonly OccupationError[]): Residuals {
  const [east, north, up] = (['east', 'north', 'up'] as const).map((component) =>
    Float64Array.from(errors, (error) => error[component]),
  ) as [Float64Array, Float64Array, Float64Array];
  for (const indices of groupIndices(errors.map(({ mark, base }) => `${mark}\u0000${base}`)).values()) {
    const days = groupIndices(indices.map((i) => errors[i]!.day));
    if (days.size < FEWEST_DAYS) continue;
    for (const values of [east, north, up]) {
      // What is not known of a mark is not known on any day.
      if (indices.some((i) => Number.isNaN(values[i]!))) continue;
      const middle = median([...days.values()].map((list) => median(list.map((k) => values[indices[k]!]!))));
      for (const i of indices) values[i]! -= middle;
    }
  }
  const lengths = errors.map(({ baselineKm }) => baselineKm);
  return {
    east,
    north,
    up,
    planScale: localScale(lengths, east, north),
    upScale: localScale(lengths, up),
  };
}
