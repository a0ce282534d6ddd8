import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseNumber } from '../../src/logs/index.js';

describe('parseNumber', () => {
  it.each<[string, number | null]>([
    ['', Number.NaN],
    [' ', Number.NaN],
    ['0', 0],
    ['-18.405217364', -18.405217364],
    ['+5', 5],
    ['.5', 0.5],
    ['5.', 5],
    ['1e-3', 0.001],
    ['1E5', 100000],
    ['007', 7],
    ['NaN', null],
    ['nan', null],
    ['Infinity', null],
    ['1e400', null],
    ['0x1F', null],
    ['0b11', null],
    ['0o17', null],
    ['-0x1F', null],
    ['1,5', null],
    ['1_000', null],
    ['1 000', null],
    ['12m', null],
    ['--5', null],
    ['e5', null],
    ['true', null],
    ['null', null],
    ['٣', null],
  ])('%j', (cell, value) => {
    expect(parseNumber(cell)).toBe(value);
  });

  it('reads back every number that is printed', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(parseNumber(String(value))).toBe(value === 0 ? 0 : value);
      }),
      { seed: 12, numRuns: 1000 },
    );
  });
});
