import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  betaQuantile,
  chiSquareCdf,
  chiSquareQuantile,
  fCdf,
  fQuantile,
  normalCdf,
  normalQuantile,
  studentTCdf,
  studentTQuantile,
} from '../../src/stats/distributions.js';
import { erfc } from '../../src/stats/errorFunction.js';
import { logGamma, regularizedBeta, regularizedGamma } from '../../src/stats/specialFunctions.js';

interface Row {
  readonly f: string;
  readonly args: readonly [number, number];
  readonly p: number;
  readonly x: number;
}
interface Fixture {
  readonly quantiles: readonly Row[];
  readonly cdf: readonly Row[];
  readonly logGamma: readonly { readonly x: number; readonly value: number }[];
}
const fixture = JSON.parse(
  readFileSync(new URL('../fixtures/distributions/distributions.json', import.meta.url), 'utf8'),
) as Fixture;

const quantiles: Record<string, (p: number, a: number, b: number) => number> = {
  normal: normalQuantile,
  chiSquare: chiSquareQuantile,
  studentT: studentTQuantile,
  f: fQuantile,
  beta: betaQuantile,
};
const cdfs: Record<string, (x: number, a: number, b: number) => number> = {
  normal: normalCdf,
  chiSquare: chiSquareCdf,
  studentT: studentTCdf,
  f: fCdf,
};
const relative = (value: number, expected: number) =>
  Math.abs(value - expected) / Math.max(Math.abs(expected), 1e-300);
const spread = (rows: readonly Row[], value: (row: Row) => number, expected: (row: Row) => number) =>
  rows
    .map((row) => ({ ...row, got: value(row), error: relative(value(row), expected(row)) }))
    .filter((row) => !(row.error < 1e-11));

describe('against R (test/fixtures/distributions)', () => {
  // R states some 12 to 14 digits for these functions
  it('reaches R quantiles to 1e-11', () => {
    expect(fixture.quantiles.length).toBeGreaterThan(280);
    expect(
      spread(
        fixture.quantiles,
        (r) => quantiles[r.f]!(r.p, ...r.args),
        (r) => r.x,
      ),
    ).toEqual([]);
  });
  it('reaches R lower-tail probabilities to 1e-11', () => {
    expect(fixture.cdf.length).toBeGreaterThan(70);
    expect(
      spread(
        fixture.cdf,
        (r) => cdfs[r.f]!(r.x, ...r.args),
        (r) => r.p,
      ),
    ).toEqual([]);
  });
  it('reaches R log-gamma', () => {
    for (const { x, value } of fixture.logGamma)
      expect(Math.abs(logGamma(x) - value)).toBeLessThan(2e-15 * Math.max(1, Math.abs(value)));
  });
});

describe('the complementary error function', () => {
  it('agrees with the incomplete gamma function of order one half (NIST DLMF 7.11.2)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 20, noNaN: true }), (y) => {
        expect(relative(erfc(y), regularizedGamma(0.5, y * y).upper)).toBeLessThan(2e-13);
      }),
      { seed: 3, numRuns: 2000 },
    );
    for (const y of [0, 0.46875, 0.468751, 4, 4.000001]) {
      expect(relative(erfc(y), regularizedGamma(0.5, y * y).upper)).toBeLessThan(1e-14);
    }
    expect(erfc(Number.POSITIVE_INFINITY)).toBe(0);
  });
});

