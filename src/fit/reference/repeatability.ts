import { inputError } from '../../logs/index.js';
import type { FormEstimate } from '../estimate.js';
import { type FitData, pickEntries } from '../prepareErrors.js';
import {
  cellCounts,
  cellMeans,
  type MarkCell,
  type MarkCells,
  markCells,
  othersMeans,
  othersVariance,
} from './markCells.js';
import { varianceAt, varianceModel } from './varianceModel.js';

/** What is known beside the errors themselves; null where the errors do not tell. */
export interface Places {
  readonly base: readonly string[] | null;
  readonly azimuthDeg: Float64Array | null;
}

/** A cell with its mean error, mm by axis (east and north, or up). */
export interface MarkDay extends MarkCell {
  readonly means: readonly number[];
  /** Whether enough weight lies in it for its mean to count. */
  readonly counts: boolean;
}

/** Errors counted from the mean of each mark's other days. */
export interface Repeatability {
  /** Squared and signed residuals of the occupations used, scaled to the variance of one occupation. */
  readonly data: FitData;
  /** Variance of the mean of the other days over that of one occupation, of each entry: h. */
  readonly othersShare: Float64Array;
  /** Correlation of occupations of one mark on one day. */
  readonly rho: number;
  readonly markDays: readonly MarkDay[];
  /** Occupations on marks with a single counting day, which say nothing of repeatability. */
  readonly setAside: number;
  /** Occupations left out with their mark's day because it holds hardly any weight. */
  readonly withoutWeight: number;
}

const MOST_PASSES = 100;
const TOLERANCE = 1e-10;

/**
 * Takes out of every error the mean of its mark's other days. With cells of one mark and day, o the mean of the other
 * cells' means and h the variance of o over that of one occupation, y = (e - o)²/(1 + h) has the variance of one
 * occupation. h needs the correlation ρ within a cell, which is found with the variance model in turns: 1 - ρ is the
 * scatter within cells over the model's. Several bases give cells of their own, so that the error of a base's
 * coordinates counts as scatter from day to day; h then weighs each day's variance at its own length.
 * @throws InputError when no mark was visited on two days, or nothing differs between days
 */
export function repeatability(data: FitData, mark: readonly string[], places: Places): Repeatability {
  const base = places.base !== null && new Set(places.base).size > 1 ? places.base : null;
  const cells = markCells({ ...data, mark, base, azimuthDeg: places.azimuthDeg });
  const means = data.components.map((column) => cellMeans(cells, column, data.w));
  const references = means.map((values) => othersMeans(cells, values));
  const kept = Array.from(cells.cellOf.keys()).filter(
    (i) => !Number.isNaN(references[0]![cells.cellOf[i]!]!),
  );
  if (kept.length === 0) {
    throw inputError(
      'no-mark-repeats',
      'Expected marks visited on two or more days for reference "repeatability", came none: no mark was visited on two days. Visit marks again on other days, or choose reference "absolute".',
    );
  }
  const residuals = data.components.map((column, c) =>
    Float64Array.from(kept, (i) => column[i]! - references[c]![cells.cellOf[i]!]!),
  );
  const squares = Float64Array.from(kept, (_, k) =>
    residuals.reduce((sum, column) => sum + column[k]! ** 2, 0),
  );
  if (squares.every((value) => value === 0)) {
    throw inputError(
      'no-errors',
      'Expected measured positions, came the same error on every day on each mark. The log repeats one position: export what was measured.',
    );
  }
  const within = scatterWithin(data, cells, means);
  const cellOf = Int32Array.from(kept, (i) => cells.cellOf[i]!);
  const picked = pickEntries(data, kept);
  const { rho, share } = alternate(picked, squares, cells, cellOf, within, data);
  const days = Float64Array.from(cellOf, (k) => cells.countingDays[cells.markOf[k]!]!);
  const lone = Array.from(cells.cellOf.keys()).filter((i) => {
    const k = cells.cellOf[i]!;
    return cellCounts(cells.cells[k]!) && cells.countingDays[cells.markOf[k]!]! < 2;
  });
  return {
    data: {
      ...picked,
      y: squares.map((value, k) => value / (1 + share[k]!)),
      components: residuals.map((column) => column.map((value, k) => value / Math.sqrt(1 + share[k]!))),
      sharing: days.map((count) => count / (count - 1)),
    },
    othersShare: share,
    rho,
    markDays: cells.cells.map((cell, k) => ({
      ...cell,
      means: means.map((values) => values[k]!),
      counts: cellCounts(cell),
    })),
    setAside: lone.length,
    withoutWeight: data.y.length - kept.length - lone.length,
  };
}

/** Σ over axes of w (e - mean of the cell)², of each occupation in a counting cell; 0 in the others. */
function scatterWithin(data: FitData, cells: MarkCells, means: readonly Float64Array[]): Float64Array {
  return data.w.map((w, i) => {
    const k = cells.cellOf[i]!;
    if (!cellCounts(cells.cells[k]!)) return 0;
    let sum = 0;
    for (let c = 0; c < means.length; c++) sum += (data.components[c]![i]! - means[c]![k]!) ** 2;
    return w * sum;
  });
}

/** Variance model and ρ in turns until ρ and h stand. */
function alternate(
  picked: FitData,
  squares: Float64Array,
  cells: MarkCells,
  cellOf: Int32Array,
  within: Float64Array,
  { l }: FitData,
): { readonly rho: number; readonly share: Float64Array } {
  const repeats = cells.cells.reduce(
    (sum, cell) => sum + (cellCounts(cell) ? Math.max(0, cell.weight - 1) : 0),
    0,
  );
  let rho = repeats > 0 ? 0.5 : 0;
  let model: Pick<FormEstimate, 'form' | 'p' | 'q'> = { form: 'root-sum-square', p: 1, q: 0 };
  let share = new Float64Array(cellOf.length);
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    const mu = Float64Array.from(cells.cells, (cell) => varianceAt(model, cell.l));
    const byCell = othersVariance(cells, rho, mu);
    const before = share;
    share = new Float64Array(cellOf.length);
    const y = new Float64Array(cellOf.length);
    for (let k = 0; k < y.length; k++) {
      share[k] = byCell[cellOf[k]!]!;
      y[k] = squares[k]! / (1 + share[k]!);
    }
    model = varianceModel({ ...picked, y }, pass === 0 ? undefined : model);
    let scatter = 0;
    for (let i = 0; i < l.length; i++) scatter += within[i]! / varianceAt(model, l[i]!);
    const next = repeats > 0 ? Math.min(1, Math.max(0, 1 - scatter / repeats)) : 0;
    const still =
      Math.abs(next - rho) < TOLERANCE && share.every((value, k) => Math.abs(value - before[k]!) < TOLERANCE);
    rho = next;
    if (still) break;
  }
  return { rho, share };
}
