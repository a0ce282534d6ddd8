import { type ErrorColumns, type ErrorsInput, errorColumns, groupIndices } from '../errors/index.js';
import { sum } from '../stats/index.js';
import { clusteredMean, type Interval, rootMeanSquare } from './clusteredMean.js';

/** One cell of a split. Lengths in km, errors in mm. */
export interface SummaryRow {
  /** Value of the column, or the class like `5-10`. */
  readonly group: string;
  /** Limits of a numeric class, from (included) to (excluded); null for named groups. */
  readonly from: number | null;
  readonly to: number | null;
  readonly occupations: number;
  readonly days: number;
  /** Root-mean-square baseline of the cell. */
  readonly baselineKm: number;
  /** Radial RMS with the limits of its day-clustered interval; null when no plan error is known. */
  readonly horizontalRms: Interval | null;
  readonly verticalRms: Interval | null;
  /** Mean errors; NaN when not known. */
  readonly meanEast: number;
  readonly meanNorth: number;
  readonly meanUp: number;
  /** Fewer than 10 occupations or 3 days: the figures describe these occupations and nothing more. */
  readonly tooFew: boolean;
}

/** A column to split by: a text column by its name, a numeric one with the edges of its classes. */
export type SplitBy = string | { readonly column: string; readonly edges: readonly number[] };

/** Classes of baseline length for tables and charts, km. */
export const LENGTH_EDGES_KM: readonly number[] = [
  0, 1, 2, 3, 5, 7.5, 10, 15, 20, 30, 40, 60, 80, 100, 150, 250, 500, 1000,
];

const FEWEST_OCCUPATIONS = 10;
const FEWEST_DAYS = 3;

/**
 * Splits errors into groups and states count, days, RMS and bias of each. Groups without occupations are left out;
 * the groups are disjoint and together hold every occupation (a value outside all edges forms the group `outside`).
 * @throws InputError when a column is missing
 */
export function summarizeBy(
  errors: ErrorsInput,
  by: SplitBy,
  options: { readonly confidence?: number } = {},
): SummaryRow[] {
  const columns = errorColumns(errors);
  const needed = 'summarizeBy';
  const [east, north, up, lengths] = ['east', 'north', 'up', 'baselineKm'].map((name) =>
    columns.numbers(name, needed),
  ) as [Float64Array, Float64Array, Float64Array, Float64Array];
  const days = columns.texts('day', needed);
  return classify(columns, by).flatMap(({ group, members }) => {
    if (members.length === 0) return [];
    const known = (values: Float64Array): number[] => members.filter((i) => !Number.isNaN(values[i]!));
    const plan = known(east).filter((i) => !Number.isNaN(north[i]!));
    const heights = known(up);
    const confidence = options.confidence ?? 0.95;
    const rms = (indices: readonly number[], square: (i: number) => number): Interval | null =>
      rootMeanSquare(
        indices.map(square),
        indices.map((i) => days[i]!),
        confidence,
      );
    const mean = (values: Float64Array, indices: readonly number[]): number =>
      indices.length === 0
        ? Number.NaN
        : clusteredMean(
            indices.map((i) => values[i]!),
            indices.map((i) => days[i]!),
          ).mean;
    const dayCount = new Set(members.map((i) => days[i]!)).size;
    const row: SummaryRow = {
      ...group,
      occupations: members.length,
      days: dayCount,
      baselineKm: Math.sqrt(sum(members.map((i) => lengths[i]! ** 2)) / members.length),
      horizontalRms: rms(plan, (i) => east[i]! ** 2 + north[i]! ** 2),
      verticalRms: rms(heights, (i) => up[i]! ** 2),
      meanEast: mean(east, plan),
      meanNorth: mean(north, plan),
      meanUp: mean(up, heights),
      tooFew: members.length < FEWEST_OCCUPATIONS || dayCount < FEWEST_DAYS,
    };
    return [row];
  });
}

interface Group {
  readonly group: string;
  readonly from: number | null;
  readonly to: number | null;
}

/** The groups in order, each with the indices of its members. */
type Classes = readonly { readonly group: Group; readonly members: readonly number[] }[];

function classify(columns: ErrorColumns, by: SplitBy): Classes {
  const needed = `the split by ${typeof by === 'string' ? by : by.column}`;
  if (typeof by === 'string') {
    return [...groupIndices(columns.texts(by, needed))]
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([group, list]) => ({ group: { group, from: null, to: null }, members: list }));
  }
  const { column, edges } = by;
  const classes = edges.slice(1).map((to, k) => ({ from: edges[k]!, to, members: [] as number[] }));
  const outside: number[] = [];
  columns.numbers(column, needed).forEach((value, i) => {
    (classes.find(({ from, to }) => value >= from && value < to)?.members ?? outside).push(i);
  });
  return [
    ...classes.map(({ from, to, members }) => ({ group: { group: `${from}-${to}`, from, to }, members })),
    { group: { group: 'outside', from: null, to: null }, members: outside },
  ];
}
