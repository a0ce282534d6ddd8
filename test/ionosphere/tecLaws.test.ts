import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  gradientAlong,
  steepestGradient,
  type TecMaps,
  TIME_SCHEMES,
  tecAt,
  tecGradientAt,
  tecRmsAt,
} from '../../src/ionosphere/index.js';

const HOUR = 3_600_000;

interface Field {
  readonly latitudes?: readonly number[];
  readonly longitudes?: readonly number[];
  readonly hours?: readonly number[];
  readonly tec: (latitude: number, longitude: number, hour: number) => number;
}

function mapsOf({
  latitudes = [60, 50, 40, 30],
  longitudes = [-20, -10, 0, 10, 20],
  hours = [0, 2],
  tec,
}: Field): TecMaps {
  const field = (hour: number): Float64Array =>
    Float64Array.from(latitudes.flatMap((lat) => longitudes.map((lon) => tec(lat, lon, hour))));
  return {
    system: '',
    epochsMs: Float64Array.from(hours, (hour) => hour * HOUR),
    latitudesDeg: Float64Array.from(latitudes),
    longitudesDeg: Float64Array.from(longitudes),
    shellHeightKm: 450,
    baseRadiusKm: 6371,
    tec: hours.map(field),
    rms: hours.map((hour) => (hour === 0 ? field(0) : null)),
    heights: hours.map(() => null),
    mappingFunction: 'NONE',
    elevationCutoffDeg: Number.NaN,
    intervalSeconds: 7200,
  };
}

const at = (latitudeDeg: number, longitudeDeg: number) => ({ latitudeDeg, longitudeDeg });
const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const latitude = number(30, 60);
const longitude = number(-20, 20);
const coefficient = number(-3, 3);

describe('tecAt', () => {
  it('reproduces planes with a cross term, in space and time', () => {
    const plane = fc.tuple(coefficient, coefficient, coefficient, coefficient, coefficient);
    fc.assert(
      fc.property(plane, latitude, longitude, number(0, 2), ([a, b, c, d, e], lat, lon, hour) => {
        const tec = (x: number, y: number, t: number): number => a + b * x + c * y + d * x * y + e * t;
        const value = tecAt(mapsOf({ tec }), hour * HOUR, at(lat, lon), 'linear');
        expect(Math.abs(value - tec(lat, lon, hour))).toBeLessThan(1e-8);
      }),
      { seed: 21 },
    );
  });

  it('is continuous in place and time where it interpolates', () => {
    const rough = mapsOf({
      hours: [0, 1, 2, 3],
      tec: (x, y, t) => 20 + 15 * Math.sin(x * 7 + y * 3 + t * 5),
    });
    // away from the edges, so that turned maps are on the grid too
    fc.assert(
      fc.property(latitude, number(-3, 3), number(0.2, 2.8), (lat, lon, hour) => {
        for (const scheme of ['linear', 'rotated'] as const) {
          const here = tecAt(rough, hour * HOUR, at(lat, lon), scheme);
          const held = Math.min(59.9999, lat);
          const beside = [
            tecAt(rough, hour * HOUR, at(held + 1e-6, lon), scheme) -
              tecAt(rough, hour * HOUR, at(held, lon), scheme),
            tecAt(rough, hour * HOUR, at(lat, lon + 1e-6), scheme) - here,
            tecAt(rough, hour * HOUR + 1, at(lat, lon), scheme) - here,
          ];
          for (const step of beside) expect(Math.abs(step)).toBeLessThan(1e-3);
        }
      }),
      { seed: 22 },
    );
  });

  it('stays between the nodes around it', () => {
    const rough = mapsOf({ tec: (x, y, t) => 20 + 15 * Math.sin(x * 7 + y * 3 + t * 5) });
    fc.assert(
      fc.property(latitude, longitude, number(0, 2), (lat, lon, hour) => {
        for (const scheme of ['nearest', 'linear'] as const) {
          const value = tecAt(rough, hour * HOUR, at(lat, lon), scheme);
          expect(value).toBeGreaterThanOrEqual(5 - 1e-9);
          expect(value).toBeLessThanOrEqual(35 + 1e-9);
        }
      }),
      { seed: 23 },
    );
  });

  it('keeps missing missing: only where the missing node counts', () => {
    const holed = mapsOf({ tec: (x, y) => (x === 50 && y === 0 ? Number.NaN : 10) });
    fc.assert(
      fc.property(latitude, longitude, number(0, 2), (lat, lon, hour) => {
        const touched = lat > 40 && lat < 60 && lon > -10 && lon < 10;
        const value = tecAt(holed, hour * HOUR, at(lat, lon), 'linear');
        if (touched) expect(value).toBeNaN();
        else expect(value).toBeCloseTo(10, 9);
      }),
      { seed: 24 },
    );
    expect(tecAt(holed, HOUR, at(50, 10), 'linear')).toBe(10);
  });

  it('serves nothing outside the grid and the time of the maps', () => {
    const maps = mapsOf({ tec: () => 10 });
    for (const scheme of TIME_SCHEMES) {
      expect(tecAt(maps, HOUR, at(60.1, 0), scheme)).toBeNaN();
      expect(tecAt(maps, HOUR, at(45, 60), scheme)).toBeNaN();
      expect(tecAt(maps, 3.1 * HOUR, at(45, 0), scheme)).toBeNaN();
      expect(tecAt(maps, Number.NaN, at(45, 0), scheme)).toBeNaN();
    }
    expect(tecAt(maps, 2.9 * HOUR, at(45, 0), 'nearest')).toBe(10);
    expect(tecAt(maps, 2.1 * HOUR, at(45, 0), 'linear')).toBeNaN();
  });

  it('does not interpolate between maps more than four hours apart', () => {
    const maps = mapsOf({ hours: [0, 4, 9], tec: () => 10 });
    expect(tecAt(maps, 2 * HOUR, at(45, 0), 'linear')).toBe(10);
    for (const scheme of TIME_SCHEMES) expect(tecAt(maps, 6.5 * HOUR, at(45, 0), scheme)).toBeNaN();
  });

  it('closes the globe, whether the grid repeats its first meridian or not, in either direction', () => {
    const wave = (_: number, lon: number): number => 20 + 10 * Math.cos((lon * Math.PI) / 180);
    const closed = Array.from({ length: 13 }, (_, k) => -180 + 30 * k);
    const open = Array.from({ length: 12 }, (_, k) => 30 * k);
    const grids = [closed, [...closed].reverse(), open, [...open].reverse()];
    const all = grids.map((longitudes) => mapsOf({ longitudes, tec: wave }));
    fc.assert(
      fc.property(latitude, number(-700, 700), number(0, 2), (lat, lon, hour) => {
        for (const scheme of TIME_SCHEMES) {
          const [first, ...others] = all.map((maps) => tecAt(maps, hour * HOUR, at(lat, lon), scheme));
          for (const value of others) expect(Math.abs(value! - first!)).toBeLessThan(1e-8);
        }
      }),
      { seed: 25 },
    );
  });

  it('holds a field that turns with the Sun exactly, when rotated', () => {
    const sun = (_: number, lon: number, hour: number): number =>
      Math.abs(((((lon + 15 * hour) % 360) + 360) % 360) - 180);
    const longitudes = Array.from({ length: 73 }, (_, k) => -180 + 5 * k);
    const maps = mapsOf({ longitudes, hours: [0, 2, 4], tec: sun });
    fc.assert(
      fc.property(latitude, number(-180, 180), number(0, 4), (lat, lon, hour) => {
        const value = tecAt(maps, hour * HOUR, at(lat, lon), 'rotated');
        expect(Math.abs(value - sun(lat, lon, hour))).toBeLessThan(1e-8);
      }),
      { seed: 26 },
    );
  });

  it('gives errors from their own maps, and none where a map has none', () => {
    const maps = mapsOf({ tec: (x) => x / 10 });
    expect(tecRmsAt(maps, 0, at(45, 0))).toBeCloseTo(4.5, 12);
    expect(tecRmsAt(maps, HOUR, at(45, 0), 'linear')).toBeNaN();
  });
});

