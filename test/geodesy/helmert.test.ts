import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Geocentric } from '../../src/geodesy/coordinates.js';
import { GRS80, WGS84 } from '../../src/geodesy/ellipsoid.js';
import { frameDifference } from '../../src/geodesy/frameDifference.js';
import { geodeticToGeocentric } from '../../src/geodesy/geocentric.js';
import { type FrameTransformation, frameTransformation } from '../../src/geodesy/helmert.js';
import type { HelmertParameters, RotationConvention } from '../../src/geodesy/helmertParameters.js';
import { localFrame } from '../../src/geodesy/localFrame.js';
import { geocentricVelocity, movedInTime } from '../../src/geodesy/movedInTime.js';

const point = (xM: number, yM: number, zM: number): Geocentric => ({ xM, yM, zM });
const apartM = (a: Geocentric, b: Geocentric) => Math.hypot(a.xM - b.xM, a.yM - b.yM, a.zM - b.zM);

/** The sets of test/fixtures/helmert/make.sh, some in the other units that they may be published in. */
const SETS: Readonly<Record<string, HelmertParameters>> = {
  britain: {
    shiftM: [446.448, -125.157, 542.06],
    rotationArcSeconds: [0.15, 0.247, 0.842],
    scalePpm: -20.489,
  },
  germany: { shiftM: [598.1, 73.7, 418.2], rotationArcSeconds: [0.202, 0.045, -2.455], scalePpm: 6.7 },
  gda: { shiftMm: [61.55, -10.87, -40.19], rotationMas: [-39.4924, -32.7221, -32.8979], scalePpb: -9.994 },
  invented: { shiftM: [-12.5, 33.25, 101.125], rotationArcSeconds: [26.5, -17.25, 31.75], scalePpm: -3.5 },
  plate: { rates: { rotationMas: [1.50379, 1.18346, 1.20716] }, referenceYear: 2020 },
  nad83: {
    shiftM: [0.99343, -1.90331, -0.52655],
    rotationMas: [25.91467, 9.42645, 11.59935],
    scalePpb: 1.71504,
    rates: { shiftMm: [0.79, -0.6, -1.34], rotationMas: [0.06667, -0.75744, -0.05133], scalePpb: -0.10201 },
    referenceYear: 1997,
  },
  itrf: {
    shiftMm: [1.6, 1.9, 2.4],
    scalePpb: -0.02,
    rates: { shiftMm: [0, 0, -0.1], scalePpb: 0.03 },
    referenceYear: 2010,
  },
  etrf: {
    rotationMas: [1.78, 11.151, -16.17],
    rates: { rotationMas: [0.085, 0.531, -0.77] },
    referenceYear: 2010,
  },
};

