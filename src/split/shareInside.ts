import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { studentTQuantile } from '../stats/index.js';
import { clusteredMean } from './clusteredMean.js';

/** How many of the occupations up to a distance lie within a limit. */
export interface ShareInside {
  /** Distance of a mark, km; all occupations up to and with it count. */
  readonly baselineKm: number;
  readonly occupations: number;
  readonly inside: number;
  readonly days: number;
  readonly share: number;
  /** Day-clustered limits on the log-odds scale; null with fewer than two days, or none or all inside. */
  readonly low: number | null;
  readonly high: number | null;
}

export interface ShareInsideOptions {
  /** Horizontal counts radial errors, vertical the sizes of height errors. */
  readonly component: 'horizontal' | 'vertical';
  readonly limitMm: number;
  /** Level of the limits; default 0.95. */
  readonly confidence?: number | undefined;
}

/** Distances closer than this are one, km: the same mark by coordinates rounded differently. */
const SAME_KM = 0.01;
/** Curves need no more points. */
const MOST_POINTS = 200;

/**
 * Share of the occupations up to each distance that lie within a limit, out to the farthest. Occupations whose component
 * is not known do not count.
 * @throws InputError when a column is missing
 */
export function shareInsideByDistance(
  errors: ErrorsInput,
  { component, limitMm, confidence = 0.95 }: ShareInsideOptions,
): ShareInside[] {
  const columns = errorColumns(errors);
  const numbers = (name: string): Float64Array => columns.numbers(name, 'the share inside a limit');
  const lengths = numbers('baselineKm');
  const days = columns.texts('day', 'the share inside a limit');
  const sizes = errorSizes(numbers, component);
  const rows = [...lengths.keys()]
    .filter((i) => !Number.isNaN(sizes[i]!))
    .sort(
      (i, j) =>
        lengths[i]! - lengths[j]! ||
        (days[i]! < days[j]! ? -1 : days[i]! > days[j]! ? 1 : sizes[i]! - sizes[j]!),
    );
  return lastRows(rows.map((i) => lengths[i]!)).map((end): ShareInside => {
    const nearer = rows.slice(0, end + 1);
    const inside = nearer.map((i) => (sizes[i]! <= limitMm ? 1 : 0));
    const {
      mean,
      standardError,
      days: groups,
    } = clusteredMean(
      inside,
      nearer.map((i) => days[i]!),
    );
    return {
      baselineKm: lengths[rows[end]!]!,
      occupations: nearer.length,
      inside: inside.filter((one) => one === 1).length,
      days: groups,
      share: mean,
      ...limitsOf(mean, standardError, groups, confidence),
    };
  });
}

function errorSizes(
  numbers: (name: string) => Float64Array,
  component: ShareInsideOptions['component'],
): Float64Array {
  if (component === 'vertical') return numbers('up').map(Math.abs);
  const north = numbers('north');
  return numbers('east').map((east, i) => Math.hypot(east, north[i]!));
}

/** Index of the last row of each distance; of very many distances evenly chosen ones, the last among them. */
function lastRows(sorted: readonly number[]): number[] {
  const ends = [...sorted.keys()].filter((i) => !(sorted[i + 1]! - sorted[i]! < SAME_KM));
  if (ends.length <= MOST_POINTS) return ends;
  return Array.from(
    { length: MOST_POINTS },
    (_, k) => ends[Math.ceil(((k + 1) * ends.length) / MOST_POINTS) - 1]!,
  );
}

function limitsOf(
  share: number,
  standardError: number,
  days: number,
  confidence: number,
): { low: number | null; high: number | null } {
  if (days < 2 || share <= 0 || share >= 1) return { low: null, high: null };
  const half = (studentTQuantile((1 + confidence) / 2, days - 1) * standardError) / (share * (1 - share));
  const odds = Math.log(share / (1 - share));
  const inverse = (x: number): number => 1 / (1 + Math.exp(-x));
  return { low: inverse(odds - half), high: inverse(odds + half) };
}
