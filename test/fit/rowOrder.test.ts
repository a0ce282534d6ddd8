import fc from 'fast-check';
import { expect, it } from 'vitest';
import { orderRows } from '../../src/fit/rowOrder.js';
import { randomStream } from '../../src/stats/index.js';

it('orders numbers of all signs and sizes as they ascend, both zeros as one, NaN last', () => {
  const numbers = [3, -1, Number.NaN, 0, -0, -5.5, 1e-300, -1e-300, Infinity, -Infinity, 2, 1e300];
  const order = orderRows(
    Int32Array.from(numbers.keys()),
    numbers.map(() => 'd'),
    [numbers],
  );
  expect([...order].map((k) => numbers[k]!)).toEqual([
    ...[-Infinity, -5.5, -1, -1e-300, 0, -0, 1e-300, 2, 3, 1e300, Infinity],
    Number.NaN,
  ]);
});

it('orders by day, then by each key in turn, as comparing rows one by one does', () => {
  const few = fc.constantFrom(-2, -1, 0, 1, 7.25);
  const row = fc.record({
    day: fc.constantFrom('b', 'a', 'c'),
    first: few,
    second: fc.double({ noNaN: true }),
  });
  fc.assert(
    fc.property(fc.array(row, { maxLength: 60 }), (rows) => {
      const order = orderRows(
        Int32Array.from(rows.keys()),
        rows.map(({ day }) => day),
        [rows.map(({ first }) => first), rows.map(({ second }) => second)],
      );
      const compared = [...rows.keys()].sort((i, j) => {
        const [a, b] = [rows[i]!, rows[j]!];
        return (
          (a.day < b.day ? -1 : a.day > b.day ? 1 : 0) || a.first - b.first || a.second - b.second || i - j
        );
      });
      expect([...order]).toEqual(compared);
    }),
    { seed: 11, numRuns: 200 },
  );
});

it('orders many rows as it orders few', () => {
  const random = randomStream(7);
  const numbers = Float64Array.from(
    { length: 40_000 },
    () => (random() - 0.5) * 10 ** Math.floor(20 * random() - 10),
  );
  const order = orderRows(
    Int32Array.from(numbers.keys()),
    Array.from(numbers, () => 'd'),
    [numbers],
  );
  expect(Float64Array.from(order, (k) => numbers[k]!)).toEqual(numbers.slice().sort());
});
