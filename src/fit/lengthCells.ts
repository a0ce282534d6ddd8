import type { SquaredErrors } from './scoring.js';

/** Numbers of rows, sums of weights and of weighted squared errors by cell. */
interface Sums {
  readonly rows: Int32Array;
  readonly weights: Float64Array;
  readonly squares: Float64Array;
}

/** The cells that one group (a day, a mark) has rows in, and its sums there. */
export interface GroupCells extends Sums {
  readonly name: string;
  /** Places in the arrays of all cells. */
  readonly cells: Int32Array;
}

/**
 * Sums by distinct length, in all and of each group. A fit depends on the errors of one length through their weight and
 * their weighted sum of squares alone, so that fits without a group need no rows.
 */
export interface LengthCells extends Sums {
  /** Distinct squared lengths, ascending, km². */
  readonly lengths: Float64Array;
  /** By name. */
  readonly groups: readonly GroupCells[];
}

/** Rows of weight 0 take no part. @param keys the group of each row */
export function lengthCells({ y, l, w }: SquaredErrors, keys: readonly string[]): LengthCells {
  const lengths = Float64Array.from(new Set(l)).sort();
  const index = new Map(Array.from(lengths, (length, k) => [length, k]));
  const all = emptySums(lengths.length);
  const perGroup = new Map<string, Map<number, [rows: number, weight: number, square: number]>>();
  for (let i = 0; i < y.length; i++) {
    if (!(w[i]! > 0)) continue;
    const k = index.get(l[i]!)!;
    let own = perGroup.get(keys[i]!);
    if (own === undefined) {
      own = new Map();
      perGroup.set(keys[i]!, own);
    }
    let cell = own.get(k);
    if (cell === undefined) {
      cell = [0, 0, 0];
      own.set(k, cell);
    }
    cell[0] += 1;
    cell[1] += w[i]!;
    cell[2] += w[i]! * y[i]!;
    all.rows[k]! += 1;
    all.weights[k]! += w[i]!;
    all.squares[k]! += w[i]! * y[i]!;
  }
  const groups = [...perGroup].map(([name, own]): GroupCells => {
    const cells = Int32Array.from(own.keys()).sort();
    const sums = emptySums(cells.length);
    cells.forEach((k, j) => {
      const [rows, weight, square] = own.get(k)!;
      sums.rows[j] = rows;
      sums.weights[j] = weight;
      sums.squares[j] = square;
    });
    return { name, cells, ...sums };
  });
  groups.sort((a, b) => (a.name < b.name ? -1 : 1));
  return { lengths, ...all, groups };
}

const emptySums = (cells: number): Sums => ({
  rows: new Int32Array(cells),
  weights: new Float64Array(cells),
  squares: new Float64Array(cells),
});

/** What is left to fit without one group: a mean square and a weight by length. */
export function withoutGroup(all: LengthCells, group: GroupCells): SquaredErrors {
  const [rows, weights, squares] = [all.rows.slice(), all.weights.slice(), all.squares.slice()];
  group.cells.forEach((k, j) => {
    rows[k]! -= group.rows[j]!;
    weights[k]! -= group.weights[j]!;
    squares[k]! -= group.squares[j]!;
  });
  const kept = Int32Array.from(rows.keys()).filter((k) => rows[k]! > 0);
  return {
    l: Float64Array.from(kept, (k) => all.lengths[k]!),
    w: Float64Array.from(kept, (k) => weights[k]!),
    y: Float64Array.from(kept, (k) => Math.max(0, squares[k]!) / weights[k]!),
  };
}
