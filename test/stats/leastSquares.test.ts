import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leastSquares, RankDeficientError } from '../../src/stats/leastSquares.js';

interface Certified {
  readonly value: string;
  readonly sd: string;
}
interface DataSet {
  readonly n: number;
  readonly parameters: number;
  readonly certified: { readonly estimates: Record<string, Certified>; readonly residualSd: string };
  readonly data: readonly (readonly number[])[];
}
const read = (name: string) =>
  JSON.parse(readFileSync(new URL(`../fixtures/nist/${name}.json`, import.meta.url), 'utf8')) as DataSet;

/** Digits that agree with a certified value; for a certified 0, decimals. */
const digits = (value: number, certified: string): number => {
  const expected = Number(certified);
  const error = expected === 0 ? Math.abs(value) : Math.abs(value - expected) / Math.abs(expected);
  return error === 0 ? 16 : -Math.log10(error);
};
const column = (set: DataSet, value: (row: readonly number[]) => number) =>
  Float64Array.from(set.data, value);

describe('NIST StRD linear least squares', () => {
  const power = (k: number) => (row: readonly number[]) => row[1]! ** k;
  const asListed = (k: number) => (row: readonly number[]) => (k === 0 ? 1 : row[k]!);
  // digits demanded of coefficients; a data set's own difficulty (its condition and noise) sets them
  it.each([
    ['Norris', power, 12],
    ['NoInt1', () => power(1), 12],
    ['NoInt2', () => power(1), 12],
    ['Pontius', power, 12],
    ['Longley', asListed, 10],
    ['Wampler1', power, 9],
    ['Wampler2', power, 12],
    ['Wampler3', power, 9],
    ['Wampler4', power, 7],
    ['Wampler5', power, 7],
    // degree 10 with x from −9 to −3: no scaling beyond the one that leastSquares does itself
    ['Filip', power, 6],
  ] as const)('%s', (name, term, wanted) => {
    const set = read(name);
    const certified = Object.values(set.certified.estimates);
    expect(certified).toHaveLength(set.parameters);
    const columns = certified.map((_, k) => column(set, term(k)));
    const fit = leastSquares(
      columns,
      column(set, (row) => row[0]!),
    );
    const residualSd = Math.sqrt(fit.residualSumOfSquares / (set.n - set.parameters));
    const achieved = certified.map((value, k) => digits(fit.coefficients[k]!, value.value));
    const achievedSd = certified.map((value, k) =>
      digits(residualSd * Math.sqrt(fit.unscaledCovariance[k]![k]!), value.sd),
    );
    expect(Math.min(...achieved)).toBeGreaterThan(wanted);
    expect(Math.min(...achievedSd)).toBeGreaterThan(Math.min(wanted, 9));
    expect(digits(residualSd, set.certified.residualSd)).toBeGreaterThan(Math.min(wanted, 9));
  });
});

const line = (x: readonly number[]) => [new Float64Array(x.length).fill(1), Float64Array.from(x)];

describe('weights', () => {
  it('a weight of 2 is the same row twice, a weight of 0 no row', () => {
    const weighted = leastSquares(
      line([1, 2, 3, 9]),
      Float64Array.of(1, 3, 2, 50),
      Float64Array.of(1, 2, 1, 0),
    );
    const repeated = leastSquares(line([1, 2, 2, 3]), Float64Array.of(1, 3, 3, 2));
    expect(weighted.coefficients[0]).toBeCloseTo(repeated.coefficients[0]!, 13);
    expect(weighted.coefficients[1]).toBeCloseTo(repeated.coefficients[1]!, 13);
    expect(weighted.residualSumOfSquares).toBeCloseTo(repeated.residualSumOfSquares, 13);
    expect(weighted.unscaledCovariance[0]![1]).toBeCloseTo(repeated.unscaledCovariance[0]![1]!, 13);
  });
  it('does not change its arguments', () => {
    const x = line([1, 2, 4]);
    const y = Float64Array.of(1, 2, 2);
    const w = Float64Array.of(1, 2, 3);
    leastSquares(x, y, w);
    expect([x, y, w]).toEqual([line([1, 2, 4]), Float64Array.of(1, 2, 2), Float64Array.of(1, 2, 3)]);
  });
});

