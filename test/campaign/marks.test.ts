import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';

describe('marks of a campaign', () => {
  it('lie where they were planned, up to the rounding of published coordinates', () => {
    fc.assert(
      fc.property(
        fc.record({
          latitudeDeg: fc.double({ min: -80, max: 80, noNaN: true }),
          longitudeDeg: fc.double({ min: -179, max: 179, noNaN: true }),
          heightM: fc.double({ min: 0, max: 2000, noNaN: true }),
        }),
        fc.double({ min: 0.3, max: 60, noNaN: true }),
        fc.double({ min: 0, max: 359, noNaN: true }),
        fc.double({ min: -0.3, max: 0.3, noNaN: true }),
        (base, baselineKm, azimuthDeg, slope) => {
          const heightM = Math.max(-500, base.heightM + slope * baselineKm * 1000);
          const plan = { name: 'P', baselineKm, azimuthDeg, heightM };
          const [mark] = simulateErrors({ base, marks: [plan], days: 1 }).marks;
          // 1e-9 degrees are 0.11 mm of latitude; two roundings make at most 0.1 mm of distance.
          expect(Math.abs(mark!.baselineKm - baselineKm)).toBeLessThan(2e-7);
          const turn = Math.abs(((mark!.azimuthDeg - azimuthDeg + 540) % 360) - 180);
          expect((turn / 180) * Math.PI * baselineKm * 1e6).toBeLessThan(0.2);
          expect(mark!.heightDifferenceM).toBeCloseTo(heightM - base.heightM, 3);
        },
      ),
      { seed: 14, numRuns: 150 },
    );
  });

  it('are invented from near to far between the limits, no steeper than 1:4 from the base', () => {
    const { marks, base } = simulateErrors({ seed: 5, marks: { count: 30 }, days: 1 });
    expect(marks.map((mark) => mark.name).slice(0, 2)).toEqual(['M01', 'M02']);
    for (const [i, mark] of marks.entries()) {
      expect(mark.baselineKm).toBeGreaterThan(marks[i - 1]?.baselineKm ?? 0.4 - 1e-6);
      expect(mark.baselineKm).toBeLessThan(34 + 1e-6);
      expect(mark.heightM).toBeGreaterThanOrEqual(5);
      expect(mark.heightM).toBeLessThanOrEqual(900);
      expect(Math.abs(mark.heightM - base.heightM)).toBeLessThanOrEqual(250 * mark.baselineKm + 1e-3);
    }
  });
});
