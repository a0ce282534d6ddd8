import { type Screening, type WrongFixGrowth, wrongFixGrowth } from '../../fit/index.js';

/** A screening as if only some of the rows had been screened; what was found in them is kept. */
export function screeningOf(screening: Screening, rows: readonly number[]): Screening {
  const place = new Map(rows.map((row, k) => [row, k]));
  return {
    ...screening,
    weights: Float64Array.from(rows, (row) => screening.weights[row]!),
    responsibilities: Float64Array.from(rows, (row) => screening.responsibilities[row]!),
    suspected: screening.suspected.flatMap((row) => place.get(row) ?? []),
  };
}

export const usable = (screening: Screening | null | undefined): Screening | null =>
  screening && !screening.refused && screening.share !== null ? screening : null;

/** Growth of wrong fixes from some of the rows; null without a screening. */
export function growthOf(
  records: readonly object[],
  screening: Screening | null,
  rows: readonly number[],
): WrongFixGrowth | null {
  if (screening === null) return null;
  return wrongFixGrowth(
    rows.map((row) => records[row]!),
    screeningOf(screening, rows),
  );
}