describe('laws', () => {
  const rows = fc.array(
    fc.tuple(
      fc.double({ min: -100, max: 100, noNaN: true }),
      fc.double({ min: -100, max: 100, noNaN: true }),
      fc.double({ min: 0.1, max: 10, noNaN: true }),
    ),
    { minLength: 5, maxLength: 40 },
  );
  // x is the row's number plus a little, so that the rows never coincide
  const fitOf = (set: readonly (readonly [number, number, number, number])[]) =>
    leastSquares(
      line(set.map(([i, x]) => 10 * i + x / 100)),
      Float64Array.from(set, ([, , y]) => y),
      Float64Array.from(set, ([, , , w]) => w),
    );
  it('the order of the rows does not matter', () => {
    fc.assert(
      fc.property(rows, fc.integer(), (values, turn) => {
        const set = values.map(([x, y, w], i) => [i, x, y, w] as const);
        const order = set
          .map((row, i) => ({ row, key: Math.imul(i + 1, turn | 1) }))
          .sort((a, b) => a.key - b.key);
        const a = fitOf(set);
        const b = fitOf(order.map(({ row }) => row));
        for (let k = 0; k < 2; k += 1)
          expect(Math.abs(a.coefficients[k]! - b.coefficients[k]!)).toBeLessThan(1e-10);
        expect(Math.abs(a.residualSumOfSquares - b.residualSumOfSquares)).toBeLessThan(
          1e-10 * (1 + a.residualSumOfSquares),
        );
      }),
      { seed: 3 },
    );
  });
  it('residuals are at right angles to every column', () => {
    fc.assert(
      fc.property(rows, (values) => {
        const set = values.map(([x, y, w], i) => [i, x, y, w] as const);
        const { coefficients } = fitOf(set);
        const residual = ([i, x, y]: readonly number[]) =>
          y! - coefficients[0]! - coefficients[1]! * (10 * i! + x! / 100);
        const constant = set.reduce((total, row) => total + row[3] * residual(row), 0);
        expect(Math.abs(constant)).toBeLessThan(1e-8);
      }),
      { seed: 4 },
    );
  });
  it('units of a column only change its coefficient', () => {
    const y = Float64Array.of(1, 2, 4, 8);
    const km = leastSquares(line([1, 2, 3, 5]), y);
    const mm = leastSquares(line([1e6, 2e6, 3e6, 5e6]), y);
    expect(mm.coefficients[1]! * 1e6).toBeCloseTo(km.coefficients[1]!, 13);
    expect(mm.unscaledCovariance[1]![1]! * 1e12).toBeCloseTo(km.unscaledCovariance[1]![1]!, 13);
  });
});

describe('edges', () => {
  it('names the first column that depends on those before it', () => {
    const [one, x] = line([1, 2, 3, 4.5]) as [Float64Array, Float64Array];
    const y = Float64Array.of(1, 2, 3, 4);
    const columnOf = (columns: readonly Float64Array[]) => {
      try {
        leastSquares(columns, y);
      } catch (error) {
        if (error instanceof RankDeficientError) return error.columnIndex;
        throw error;
      }
      return undefined;
    };
    expect(columnOf([one, x])).toBeUndefined();
    expect(columnOf([one, x, x.map((v) => 3 * v - 2)])).toBe(2);
    expect(columnOf([one, one, x])).toBe(1);
    expect(columnOf([one, new Float64Array(4), x])).toBe(1);
  });
  it('as many rows as columns: exact, nothing left over', () => {
    const fit = leastSquares(line([1, 3]), Float64Array.of(5, 9));
    expect(fit.coefficients[0]).toBeCloseTo(3, 13);
    expect(fit.coefficients[1]).toBeCloseTo(2, 13);
    expect(fit.residualSumOfSquares).toBe(0);
  });
  it.each([
    [() => leastSquares([], Float64Array.of(1)), 'columns: expected at least one column, received none'],
    [
      () => leastSquares(line([1, 2]), Float64Array.of(1)),
      'columns[0]: expected 1 values as in y, received 2',
    ],
    [
      () => leastSquares(line([1]), Float64Array.of(1)),
      'y: expected at least 2 values for as many columns, received 1',
    ],
    [
      () => leastSquares(line([1, Number.NaN]), Float64Array.of(1, 2)),
      'columns[1]: expected finite values, received others',
    ],
    [
      () => leastSquares(line([1, 2]), Float64Array.of(1, Number.POSITIVE_INFINITY)),
      'y: expected finite values, received others',
    ],
    [
      () => leastSquares(line([1, 2]), Float64Array.of(1, 2), Float64Array.of(1, -1)),
      'weights[1]: expected a finite number of at least 0, received -1',
    ],
    [
      () => leastSquares(line([1, 2]), Float64Array.of(1, 2), Float64Array.of(1)),
      'weights: expected 2 values as in y, received 1',
    ],
  ])('misuse (%#)', (call, message) => {
    expect(call).toThrow(new RangeError(message));
  });
});
