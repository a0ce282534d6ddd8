import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { countGrid } from '../../src/split/index.js';

const GRID = { xMax: 10, yMax: 4, columns: 5, rows: 2 };

describe('countGrid', () => {
  it('counts by hand: lower edges in, upper edges in the next cell, the far edges in the last', () => {
    const x = [0, 1.9, 2, 10, 11, 3];
    const y = [0, 1.9, 2, 4, 1, -0.1];
    expect(countGrid(x, y, GRID)).toEqual({
      cells: [
        { xFrom: 0, xTo: 2, yFrom: 0, yTo: 2, count: 2 },
        { xFrom: 2, xTo: 4, yFrom: 2, yTo: 4, count: 1 },
        { xFrom: 8, xTo: 10, yFrom: 2, yTo: 4, count: 1 },
      ],
      outside: 2,
    });
  });

  it('loses no point, and does not care for their order', () => {
    const points = fc.array(fc.tuple(fc.double({ min: -1, max: 12 }), fc.double({ min: -1, max: 6 })));
    fc.assert(
      fc.property(points, (list) => {
        const { cells, outside } = countGrid(
          list.map(([x]) => x),
          list.map(([, y]) => y),
          GRID,
        );
        expect(cells.reduce((sum, { count }) => sum + count, outside)).toBe(list.length);
        const reversed = [...list].reverse();
        expect(
          countGrid(
            reversed.map(([x]) => x),
            reversed.map(([, y]) => y),
            GRID,
          ),
        ).toEqual({ cells, outside });
      }),
      { seed: 4 },
    );
  });

  it('counts NaN as outside and refuses columns of different length', () => {
    expect(countGrid([Number.NaN, 1], [1, Number.NaN], GRID)).toEqual({ cells: [], outside: 2 });
    expect(() => countGrid([1, 2], [1], GRID)).toThrow('y: expected 2 numbers, as many as x, received 1');
  });
});
