import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';

/** A quantity whose values in these errors go with distance, so that its effect may pass for one of distance. */
export interface DistanceCompanion {
  readonly quantity: 'height difference' | 'hour' | 'date';
  /** Correlation with baseline length over the occupations, -1 to 1; null where it cannot be given. */
  readonly correlation: number | null;
}

export interface DistanceCompanions {
  readonly companions: readonly DistanceCompanion[];
  readonly notes: readonly Message[];
}

/** From this correlation on the two can hardly be told apart. */
const STRONG = 0.7;
const FEWEST = 10;
const MS_A_DAY = 86_400_000;

/**
 * Correlations of baseline length with height difference, hour and date. Columns that are missing give null.
 * @throws InputError without a column `baselineKm` or `day`
 */
export function goesWithDistance(errors: ErrorsInput): DistanceCompanions {
  const columns = errorColumns(errors);
  const lengths = columns.numbers('baselineKm', 'goesWithDistance');
  const days = columns.texts('day', 'goesWithDistance');
  const optional = (name: string): Float64Array | null =>
    columns.has(name) ? columns.numbers(name, 'goesWithDistance') : null;
  const dates = Float64Array.from(days, (day) => Date.parse(`${day}T00:00:00Z`) / MS_A_DAY);
  const companions: DistanceCompanion[] = [
    // How high above or below makes no difference to the air between.
    {
      quantity: 'height difference',
      correlation: correlation(lengths, optional('heightDifferenceM')?.map(Math.abs)),
    },
    { quantity: 'hour', correlation: correlation(lengths, optional('solarHour')) },
    { quantity: 'date', correlation: correlation(lengths, dates) },
  ];
  const notes = companions.flatMap(({ quantity, correlation: r }) => {
    if (r === null || Math.abs(r) <= STRONG) return [];
    const how =
      quantity === 'height difference'
        ? `the farther marks are those with the ${r > 0 ? 'larger' : 'smaller'} height difference from the base`
        : `far shots were taken ${r > 0 ? 'late' : 'early'}${quantity === 'hour' ? ' in the day' : ' in the period'}`;
    return [
      message(
        'warning',
        'goes-with-distance',
        `Distance goes with ${quantity} (correlation ${r.toFixed(2).replace('-', '−')}): ${how}, and an effect of ${quantity} passes for one of distance. Mix them: take far and near shots at all of them.`,
      ),
    ];
  });
  return { companions, notes };
}

/** Product-moment correlation over the pairs where both are known; null with few pairs or without spread. */
function correlation(a: Float64Array, b: Float64Array | null | undefined): number | null {
  if (b === null || b === undefined) return null;
  const known = Array.from(a.keys()).filter((i) => Number.isFinite(a[i]!) && Number.isFinite(b[i]!));
  if (known.length < FEWEST) return null;
  // In the order of the values, so that the order of rows does not matter.
  known.sort((i, j) => a[i]! - a[j]! || b[i]! - b[j]!);
  const mean = (column: Float64Array): number => known.reduce((sum, i) => sum + column[i]!, 0) / known.length;
  const [meanA, meanB] = [mean(a), mean(b)];
  let [aa, ab, bb] = [0, 0, 0];
  for (const i of known) {
    aa += (a[i]! - meanA) ** 2;
    ab += (a[i]! - meanA) * (b[i]! - meanB);
    bb += (b[i]! - meanB) ** 2;
  }
  const size = Math.sqrt(aa * bb);
  return size > 1e-12 * known.length ? ab / size : null;
}
