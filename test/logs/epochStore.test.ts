import { existsSync, mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { EpochStore } from '../../src/logs/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const temporary = join(folder.path, 'tmp');
const before = process.env.TMPDIR;

beforeEach(() => {
  mkdirSync(temporary, { recursive: true });
  process.env.TMPDIR = temporary;
});
afterEach(() => {
  if (before === undefined) delete process.env.TMPDIR;
  else process.env.TMPDIR = before;
});

const contents = (store: EpochStore) =>
  [...store.bags()].map(({ key, days }) => [key, ...[...days()].map((day) => [...day])]);

describe('EpochStore', () => {
  it('gives keys and days in order and records as they came', () => {
    const store = new EpochStore(2);
    store.add('b', 2, [1, 2]);
    store.add('a', 5, [3, 4]);
    store.add('b', 1, [5, 6]);
    store.add('b', 2, [7, Number.NaN]);
    expect(contents(store)).toEqual([
      ['a', [3, 4]],
      ['b', [5, 6], [1, 2, 7, Number.NaN]],
    ]);
    store.close();
    expect(readdirSync(temporary)).toEqual([]);
  });

  it('gives the same whatever its budget', () => {
    const epoch = fc.tuple(
      fc.constantFrom('a', 'b', 'c'),
      fc.integer({ min: 0, max: 3 }),
      fc.double(),
      fc.double(),
    );
    fc.assert(
      fc.property(fc.array(epoch, { maxLength: 60 }), fc.integer({ min: 0, max: 50 }), (epochs, budget) => {
        const [large, small] = [new EpochStore(2), new EpochStore(2, budget)];
        for (const [key, day, x, y] of epochs) {
          large.add(key, day, [x, y]);
          small.add(key, day, [x, y]);
        }
        expect(contents(small)).toEqual(contents(large));
        expect(readdirSync(temporary)).toHaveLength(epochs.length * 2 > budget ? 1 : 0);
        small.close();
        small.close();
        expect(readdirSync(temporary)).toEqual([]);
      }),
      { seed: 14, numRuns: 200 },
    );
    expect(existsSync(temporary)).toBe(true);
  });
});
