import { groupIndices } from '../../errors/index.js';
import { type FitData, pickEntries } from '../prepareErrors.js';
import { cellCounts, markCells } from './markCells.js';
import type { SetupOffset } from './relative.js';
import { severalBases } from './repeatedMarks.js';
import { azimuthSpread, visitsOf } from './visits.js';

/** The columns that the reference `relative` needs beside the errors, in the order of the data. */
export interface RelativeInput {
  readonly mark: readonly string[];
  readonly base: readonly string[] | null;
  readonly setup: readonly string[];
  readonly rover: readonly string[] | null;
  readonly startMs: Float64Array;
  readonly azimuthDeg: Float64Array;
}

export const FEWEST_VISITS = 3;
export const LEAST_SPREAD_DEG = 90;

/** Leaves out setups that cannot be separated and marks without a second day, until all that remain can be used. */
export function usable(data: FitData, input: RelativeInput, all: readonly number[], marksOut: boolean) {
  let kept = all;
  let onLoneMarks = 0;
  for (;;) {
    const part = pickEntries(data, kept);
    const chosen = pickInput(input, kept);
    let next = kept;
    if (marksOut) {
      const cells = markCells({ ...part, mark: chosen.mark, base: severalBases(chosen), azimuthDeg: null });
      next = kept.filter((_, k) => {
        const cell = cells.cellOf[k]!;
        return cellCounts(cells.cells[cell]!) && cells.countingDays[cells.markOf[cell]!]! >= 2;
      });
      onLoneMarks += kept.length - next.length;
    }
    const separable = new Set(
      describeSetups(data, input, next).flatMap((one) => (one.reason === null ? [one.setup] : [])),
    );
    next = next.filter((i) => separable.has(input.setup[i]!));
    if (next.length === kept.length || next.length === 0) return { kept: next, onLoneMarks };
    kept = next;
  }
}

export type DescribedSetup = Pick<
  SetupOffset,
  'setup' | 'occupations' | 'visits' | 'azimuthSpreadDeg' | 'reason'
>;

export function describeSetups(
  data: FitData,
  input: RelativeInput,
  entries: readonly number[],
): DescribedSetup[] {
  const chosen = pickInput(input, entries);
  const { visitOf, count } = visitsOf(chosen);
  const weight = new Float64Array(count);
  visitOf.forEach((v, k) => {
    weight[v]! += data.w[entries[k]!]!;
  });
  const groups = [...groupIndices(chosen.setup)].sort(([a], [b]) => (a < b ? -1 : 1));
  return groups.map(([setup, members]) => {
    const visits = new Set(members.map((k) => visitOf[k]!).filter((v) => weight[v]! >= 0.5)).size;
    const spread = azimuthSpread([
      ...new Set(members.map((k) => chosen.azimuthDeg[k]!).filter((value) => !Number.isNaN(value))),
    ]);
    const reason =
      visits < FEWEST_VISITS
        ? `it has ${visits} ${visits === 1 ? 'visit' : 'visits'}, fewer than ${FEWEST_VISITS}`
        : spread < LEAST_SPREAD_DEG
          ? `its marks lie within ${spread.toFixed(0)}° of direction, less than ${LEAST_SPREAD_DEG}°`
          : null;
    return { setup, occupations: members.length, visits, azimuthSpreadDeg: spread, reason };
  });
}

export function pickInput(input: RelativeInput, kept: readonly number[]): RelativeInput {
  const texts = (list: readonly string[]): string[] => kept.map((i) => list[i]!);
  const numbers = (list: Float64Array): Float64Array => Float64Array.from(kept, (i) => list[i]!);
  return {
    mark: texts(input.mark),
    base: input.base && texts(input.base),
    setup: texts(input.setup),
    rover: input.rover && texts(input.rover),
    startMs: numbers(input.startMs),
    azimuthDeg: numbers(input.azimuthDeg),
  };
}
