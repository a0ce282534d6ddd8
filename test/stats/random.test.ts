import { describe, expect, it } from 'vitest';
import { chiSquareCdf, normalCdf } from '../../src/stats/distributions.js';
import {
  normalDeviates,
  type Random,
  randomStream,
  shuffle,
  uniformBetween,
} from '../../src/stats/random.js';

const take = (random: () => number, n: number) => Array.from({ length: n }, () => random());
/** Chi-square probability of counts that should be equal. */
const evenness = (counts: readonly number[]) => {
  const expected = counts.reduce((a, b) => a + b, 0) / counts.length;
  return chiSquareCdf(
    counts.reduce((total, count) => total + (count - expected) ** 2 / expected, 0),
    counts.length - 1,
  );
};
const correlation = (a: readonly number[], b: readonly number[]) => {
  const mean = (v: readonly number[]) => v.reduce((x, y) => x + y, 0) / v.length;
  const [ma, mb] = [mean(a), mean(b)];
  const dot = (f: (i: number) => number) => a.reduce((total, _, i) => total + f(i), 0);
  return (
    dot((i) => (a[i]! - ma) * (b[i]! - mb)) /
    Math.sqrt(dot((i) => (a[i]! - ma) ** 2) * dot((i) => (b[i]! - mb) ** 2))
  );
};

describe('randomStream', () => {
  it('equal seed and label agree; another seed or label does not', () => {
    expect(take(randomStream(7, 'a'), 5)).toEqual(take(randomStream(7, 'a'), 5));
    const firsts = [
      [7, 'a'],
      [8, 'a'],
      [7, 'b'],
      [7, ''],
      [-7, 'a'],
      [0.7, 'a'],
    ].map(([seed, label]) => randomStream(seed as number, label as string)());
    expect(new Set(firsts).size).toBe(6);
  });
  it('first numbers of neighbouring seeds and labels are spread evenly', () => {
    // a seed used as it stands gives first numbers that lie together
    const seeds = new Array<number>(20).fill(0);
    const labels = new Array<number>(20).fill(0);
    for (let i = 0; i < 2000; i += 1) {
      seeds[Math.floor(20 * randomStream(i)())]! += 1;
      labels[Math.floor(20 * randomStream(1, `block ${i}`)())]! += 1;
    }
    for (const counts of [seeds, labels]) {
      expect(evenness(counts)).toBeGreaterThan(0.001);
      expect(evenness(counts)).toBeLessThan(0.999);
    }
  });
  it('neighbouring streams are uncorrelated, also one draw apart', () => {
    const n = 20_000;
    const a = take(randomStream(1), n);
    const b = take(randomStream(2), n);
    // five standard deviations of a correlation that is 0
    const limit = 5 / Math.sqrt(n);
    expect(Math.abs(correlation(a, b))).toBeLessThan(limit);
    expect(Math.abs(correlation(a.slice(1), a.slice(0, -1)))).toBeLessThan(limit);
  });
  it('gives multiples of 2^-53 in [0, 1), evenly', () => {
    const random = randomStream(3);
    const counts = new Array<number>(100).fill(0);
    let oddBits = 0;
    for (let i = 0; i < 100_000; i += 1) {
      const value = random();
      if (!(Number.isInteger(value * 2 ** 53) && value >= 0 && value < 1)) expect.fail(`drew ${value}`);
      counts[Math.floor(100 * value)]! += 1;
      oddBits += (value * 2 ** 53) % 2;
    }
    expect(evenness(counts)).toBeGreaterThan(0.001);
    expect(evenness(counts)).toBeLessThan(0.999);
    // the last bit is used: it is 1 half of the time (five standard deviations)
    expect(Math.abs(oddBits - 50_000)).toBeLessThan(5 * Math.sqrt(25_000));
  });
  it('refuses a seed that is no number', () => {
    expect(() => randomStream(Number.NaN)).toThrow(
      new RangeError('seed: expected a finite number, received NaN'),
    );
  });
});

describe('normalDeviates', () => {
  it('is standard normal', () => {
    const deviate = normalDeviates(randomStream(4));
    const counts = new Array<number>(50).fill(0);
    for (let i = 0; i < 50_000; i += 1) counts[Math.floor(50 * normalCdf(deviate()))]! += 1;
    expect(evenness(counts)).toBeGreaterThan(0.001);
    expect(evenness(counts)).toBeLessThan(0.999);
  });
  it('uses both numbers of a pair, which are uncorrelated', () => {
    let calls = 0;
    const base = randomStream(5);
    const counted: Random = () => {
      calls += 1;
      return base();
    };
    const values = take(normalDeviates(counted), 20_000);
    // 4/π tries of two numbers for each pair of deviates
    expect(calls / values.length).toBeGreaterThan(1.2);
    expect(calls / values.length).toBeLessThan(1.35);
    const first = values.filter((_, i) => i % 2 === 0);
    const second = values.filter((_, i) => i % 2 === 1);
    expect(Math.abs(correlation(first, second))).toBeLessThan(0.05);
  });
});

describe('uniformBetween and shuffle', () => {
  it('stays between its limits', () => {
    expect(uniformBetween(() => 0, -3, 5)).toBe(-3);
    expect(uniformBetween(() => 0.75, -3, 5)).toBe(3);
    expect(uniformBetween(() => 0.4, 2, 2)).toBe(2);
    expect(() => uniformBetween(() => 0, 1, 0)).toThrow(
      new RangeError('low, high: expected finite numbers in order, received 1, 0'),
    );
  });
  it('gives every order equally often and leaves the values alone', () => {
    const random = randomStream(6);
    const values = Object.freeze(['a', 'b', 'c', 'd']);
    const counts = new Map<string, number>();
    for (let i = 0; i < 24_000; i += 1) {
      const order = shuffle(values, random).join('');
      counts.set(order, (counts.get(order) ?? 0) + 1);
    }
    expect(counts.size).toBe(24);
    expect(evenness([...counts.values()])).toBeGreaterThan(0.001);
    expect(evenness([...counts.values()])).toBeLessThan(0.999);
    expect(shuffle([], random)).toEqual([]);
  });
});
