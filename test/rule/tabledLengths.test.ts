import { describe, expect, it } from 'vitest';
import { tabledLengths } from '../../src/rule/index.js';

describe('lengths of a table', () => {
  const usual = [0.5, 1, 2, 5, 10, 15, 20];
  it('end where the data do, and hold how far a rule reaches', () => {
    expect(tabledLengths(usual, 8.34)).toEqual([0.5, 1, 2, 5, 8.34]);
    expect(tabledLengths(usual, 12, [6.5])).toEqual([0.5, 1, 2, 5, 6.5, 10, 12]);
    expect(tabledLengths(usual, 40)).toEqual([...usual, 40]);
  });
  it('pass over ends beyond the data and no end', () => {
    expect(tabledLengths(usual, 3, [7, 0])).toEqual([0.5, 1, 2, 3]);
  });
  it('hold no two lengths that read alike', () => {
    expect(tabledLengths(usual, 5.04)).toEqual([0.5, 1, 2, 5.04]);
    expect(tabledLengths(usual, 5.04, [5, 2.05])).toEqual([0.5, 1, 2.05, 5.04]);
    expect(tabledLengths(usual, 0.3)).toEqual([0.3]);
  });
});