describe('values of published tables', () => {
  // Rayleigh distribution: q(p) = σ √(−2 ln(1 − p)); here through chi-square with two degrees of freedom
  it('gives the radial factors at 95 %', () => {
    const perAxis = Math.sqrt(chiSquareQuantile(0.95, 2));
    expect(perAxis).toBeCloseTo(2.4477468307, 9);
    expect(perAxis / Math.SQRT2).toBeCloseTo(1.7308183826, 9);
    expect(Math.sqrt(chiSquareQuantile(0.5, 2))).toBeCloseTo(1.1774100226, 9);
    expect(Math.sqrt(chiSquareQuantile(0.99, 2))).toBeCloseTo(3.0348542588, 9);
    expect(chiSquareCdf(1, 2)).toBeCloseTo(0.3934693403, 10);
    expect(chiSquareCdf(4, 2)).toBeCloseTo(1 - Math.exp(-2), 14);
  });
  it('gives the chi quantiles of three dimensions', () => {
    expect(Math.sqrt(chiSquareQuantile(0.5, 3))).toBeCloseTo(1.5381722545, 9);
    expect(Math.sqrt(chiSquareQuantile(0.95, 3))).toBeCloseTo(2.795483, 6);
  });
  it('gives the two-sided normal factors', () => {
    expect(normalQuantile(0.75)).toBeCloseTo(0.6744897502, 10);
    expect(normalQuantile(0.95)).toBeCloseTo(1.644853627, 9);
    expect(normalQuantile(0.975)).toBeCloseTo(1.9599639845, 10);
    expect(normalQuantile(0.995)).toBeCloseTo(2.5758293035, 9);
  });
  it.each([
    [0.95, 28, 41.33713815],
    [0.95, 56, 74.46832416],
    [0.95, 14, 23.6847913],
    [0.95, 8, 15.50731306],
  ])('chi-square %d with %d degrees of freedom', (p, df, value) => {
    expect(chiSquareQuantile(p, df)).toBeCloseTo(value, 7);
  });
  it.each([
    [28, 2.12992429],
    [56, 1.69756024],
    [14, 2.97858752],
  ])('F 0.975 with %d and as many degrees of freedom, and its inverse', (df, value) => {
    expect(fQuantile(0.975, df, df)).toBeCloseTo(value, 7);
    expect(fQuantile(0.025, df, df)).toBeCloseTo(1 / fQuantile(0.975, df, df), 13);
  });
  it.each([
    [1, 12.7062047],
    [2, 4.3026527],
    [5, 2.5705818],
    [9, 2.2621572],
    [10, 2.2281389],
    [14, 2.1447867],
    [28, 2.0484071],
    [29, 2.0452296],
    [30, 2.0422725],
    [60, 2.0002978],
    [120, 1.9799304],
  ])('Student t at 0.975, degrees of freedom %d', (df, value) => {
    expect(studentTQuantile(0.975, df)).toBeCloseTo(value, 6);
  });
  it('gives the interval factors of a standard deviation, 20 degrees of freedom', () => {
    expect(Math.sqrt(20 / chiSquareQuantile(0.975, 20))).toBeCloseTo(0.76505914, 8);
    expect(Math.sqrt(20 / chiSquareQuantile(0.025, 20))).toBeCloseTo(1.44406949, 8);
  });
});

describe('closed forms, also far out', () => {
  it('chi-square with 2 degrees of freedom is exponential', () => {
    for (const p of [1e-200, 1e-9, 0.2, 0.8, 1 - 1e-12])
      expect(relative(chiSquareQuantile(p, 2), -2 * Math.log1p(-p))).toBeLessThan(1e-12);
  });
  it('Student t with 1 degree of freedom is Cauchy, with 2 algebraic', () => {
    for (const p of [1e-12, 0.01, 0.4, 0.999])
      expect(relative(studentTQuantile(p, 1), -1 / Math.tan(Math.PI * p))).toBeLessThan(1e-12);
    for (const p of [1e-12, 0.01, 0.4, 0.999])
      expect(relative(studentTQuantile(p, 2), (2 * p - 1) / Math.sqrt(2 * p * (1 - p)))).toBeLessThan(1e-12);
  });
  it('F with 1 and 1 degrees of freedom is the square of a Cauchy variable', () => {
    for (const p of [1e-12, 1e-6, 0.3, 0.999])
      expect(relative(fQuantile(p, 1, 1), Math.tan((Math.PI * p) / 2) ** 2)).toBeLessThan(1e-12);
  });
  it('Student t nears the normal distribution and reaches it at infinity', () => {
    expect(studentTQuantile(0.975, Number.POSITIVE_INFINITY)).toBe(normalQuantile(0.975));
    expect(studentTCdf(-2, Number.POSITIVE_INFINITY)).toBe(normalCdf(-2));
    expect(studentTQuantile(0.975, 1e9)).toBeCloseTo(normalQuantile(0.975), 8);
  });
  it('normal tails follow the asymptotic series', () => {
    // Mills ratio, Abramowitz & Stegun 26.2.12; at 30 the next term is below 1e-9
    const z = 30;
    const series = 1 - 1 / z ** 2 + 3 / z ** 4 - 15 / z ** 6 + 105 / z ** 8;
    const tail = Math.exp((-z * z) / 2) / (z * Math.sqrt(2 * Math.PI));
    expect(normalCdf(-z) / (tail * series)).toBeCloseTo(1, 9);
    expect(normalQuantile(normalCdf(-z))).toBeCloseTo(-z, 12);
  });
  it('keeps both tails at the ends', () => {
    expect(regularizedGamma(2, 0)).toEqual({ lower: 0, upper: 1 });
    expect(regularizedGamma(2, Number.POSITIVE_INFINITY)).toEqual({ lower: 1, upper: 0 });
    expect(regularizedBeta(0, 2, 3)).toEqual({ lower: 0, upper: 1 });
    expect(regularizedBeta(1, 2, 3)).toEqual({ lower: 1, upper: 0 });
    expect([normalCdf(0), studentTCdf(0, 3), normalQuantile(0.5), studentTQuantile(0.5, 3)]).toEqual([
      0.5, 0.5, 0, 0,
    ]);
    expect([studentTCdf(Number.NEGATIVE_INFINITY, 4), fCdf(Number.POSITIVE_INFINITY, 3, 4)]).toEqual([0, 1]);
  });
  it('uses 1 − x as given where x is next to 1', () => {
    // I_x(a, 1) = x^a, hence the upper tail is 1 − (1 − y)^a ≈ a y
    expect(relative(regularizedBeta(1, 3, 1, 1e-30).upper, 3e-30)).toBeLessThan(1e-13);
  });
});

