import type { FitData } from '../prepareErrors.js';
import { markCells } from './markCells.js';

/** A mark counts as repeated from so many days on … */
export const DAYS_OF_REPEATED_MARK = 3;
/** … and marks as repeating when this share of the occupations lies on repeated ones. */
export const SHARE_ON_REPEATED_MARKS = 0.5;

/** Share of the occupations on marks with three counting days or more. */
export function shareOnRepeatedMarks(
  data: FitData,
  { mark, base }: { readonly mark: readonly string[]; readonly base: readonly string[] | null },
): number {
  const cells = markCells({ ...data, mark, base: severalBases({ base }), azimuthDeg: null });
  let [on, total] = [0, 0];
  cells.cellOf.forEach((k, i) => {
    total += data.w[i]!;
    if (cells.countingDays[cells.markOf[k]!]! >= DAYS_OF_REPEATED_MARK) on += data.w[i]!;
  });
  return total > 0 ? on / total : 0;
}

/** Bases as part of what a day on a mark is, where there are several; null else. */
export const severalBases = ({
  base,
}: {
  readonly base: readonly string[] | null;
}): readonly string[] | null => (base !== null && new Set(base).size > 1 ? base : null);
