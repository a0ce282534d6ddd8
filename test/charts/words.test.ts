import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  counted,
  countWords,
  kmRoundedDown,
  percentWords,
  roundUp,
  shortNumber,
  signedNumber,
  wrapText,
} from '../../src/charts/words.js';

describe('words of charts', () => {
  it('groups digits from 10 000 on', () => {
    expect([7, 1431, 12345, 1234567].map(countWords)).toEqual([
      '7',
      '1431',
      '12\u202f345',
      '1\u202f234\u202f567',
    ]);
    expect([counted(1, 'day'), counted(30, 'day')]).toEqual(['1 day', '30 days']);
  });

  it('rounds limits of length down, but never a value that has one decimal', () => {
    expect([7.99, 8.0, 0.19].map(kmRoundedDown)).toEqual(['7.9', '8.0', '0.1']);
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 2000 }), (tenths) => {
        expect(kmRoundedDown(tenths / 10)).toBe((tenths / 10).toFixed(1));
        expect(kmRoundedDown(tenths / 10 + 0.0999)).toBe((tenths / 10).toFixed(1));
      }),
      { seed: 2 },
    );
  });

  it('writes short numbers, shares and signs', () => {
    expect([25, 24.384].map(shortNumber)).toEqual(['25', '24.4']);
    expect([0.95, 0.683].map(percentWords)).toEqual(['95 %', '68.3 %']);
    expect([1.24, -0.41, -0.01].map((value) => signedNumber(value))).toEqual(['+1.2', '\u22120.4', '0.0']);
  });

  it('rounds up to at most a fifth more', () => {
    expect([50, 86.3, 131, 0.13].map(roundUp)).toEqual([50, 88, 140, 0.14]);
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 1e5, noNaN: true }), (value) => {
        const rounded = roundUp(value);
        expect(rounded).toBeGreaterThanOrEqual(value * (1 - 1e-6));
        expect(rounded).toBeLessThanOrEqual(value * 1.2001);
      }),
      { seed: 3 },
    );
  });

  it('wraps at blanks and keeps every word', () => {
    expect(wrapText('one two three', 8)).toEqual(['one two', 'three']);
    expect(wrapText('incomparable word', 4)).toEqual(['incomparable', 'word']);
  });
});