describe('laws', () => {
  const probability = fc.double({ min: 1e-9, max: 1 - 1e-9, noNaN: true });
  const df = fc.double({ min: 1, max: 5000, noNaN: true });
  it('distribution function of a quantile is the probability', () => {
    fc.assert(
      fc.property(probability, df, df, (p, df1, df2) => {
        expect(Math.abs(normalCdf(normalQuantile(p)) - p)).toBeLessThan(1e-14);
        expect(Math.abs(chiSquareCdf(chiSquareQuantile(p, df1), df1) - p)).toBeLessThan(1e-12);
        expect(Math.abs(studentTCdf(studentTQuantile(p, df1), df1) - p)).toBeLessThan(1e-12);
        expect(Math.abs(fCdf(fQuantile(p, df1, df2), df1, df2) - p)).toBeLessThan(1e-12);
        const x = betaQuantile(p, df1, df2);
        // a double next to 1 cannot say more about the upper tail
        if (x < 0.99) expect(Math.abs(regularizedBeta(x, df1, df2).lower - p)).toBeLessThan(1e-11);
      }),
      { seed: 1, numRuns: 300 },
    );
  });
  it('quantiles mirror and grow', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 0.499, noNaN: true }), df, (p, d) => {
        // 1 − p carries a rounding of 1e-16 against the tail of at least 1e-6
        expect(relative(-studentTQuantile(1 - p, d), studentTQuantile(p, d))).toBeLessThan(1e-9);
        expect(studentTQuantile(p + 1e-3, d)).toBeGreaterThan(studentTQuantile(p, d));
        expect(chiSquareQuantile(p + 1e-3, d)).toBeGreaterThan(chiSquareQuantile(p, d));
      }),
      { seed: 2 },
    );
  });
});

describe('misuse', () => {
  it.each([
    [() => normalQuantile(0), 'p: expected a probability greater than 0 and less than 1, received 0'],
    [() => chiSquareQuantile(1, 3), 'p: expected a probability greater than 0 and less than 1, received 1'],
    [
      () => studentTQuantile(Number.NaN, 3),
      'p: expected a probability greater than 0 and less than 1, received NaN',
    ],
    [() => chiSquareQuantile(0.5, 0), 'df: expected a finite number greater than 0, received 0'],
    [() => studentTCdf(1, -2), 'df: expected a finite number greater than 0, received -2'],
    [
      () => fQuantile(0.5, 3, Number.POSITIVE_INFINITY),
      'df2: expected a finite number greater than 0, received Infinity',
    ],
    [() => fCdf(-1, 3, 3), 'x: expected a number of at least 0, received -1'],
    [() => normalCdf(Number.NaN), 'z: expected a number, received NaN'],
    [() => betaQuantile(0.5, 0, 1), 'a: expected a finite number greater than 0, received 0'],
    [() => regularizedBeta(1.5, 1, 1), 'x: expected a number from 0 to 1, received 1.5'],
    [() => logGamma(0), 'x: expected a finite number greater than 0, received 0'],
  ])('names argument, expected and received (%#)', (call, message) => {
    expect(call).toThrow(new RangeError(message));
  });
});
