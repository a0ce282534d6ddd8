import { type ErrorsInput, errorColumns, groupIndices } from '../errors/index.js';
import { clusteredMean } from './clusteredMean.js';

/** Mean error of one mark, mm; null where it cannot be given (not known of the mark, or a single day for `se`). */
export interface MarkMean {
  readonly mark: string;
  readonly base: string;
  readonly baselineKm: number;
  readonly azimuthDeg: number;
  readonly occupations: number;
  readonly days: number;
  readonly east: number | null;
  readonly north: number | null;
  readonly up: number | null;
  /** Day-clustered standard errors of the means. */
  readonly se: { readonly east: number | null; readonly north: number | null; readonly up: number | null };
}

/**
 * Mean error of each mark from each base, nearest first.
 * @throws InputError when a column is missing
 */
export function markMeans(errors: ErrorsInput): MarkMean[] {
  const columns = errorColumns(errors);
  const needed = 'markMeans';
  const marks = columns.texts('mark', needed);
  const bases = columns.texts('base', needed);
  const days = columns.texts('day', needed);
  const numbers = (name: string): Float64Array => columns.numbers(name, needed);
  const [east, north, up, lengths, azimuths] = ['east', 'north', 'up', 'baselineKm', 'azimuthDeg'].map(
    numbers,
  ) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  const members = groupIndices(marks.map((mark, i) => `${mark}\u0000${bases[i]}`));
  return [...members.values()]
    .map((indices): MarkMean => {
      const [first] = indices as [number];
      const summary = (values: Float64Array): { mean: number | null; se: number | null } => {
        const known = indices.filter((i) => !Number.isNaN(values[i]!));
        if (known.length === 0) return { mean: null, se: null };
        const { mean, standardError } = clusteredMean(
          known.map((i) => values[i]!),
          known.map((i) => days[i]!),
        );
        return { mean, se: Number.isNaN(standardError) ? null : standardError };
      };
      const [e, n, u] = [summary(east), summary(north), summary(up)];
      return {
        mark: marks[first]!,
        base: bases[first]!,
        baselineKm: lengths[first]!,
        azimuthDeg: azimuths[first]!,
        occupations: indices.length,
        days: new Set(indices.map((i) => days[i]!)).size,
        east: e.mean,
        north: n.mean,
        up: u.mean,
        se: { east: e.se, north: n.se, up: u.se },
      };
    })
    .sort((a, b) => a.baselineKm - b.baselineKm || (a.mark < b.mark ? -1 : 1));
}
