import { type ErrorColumns, groupIndices } from '../errors/index.js';
import { COMPONENT_COLUMNS, type Component, type ErrorModel, type MarkDay } from '../fit/index.js';

/** The mean error of a mark as a study left it. */
export interface FrozenMark {
  readonly mark: string;
  /** East and north, or up, mm. */
  readonly meanMm: readonly number[];
  /** Days (of each base, where there are several) behind the mean. */
  readonly days: number;
  /** Variance of the mean over that of one occupation. */
  readonly share: number;
}

/** The marks' means of a fit of repeatability; null for other references, whose errors stand by themselves. */
export function frozenMarks({ repeatability }: Pick<ErrorModel, 'repeatability'>): FrozenMark[] | null {
  return repeatability && meansOf(repeatability.markDays, repeatability.rho);
}

/** Means over the counting days of each mark, in the order of their names. */
export function meansOf(markDays: readonly MarkDay[], rho: number): FrozenMark[] {
  const counting = markDays.filter(({ counts }) => counts);
  return [...groupIndices(counting.map(({ mark }) => mark))]
    .map(([mark, members]): FrozenMark => {
      const cells = members.map((k) => counting[k]!);
      const days = cells.length;
      const shares = cells.reduce((sum, { weight }) => sum + rho + (1 - rho) / Math.max(weight, 1), 0);
      return {
        mark,
        meanMm: cells[0]!.means.map((_, c) => cells.reduce((sum, { means }) => sum + means[c]!, 0) / days),
        days,
        share: shares / days ** 2,
      };
    })
    .sort((a, b) => (a.mark < b.mark ? -1 : 1));
}

/** Errors of shots that had no part in a fit, on the scale of one occupation. */
export interface NewErrors {
  /** Rows of the errors, ascending: those with the component, a length above 0, and a mark whose mean is known. */
  readonly rows: readonly number[];
  /** Squared error and squared length of each, mm² and km². */
  readonly y: Float64Array;
  readonly l: Float64Array;
  /** Signed errors by axis. */
  readonly components: readonly Float64Array[];
  /** Rows left out because their mark has no mean. */
  readonly onNewMarks: readonly number[];
}

/**
 * New errors counted from frozen means: (e - mean)/√(1 + share), which has the variance of one occupation.
 * @param marks null: the errors as they stand
 */
export function newErrors(
  columns: ErrorColumns,
  component: Component,
  marks: readonly FrozenMark[] | null,
  among: readonly number[],
): NewErrors {
  const neededFor = `component "${component}"`;
  const values = COMPONENT_COLUMNS[component].map((name) => columns.numbers(name, neededFor));
  const lengths = columns.numbers('baselineKm', 'every fit');
  const known = among.filter(
    (i) =>
      lengths[i]! > 0 && Number.isFinite(lengths[i]!) && values.every((column) => !Number.isNaN(column[i]!)),
  );
  const names = marks === null ? null : columns.texts('mark', 'the means of marks');
  const means = new Map(marks?.map((mark) => [mark.mark, mark]));
  const rows = names === null ? known : known.filter((i) => means.has(names[i]!));
  const components = values.map((column, c) =>
    Float64Array.from(rows, (i) => {
      if (names === null) return column[i]!;
      const { meanMm, share } = means.get(names[i]!)!;
      return (column[i]! - meanMm[c]!) / Math.sqrt(1 + share);
    }),
  );
  return {
    rows,
    y: Float64Array.from(rows, (_, k) => components.reduce((sum, column) => sum + column[k]! ** 2, 0)),
    l: Float64Array.from(rows, (i) => lengths[i]! ** 2),
    components,
    onNewMarks: names === null ? [] : known.filter((i) => !means.has(names[i]!)),
  };
}
