import type { ErrorColumns } from '../errors/index.js';
import { groupOrder } from './derivedColumns.js';

/**
 * A column to split by: a text column by its name, a numeric one with the edges of its classes. `month`, `direction` and
 * `occupationSeconds` follow from other columns.
 */
export type SplitBy = string | { readonly column: string; readonly edges: readonly number[] };

/** One group of a split. */
export interface Group {
  /** Value of the column, or the class like `5-10`; `outside` all edges, or `not known`. */
  readonly group: string;
  /** Limits of a numeric class, from (included) to (excluded); null for named groups. */
  readonly from: number | null;
  readonly to: number | null;
}

export const columnOf = (by: SplitBy): string => (typeof by === 'string' ? by : by.column);

const NOT_KNOWN = 'not known';
const OUTSIDE = 'outside';
const named = (group: string): Group => ({ group, from: null, to: null });

/**
 * The group of every row; rows of one group share one object.
 * @throws InputError when the column is missing
 */
export function groupsOf(columns: ErrorColumns, by: SplitBy): Group[] {
  const needed = `the split by ${columnOf(by)}`;
  if (typeof by === 'string') {
    const known = new Map<string, Group>();
    return columns.texts(by, needed).map((text) => {
      const name = text === '' || text === 'NaN' ? NOT_KNOWN : text;
      const group = known.get(name) ?? named(name);
      known.set(name, group);
      return group;
    });
  }
  const { column, edges } = by;
  const classes = edges.slice(1).map((to, k): Group => ({ group: `${edges[k]}-${to}`, from: edges[k]!, to }));
  const [outside, notKnown] = [named(OUTSIDE), named(NOT_KNOWN)];
  return Array.from(columns.numbers(column, needed), (value) =>
    Number.isNaN(value)
      ? notKnown
      : (classes.find(({ from, to }) => value >= from! && value < to!) ?? outside),
  );
}

/** Order of groups: classes by their limits, directions clockwise from north, names sorted; what is not known last. */
export function groupComparison(by: SplitBy): (a: Group, b: Group) => number {
  const order = typeof by === 'string' ? groupOrder(by) : null;
  const rank = ({ group, from }: Group): number => {
    if (group === NOT_KNOWN) return Number.POSITIVE_INFINITY;
    return from ?? (typeof by === 'string' ? (order?.indexOf(group) ?? 0) : Number.MAX_VALUE);
  };
  return (a, b) => {
    const [first, second] = [rank(a), rank(b)];
    if (first !== second) return first < second ? -1 : 1;
    return a.group < b.group ? -1 : a.group > b.group ? 1 : 0;
  };
}
