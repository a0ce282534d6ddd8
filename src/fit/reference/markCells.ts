/** The occupations of one mark on one day (and from one base, where there are several). */
export interface MarkCell {
  readonly mark: string;
  readonly day: string;
  /** Null where the errors do not tell the base. */
  readonly base: string | null;
  /** Sum of the weights of its occupations. */
  readonly weight: number;
  /** Mean squared length, km². */
  readonly l: number;
  /** Direction from the base, degrees; null where the errors do not tell. */
  readonly azimuthDeg: number | null;
}

/** Cells with the marks they belong to. */
export interface MarkCells {
  readonly cells: readonly MarkCell[];
  /** Cell of each occupation. */
  readonly cellOf: Int32Array;
  /** Names of the marks in order. */
  readonly marks: readonly string[];
  /** Mark of each cell. */
  readonly markOf: Int32Array;
  /** Counting cells of each mark: D. */
  readonly countingDays: Int32Array;
}

/** What the grouping into cells needs of the occupations. */
export interface CellInput {
  readonly mark: readonly string[];
  readonly day: readonly string[];
  readonly base: readonly string[] | null;
  readonly azimuthDeg: Float64Array | null;
  readonly l: Float64Array;
  readonly w: Float64Array;
}

/** Below this weight a cell has no mean: a lone wrong fix would be one. */
const LEAST_WEIGHT = 0.5;

export const cellCounts = ({ weight }: MarkCell): boolean => weight >= LEAST_WEIGHT;

/** Groups occupations by mark, base and day; cells in the order of their names. */
export function markCells({ mark, day, base, azimuthDeg, l, w }: CellInput): MarkCells {
  const keys = mark.map((name, i) => `${name}\u0000${base?.[i] ?? ''}\u0000${day[i]}`);
  const names = [...new Set(keys)].sort();
  const index = new Map(names.map((name, k) => [name, k]));
  const cellOf = Int32Array.from(keys, (key) => index.get(key)!);
  const [weight, lengths, counts] = [0, 1, 2].map(() => new Float64Array(names.length)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  const first = new Int32Array(names.length).fill(-1);
  cellOf.forEach((k, i) => {
    weight[k]! += w[i]!;
    lengths[k]! += l[i]!;
    counts[k]! += 1;
    if (first[k] === -1) first[k] = i;
  });
  const cells = names.map((_, k): MarkCell => {
    const i = first[k]!;
    const azimuth = azimuthDeg?.[i];
    return {
      mark: mark[i]!,
      day: day[i]!,
      base: base?.[i] ?? null,
      weight: weight[k]!,
      l: lengths[k]! / counts[k]!,
      azimuthDeg: azimuth === undefined || Number.isNaN(azimuth) ? null : azimuth,
    };
  });
  const marks = [...new Set(mark)].sort();
  const markIndex = new Map(marks.map((name, m) => [name, m]));
  const markOf = Int32Array.from(cells, (cell) => markIndex.get(cell.mark)!);
  const countingDays = new Int32Array(marks.length);
  cells.forEach((cell, k) => {
    if (cellCounts(cell)) countingDays[markOf[k]!]! += 1;
  });
  return { cells, cellOf, marks, markOf, countingDays };
}

/** Weighted mean of a column in each cell; 0 in cells without weight. */
export function cellMeans({ cells, cellOf }: MarkCells, column: Float64Array, w: Float64Array): Float64Array {
  const sums = new Float64Array(cells.length);
  for (let i = 0; i < column.length; i++) sums[cellOf[i]!]! += w[i]! * column[i]!;
  return sums.map((value, k) => (cells[k]!.weight > 0 ? value / cells[k]!.weight : 0));
}

/** Sum of a value over the counting cells of each mark. */
export function markSums({ cells, marks, markOf }: MarkCells, values: Float64Array): Float64Array {
  const sums = new Float64Array(marks.length);
  cells.forEach((cell, k) => {
    if (cellCounts(cell)) sums[markOf[k]!]! += values[k]!;
  });
  return sums;
}

/** Mean over the other counting cells of the same mark: what a cell is compared with; NaN where there is none. */
export function othersMeans(cells: MarkCells, means: Float64Array): Float64Array {
  const totals = markSums(cells, means);
  return means.map((mean, k) => {
    const m = cells.markOf[k]!;
    const others = cells.countingDays[m]! - 1;
    return others >= 1 && cellCounts(cells.cells[k]!) ? (totals[m]! - mean) / others : Number.NaN;
  });
}

/** Variance of a cell's mean over the variance of one occupation: ρ + (1 - ρ)/n. */
export const meanShare = ({ weight }: MarkCell, rho: number): number => rho + (1 - rho) / Math.max(weight, 1);

/**
 * Variance of the mean over the other cells, in units of the variance of one occupation of the cell itself.
 * @param mu variance of one occupation in each cell, mm²
 */
export function othersVariance(cells: MarkCells, rho: number, mu: Float64Array): Float64Array {
  const own = mu.map((value, k) => value * meanShare(cells.cells[k]!, rho));
  const totals = markSums(cells, own);
  return own.map((value, k) => {
    const m = cells.markOf[k]!;
    const others = Math.max(1, cells.countingDays[m]! - 1);
    return (totals[m]! - value) / others ** 2 / mu[k]!;
  });
}
