import { describe, expect, it } from 'vitest';
import { apOfKp, kpOfAp, kpWords, stormScale } from '../../src/ionosphere/index.js';
import { fixtureText } from './samples.js';

interface StormDay {
  readonly date: string;
  readonly kp: readonly number[];
  readonly ap: readonly number[];
  readonly Ap: number;
}
const { kpToAp, days } = JSON.parse(fixtureText('storm-days.json')) as {
  kpToAp: [number, number][];
  days: StormDay[];
};

describe('Kp and ap', () => {
  it('go together as in the table of GFZ Potsdam, in both directions', () => {
    expect(kpToAp).toHaveLength(28);
    for (const [kp, ap] of kpToAp) {
      expect(apOfKp(kp)).toBe(ap);
      expect(kpOfAp(ap)).toBe(kp);
    }
  });

  it.each(days)('of $date are those of the table, Ap the mean of ap', ({ kp, ap, Ap }) => {
    expect(kp.map(apOfKp)).toEqual(ap);
    expect(Math.abs(ap.reduce((a, b) => a + b) / 8 - Ap)).toBeLessThanOrEqual(0.5);
  });

  it('of a value that does not exist are not known', () => {
    for (const kp of [-1, 0.5, 9.333, Number.NaN]) expect(apOfKp(kp)).toBeNaN();
    for (const ap of [1, 8, 401, Number.NaN]) expect(kpOfAp(ap)).toBeNaN();
  });

  it('are spoken of in thirds', () => {
    expect([0, 0.333, 4.667, 5, 5.333, 9].map(kpWords)).toEqual(['0o', '0+', '5-', '5o', '5+', '9o']);
    expect(kpWords(5.5)).toBeNull();
  });
});

describe('stormScale', () => {
  // NOAA Space Weather Scales: G1 Kp 5, G2 6, G3 7, G4 8 including 9-, G5 9
  it.each([
    [0, 'G0'],
    [4.333, 'G0'],
    [4.667, 'G1'],
    [5, 'G1'],
    [5.333, 'G1'],
    [5.667, 'G2'],
    [6.333, 'G2'],
    [7, 'G3'],
    [7.667, 'G4'],
    [8.333, 'G4'],
    [8.667, 'G4'],
    [9, 'G5'],
    [11.333, 'G5'],
  ])('of Kp %d is %s', (kp, scale) => {
    expect(stormScale(kp)).toBe(scale);
  });

  it('of a missing Kp is not known', () => {
    expect(stormScale(Number.NaN)).toBeNull();
  });
});
