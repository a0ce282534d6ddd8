/** One cell of a grid of counts; lower edges belong to the cell, upper edges to the next one. */
export interface CountCell {
  readonly xFrom: number;
  readonly xTo: number;
  readonly yFrom: number;
  readonly yTo: number;
  readonly count: number;
}

/** Extent of a grid from 0 in both directions, and into how many cells it is cut. */
export interface CountGridOptions {
  readonly xMax: number;
  readonly yMax: number;
  readonly columns: number;
  readonly rows: number;
}

/**
 * Counts points in the cells of a grid from (0, 0) to (xMax, yMax), both included; empty cells are left out.
 * @returns the cells, column by column, and how many points lie outside the grid
 * @throws RangeError when x and y differ in length
 */
export function countGrid(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  { xMax, yMax, columns, rows }: CountGridOptions,
): { readonly cells: CountCell[]; readonly outside: number } {
  if (x.length !== y.length) {
    throw new RangeError(`y: expected ${x.length} numbers, as many as x, received ${y.length}`);
  }
  const counts = new Map<number, number>();
  let outside = 0;
  for (let i = 0; i < x.length; i++) {
    const inside = x[i]! >= 0 && x[i]! <= xMax && y[i]! >= 0 && y[i]! <= yMax;
    if (!inside) {
      outside += 1;
      continue;
    }
    const column = Math.min(columns - 1, Math.floor((x[i]! / xMax) * columns));
    const row = Math.min(rows - 1, Math.floor((y[i]! / yMax) * rows));
    const key = column * rows + row;
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
  const cells = [...counts]
    .sort(([a], [b]) => a - b)
    .map(([key, count]): CountCell => {
      const [column, row] = [Math.floor(key / rows), key % rows];
      return {
        xFrom: (column * xMax) / columns,
        xTo: ((column + 1) * xMax) / columns,
        yFrom: (row * yMax) / rows,
        yTo: ((row + 1) * yMax) / rows,
        count,
      };
    });
  return { cells, outside };
}