function cases(name: string) {
  return readFileSync(new URL(`../fixtures/helmert/${name}`, import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((row) => {
      const [set = '', convention = '', rotation = '', ...numbers] = row.split(',');
      const [x, y, z, year, toX, toY, toZ] = numbers.map(Number) as [
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const transformation = frameTransformation({
        ...SETS[set],
        convention: convention.replace('_', '-') as RotationConvention,
        rotation: rotation as 'exact' | 'small-angle',
      });
      return { row, transformation, from: point(x, y, z), to: point(toX, toY, toZ), year };
    });
}

describe('changes of frame', () => {
  it('agree with PROJ, seven and fourteen parameters, both conventions', () => {
    const all = cases('forward.csv');
    expect(all).toHaveLength(8 * 2 * 2 * 4);
    // a float of 6e6 m carries 1e-9 m
    for (const { row, transformation, from, to, year } of all)
      expect(apartM(transformation.forward(from, year), to), row).toBeLessThan(1e-8);
  });
  it('agree with PROJ backwards', () => {
    const all = cases('inverse.csv');
    expect(all).toHaveLength(8 * 2 * 4);
    for (const { row, transformation, from, to, year } of all)
      expect(apartM(transformation.inverse(from, year), to), row).toBeLessThan(1e-8);
  });
  it('EPSG guidance note 7-2, methods 1032 and 1033: the published example (from memory)', () => {
    // WGS 72 to WGS 84: dZ +4.5 m, rz +0.554″ (position vector), 0.219 ppm; printed to the centimetre
    const values = { shiftM: [0, 0, 4.5], scalePpm: 0.219 } as const;
    const from = point(3657660.66, 255768.55, 5201382.11);
    const to = point(3657660.78, 255778.43, 5201387.75);
    const vector = frameTransformation({
      ...values,
      rotationArcSeconds: [0, 0, 0.554],
      convention: 'position-vector',
    });
    const frame = frameTransformation({
      ...values,
      rotationArcSeconds: [0, 0, -0.554],
      convention: 'coordinate-frame',
    });
    expect(apartM(vector.forward(from), to)).toBeLessThan(0.01);
    expect(apartM(frame.forward(from), to)).toBeLessThan(0.01);
  });
  it('of one rotation differ from small angles as stated', () => {
    const both = (seconds: number) =>
      (['exact', 'small-angle'] as const).map((rotation) =>
        frameTransformation({
          rotationArcSeconds: [0, 0, seconds],
          convention: 'position-vector',
          rotation,
        }).forward(point(6378137, 0, 0)),
      );
    const [a, b] = both(1.2);
    expect(apartM(a!, b!)).toBeCloseTo(0.0001, 4.5);
    const [c, d] = both(26);
    expect(apartM(c!, d!)).toBeCloseTo(0.05, 2);
  });
  it('come back, also by small angles, and the conventions have opposite rotations about one axis', () => {
    const number = (most: number) => fc.double({ min: -most, max: most, noNaN: true });
    const triple = (most: number) => fc.tuple(number(most), number(most), number(most));
    const coordinate = number(7e6);
    fc.assert(
      fc.property(
        triple(1000),
        triple(3600),
        number(100),
        triple(0.1),
        triple(1),
        number(50),
        fc.constantFrom('exact', 'small-angle') as fc.Arbitrary<'exact' | 'small-angle'>,
        fc.tuple(coordinate, coordinate, coordinate),
        (shiftM, rotationArcSeconds, scalePpm, shiftRate, rotationRate, years, rotation, [x, y, z]) => {
          const transformation = frameTransformation({
            shiftM,
            rotationArcSeconds,
            scalePpm,
            convention: 'coordinate-frame',
            rates: { shiftM: shiftRate, rotationArcSeconds: rotationRate },
            referenceYear: 2010,
            rotation,
          });
          const c = point(x, y, z);
          expect(
            apartM(transformation.inverse(transformation.forward(c, 2010 + years), 2010 + years), c),
          ).toBeLessThan(1e-8);
        },
      ),
      { seed: 17 },
    );
  });
  it('keep shapes: every length grows by the scale, exactly', () => {
    const transformation = frameTransformation({ ...SETS.invented, convention: 'position-vector' });
    const [a, b] = [point(3771793.968, 140253.342, 5124304.349), point(3800000, 120000, 5100000)];
    const ratio = apartM(transformation.forward(a), transformation.forward(b)) / apartM(a, b);
    expect(ratio).toBeCloseTo(1 - 3.5e-6, 12);
    expect(transformation.scalePpmAt()).toBeCloseTo(-3.5, 12);
  });
  it('say what is missing', () => {
    expect(() => frameTransformation({ rotationMas: [0, 0, 1] })).toThrow(
      'transformation.convention: expected position-vector or coordinate-frame, received none',
    );
    expect(() => frameTransformation({ shiftM: [1, 2, 3], shiftMm: [1, 2, 3] })).toThrow(
      'transformation: expected shiftM or shiftMm, received both',
    );
    expect(() => frameTransformation({ shiftM: [1, 2] as unknown as [number, number, number] })).toThrow(
      'transformation.shiftM: expected three finite numbers, received 1, 2',
    );
    expect(() => frameTransformation({ scalePpm: Number.NaN })).toThrow(
      'transformation.scalePpm: expected a finite number, received NaN',
    );
    expect(() => frameTransformation({ rates: { scalePpb: 1 } })).toThrow(
      'transformation.referenceYear: expected the decimal year that the parameters hold for, received none',
    );
    const moving = frameTransformation({ rates: { scalePpb: 1 }, referenceYear: 2010 });
    expect(moving.dependsOnTime).toBe(true);
    expect(() => moving.forward(point(6378137, 0, 0))).toThrow(
      'year: expected the decimal year of the coordinates, received none; this transformation changes with time',
    );
    // no rotation needs no convention
    expect(frameTransformation({ shiftM: [1, 2, 3] }).forward(point(6378137, 0, 0))).toEqual(
      point(6378138, 2, 3),
    );
  });
});

describe('frameDifference', () => {
  const place = { latitudeDeg: -33.75, longitudeDeg: 151.125, heightM: 40 };
  it('is what the transformation does there', () => {
    const t = frameTransformation({ ...SETS.gda, convention: 'coordinate-frame' });
    const difference = frameDifference(t, place, undefined, GRS80);
    // GDA94 to GDA2020 is a move of 1.4 to 1.8 m to the north-east (common knowledge; from memory)
    expect(difference.horizontalMm).toBeGreaterThan(1400);
    expect(difference.horizontalMm).toBeLessThan(1900);
    expect(difference.eastMm).toBeGreaterThan(0);
    expect(difference.northMm).toBeGreaterThan(0);
    expect(difference.scalePpm).toBeCloseTo(-0.009994, 12);
    expect(difference.perKm.alongMm).toBe(difference.scalePpm);
  });
  it('agrees with baselines of 1 km east and north', () => {
    const t: FrameTransformation = frameTransformation({ ...SETS.britain, convention: 'position-vector' });
    const { perKm, turnArcSeconds, scalePpm } = frameDifference(t, place);
    const frame = localFrame(place);
    const start = geodeticToGeocentric(place);
    for (const [eastM, northM] of [
      [1000, 0],
      [0, 1000],
      [600, -800],
    ] as const) {
      const end = frame.toGeocentric({ eastM, northM, upM: 0 });
      const [a, b] = [t.forward(start), t.forward(end)];
      const moved = frame.rotate(point(b.xM - a.xM, b.yM - a.yM, b.zM - a.zM));
      const [east, north] = [eastM / 1000, northM / 1000];
      // geocentric coordinates of 6e6 m carry 1e-6 mm; the square of the angle is 1e-11
      expect((moved.eastM - eastM) * 1000).toBeCloseTo(scalePpm * east + perKm.acrossMm * north, 4);
      expect((moved.northM - northM) * 1000).toBeCloseTo(scalePpm * north - perKm.acrossMm * east, 4);
      expect(moved.upM * 1000).toBeCloseTo(perKm.upToEastMm * east + perKm.upToNorthMm * north, 4);
      const turn = Math.atan2(moved.eastM, moved.northM) - Math.atan2(eastM, northM);
      expect((turn * 180 * 3600) / Math.PI).toBeCloseTo(turnArcSeconds, 4);
    }
  });
  it('of a turn about the axis of the earth is all east, and turns bearings by sin φ', () => {
    const t = frameTransformation({ rotationArcSeconds: [0, 0, 1], convention: 'position-vector' });
    const d = frameDifference(t, { latitudeDeg: 30, longitudeDeg: 77, heightM: 0 });
    // the place moves to the east by N cos φ per radian
    const arc = Math.PI / 180 / 3600;
    expect(d.eastMm).toBeCloseTo(
      ((WGS84.semiMajorAxisM * Math.cos(Math.PI / 6)) / Math.sqrt(1 - WGS84.eccentricitySquared / 4)) *
        arc *
        1000,
      3,
    );
    // its parallel curves away by the square of the shift, E² tan φ / 2N
    expect(d.northMm).toBeCloseTo(0, 1);
    // a fixed direction, turned with the earth, in the horizon of the old place: anticlockwise by sin φ
    expect(d.turnArcSeconds).toBeCloseTo(-0.5, 9);
    // second order: 1 − cos 1″
    expect(d.perKm.upToNorthMm).toBeCloseTo(0, 4);
  });
});

describe('velocities', () => {
  const place = { latitudeDeg: 47.25, longitudeDeg: 8.5, heightM: 400 };
  it('turn from the horizon and move a position in time', () => {
    const velocity = geocentricVelocity(
      { eastMPerYear: 0.02, northMPerYear: 0.015, upMPerYear: -0.001 },
      place,
    );
    const start = geodeticToGeocentric(place);
    const later = movedInTime(start, velocity, 2010, 2025.5);
    const moved = localFrame(place).toLocal(later);
    expect(moved.eastM).toBeCloseTo(0.31, 8);
    expect(moved.northM).toBeCloseTo(0.2325, 8);
    expect(moved.upM).toBeCloseTo(-0.0155, 8);
    expect(apartM(movedInTime(later, velocity, 2025.5, 2010), start)).toBeLessThan(1e-8);
  });
  it('say what is wrong', () => {
    const v = { xMPerYear: 0, yMPerYear: 0, zMPerYear: Number.NaN };
    expect(() => movedInTime(point(6378137, 0, 0), v, 2010, 2020)).toThrow(
      /^velocity: expected metres per year/,
    );
    expect(() => movedInTime(point(6378137, 0, 0), v, 2010, Number.NaN)).toThrow(
      /^fromYear and toYear: expected/,
    );
  });
});
