import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sitePlane } from '../../src/geodesy/sitePlane.js';

describe('sitePlane', () => {
  const about = { aboutEastingM: 450_000, aboutNorthingM: 5_200_000 };
  const north = { eastingM: 450_000, northingM: 5_201_000, heightM: 300 };
  const east = { eastingM: 451_000, northingM: 5_200_000, heightM: 300 };

  it('turns clockwise: what lies north of the pivot goes east, what lies east goes south', () => {
    // 20.626480625″ is 1e-4 rad
    const turn = sitePlane({ ...about, rotationArcSeconds: 20.626480625 });
    expect(turn.forward(north).eastingM).toBeCloseTo(450_000.1, 7);
    expect(turn.forward(north).northingM).toBeCloseTo(5_201_000 - 5e-6, 8);
    expect(turn.forward(east).northingM).toBeCloseTo(5_199_999.9, 7);
  });
  it('shifts, and scales about the pivot', () => {
    const move = sitePlane({ ...about, shiftEastingM: -440_000, shiftNorthingM: -5_100_000, scalePpm: 25 });
    expect(move.scalePpm).toBe(25);
    const there = move.forward(north);
    expect(there.eastingM).toBeCloseTo(10_000, 9);
    expect(there.northingM).toBeCloseTo(101_000.025, 9);
    expect(there.heightM).toBe(300);
  });
  it('tilts heights up to the east and to the north', () => {
    const tilt = sitePlane({ ...about, heightShiftM: -47.5, tiltEastMmPerKm: 12, tiltNorthMmPerKm: -5 });
    expect(tilt.forward(east).heightM).toBeCloseTo(252.512, 12);
    expect(tilt.forward(north).heightM).toBeCloseTo(252.495, 12);
    expect(tilt.forward({ ...about, eastingM: 450_000, northingM: 5_200_000, heightM: 300 }).heightM).toBe(
      252.5,
    );
  });
  it('does nothing without parameters, and leaves a missing height missing', () => {
    expect(sitePlane({}).forward(north)).toEqual(north);
    const moved = sitePlane({ shiftEastingM: 1, heightShiftM: 2 }).undo({ ...north, heightM: Number.NaN });
    expect(moved).toEqual({ ...north, eastingM: 449_999, heightM: Number.NaN });
  });
  it('undoes itself to 10 nm, and keeps shape', () => {
    const metres = (most: number) => fc.double({ min: -most, max: most, noNaN: true });
    fc.assert(
      fc.property(
        fc.record({
          aboutEastingM: metres(1e6),
          aboutNorthingM: metres(1e7),
          shiftEastingM: metres(1e6),
          shiftNorthingM: metres(1e7),
          rotationArcSeconds: metres(648_000),
          scalePpm: metres(1000),
          heightShiftM: metres(100),
          tiltEastMmPerKm: metres(100),
          tiltNorthMmPerKm: metres(100),
        }),
        metres(1e5),
        metres(1e5),
        metres(3000),
        (parameters, e, n, heightM) => {
          const site = sitePlane(parameters);
          const pivot = {
            eastingM: parameters.aboutEastingM,
            northingM: parameters.aboutNorthingM,
            heightM: 0,
          };
          const place = { eastingM: pivot.eastingM + e, northingM: pivot.northingM + n, heightM };
          const moved = site.forward(place);
          const back = site.undo(moved);
          expect(Math.hypot(back.eastingM - place.eastingM, back.northingM - place.northingM)).toBeLessThan(
            2e-8,
          );
          expect(Math.abs(back.heightM - heightM)).toBeLessThan(1e-9);
          const origin = site.forward(pivot);
          const length = Math.hypot(moved.eastingM - origin.eastingM, moved.northingM - origin.northingM);
          expect(Math.abs(length - Math.hypot(e, n) * (1 + parameters.scalePpm * 1e-6))).toBeLessThan(2e-8);
        },
      ),
      { seed: 20 },
    );
  });
  it('says what is wrong', () => {
    expect(() => sitePlane({ rotationArcSeconds: Number.NaN })).toThrow(
      'rotationArcSeconds: expected a finite number, received NaN',
    );
    expect(() => sitePlane({ scalePpm: -1e6 })).toThrow(
      'scalePpm: expected more than -1000000, received -1000000',
    );
  });
});