describe('tecGradientAt', () => {
  const kmPerDegree = ((6371 + 450) * Math.PI) / 180;

  it('is the slope of a plane, in every direction', () => {
    fc.assert(
      fc.property(coefficient, coefficient, number(35, 55), number(-15, 15), (b, c, lat, lon) => {
        const maps = mapsOf({ tec: (x, y) => 50 + b * x + c * y });
        const gradient = tecGradientAt(maps, HOUR, at(lat, lon), 'linear');
        const north = b / kmPerDegree;
        const east = c / (kmPerDegree * Math.cos((lat * Math.PI) / 180));
        expect(Math.abs(gradient.northTecuPerKm - north)).toBeLessThan(1e-10);
        expect(Math.abs(gradient.eastTecuPerKm - east)).toBeLessThan(1e-10);
        expect(gradientAlong(gradient, 0)).toBeCloseTo(north, 10);
        expect(gradientAlong(gradient, 90)).toBeCloseTo(east, 10);
        expect(gradientAlong(gradient, 225)).toBeCloseTo((-north - east) / Math.SQRT2, 10);
        const steepest = steepestGradient(gradient);
        const direction = (Math.atan2(east, north) * 180) / Math.PI;
        expect(gradientAlong(gradient, direction)).toBeCloseTo(steepest, 10);
      }),
      { seed: 27 },
    );
  });

  it('is not known beside the edge of the grid', () => {
    const maps = mapsOf({ tec: () => 10 });
    expect(tecGradientAt(maps, HOUR, at(58, 0), 'linear').northTecuPerKm).toBeNaN();
    expect(tecGradientAt(maps, HOUR, at(45, 0), 'linear')).toEqual({ northTecuPerKm: 0, eastTecuPerKm: 0 });
  });
});
