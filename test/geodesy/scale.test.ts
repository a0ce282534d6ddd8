import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arcOfChordM, chordOfArcM } from '../../src/geodesy/arcs.js';
import { combinedFactor, gaussianRadiusM, heightFactor } from '../../src/geodesy/combinedFactor.js';
import { GRS80, WGS84 } from '../../src/geodesy/ellipsoid.js';
import { geodesicBetween } from '../../src/geodesy/geodesic.js';
import { groundGrid } from '../../src/geodesy/groundGrid.js';
import { lineLengths, lineScale } from '../../src/geodesy/lineLengths.js';
import { pointScale } from '../../src/geodesy/pointScale.js';
import { projection } from '../../src/geodesy/projection.js';

const rows = (name: string) =>
  readFileSync(new URL(`../fixtures/scale/${name}`, import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(','));
const dms = (d: number, m: number, s: number) => d + m / 60 + s / 3600;
const at = (latitudeDeg: number, longitudeDeg: number, heightM = 0) => ({
  latitudeDeg,
  longitudeDeg,
  heightM,
});

// GDA Technical Manual
const zone55 = projection('+proj=utm +zone=55 +south +ellps=GRS80');
const flinders = at(-dms(37, 57, 3.7203), dms(144, 25, 29.5244));
const buninyong = at(-dms(37, 39, 10.1561), dms(143, 55, 35.3839));

describe('pointScale', () => {
  it('GDA Technical Manual: point scale and convergence, which the manual counts the other way', () => {
    const a = pointScale(zone55, flinders);
    const b = pointScale(zone55, buninyong);
    // the manual prints 8 decimals; the further digits come from the same series in other code
    expect(a.scale).toBeCloseTo(1.0002305586, 9.9);
    expect(b.scale).toBeCloseTo(1.0005056691, 9.9);
    // 0.00005″
    expect(Math.abs(a.convergenceDeg - dms(1, 35, 3.6472)) * 3600).toBeLessThan(5e-5);
    expect(Math.abs(b.convergenceDeg - dms(1, 52, 43.2185)) * 3600).toBeLessThan(5e-5);
  });
  it('EPSG guidance note 7-2: the places of its examples', () => {
    // scale by PROJ's series, more digits than it prints
    const britain = projection(
      '+proj=tmerc +lat_0=49 +lon_0=-2 +k_0=0.9996012717 +x_0=400000 +y_0=-100000 +a=6377563.396 +rf=299.3249646',
    );
    expect(pointScale(britain, at(50.5, 0.5)).scale).toBeCloseTo(0.999987286691, 10);
    const texas = projection(
      `+proj=lcc +lat_1=${dms(28, 23, 0)} +lat_2=${dms(30, 17, 0)} +lat_0=${dms(27, 50, 0)} +lon_0=-99 +ellps=clrk66`,
    );
    expect(pointScale(texas, at(28.5, -96)).scale).toBeCloseTo(0.999968559436, 10);
    expect(pointScale(texas, at(28.5, -96)).convergenceDeg).toBeCloseTo(1.469737890677, 9);
  });
  it('PROJ, to all the digits it prints', () => {
    const all = rows('scales.csv');
    expect(all).toHaveLength(15);
    for (const [definition = '', ...numbers] of all) {
      const [lat, lon, meridian, parallel, convergence] = numbers.map(Number) as [
        number,
        number,
        number,
        number,
        number,
      ];
      const scale = pointScale(projection(definition), at(lat, lon));
      expect(Math.abs(scale.meridianScale - meridian), definition).toBeLessThan(5.1e-9);
      expect(Math.abs(scale.parallelScale - parallel), definition).toBeLessThan(5.1e-9);
      // 5e-9° printed
      expect(Math.abs(scale.convergenceDeg - convergence), definition).toBeLessThan(7e-9);
    }
  });
  it('is the factor of the definition on the central meridian, with no convergence', () => {
    fc.assert(
      fc.property(fc.double({ min: -80, max: 80, noNaN: true }), (latitude) => {
        const { scale, meridianScale, convergenceDeg } = pointScale(
          projection('EPSG:32631'),
          at(latitude, 3),
        );
        expect(scale).toBeCloseTo(0.9996, 10);
        expect(meridianScale).toBeCloseTo(0.9996, 10);
        expect(convergenceDeg).toBeCloseTo(0, 9);
      }),
      { seed: 18 },
    );
  });
  it('refuses the poles', () => {
    expect(() => pointScale(projection('EPSG:32661'), at(90, 0))).toThrow(
      'latitudeDeg: expected a place more than 0.1 degrees from a pole, received 90',
    );
  });
});

describe('combined factor', () => {
  it('published arithmetic in feet: 0.999981 × 20906000 / 20906500', () => {
    expect(0.999981 * heightFactor(500, 20_906_000)).toBeCloseTo(0.99995708, 8);
  });
  it('1000 m up on a sphere of 6371 km is −156.937 ppm', () => {
    expect(heightFactor(1000, 6_371_000)).toBeCloseTo(0.9998430634, 10);
    expect((heightFactor(1000, 6_371_000) - 1) * 1e6).toBeCloseTo(-156.937, 3);
  });
  it('on a central meridian of UTM at height 0 is −400 ppm', () => {
    const factor = combinedFactor(projection('EPSG:32631'), at(47, 3));
    expect(factor.ppm).toBeCloseTo(-400, 4);
    expect(factor.heightFactor).toBe(1);
  });
  it('is the product, with the radius of the place or a stated one', () => {
    const place = at(46.5, 7.25, 1850);
    const factor = combinedFactor(projection('EPSG:32632'), place, 6_371_000);
    expect(factor.combinedFactor).toBe(factor.pointScale * factor.heightFactor);
    expect(factor.heightFactor).toBe(heightFactor(1850, 6_371_000));
    // √(M N) = b / (1 − e² sin² φ): 6 379 223 m at 46.5°
    expect(gaussianRadiusM(46.5, WGS84)).toBeCloseTo(
      6_356_752.3142 / (1 - 0.00669437999 * Math.sin((46.5 * Math.PI) / 180) ** 2),
      1,
    );
    expect(gaussianRadiusM(46.5, WGS84)).toBeCloseTo(6_379_223, -0.6);
    const own = combinedFactor(projection('EPSG:32632'), place);
    expect(own.heightFactor).toBeCloseTo(1 - 1850 / (6_379_223 + 1850), 9);
  });
  it('says what a height must be', () => {
    expect(() => heightFactor(Number.NaN, 6_371_000)).toThrow(
      'ellipsoidalHeightM and radiusM: expected a finite height above minus the radius, received NaN and 6371000',
    );
    expect(() => heightFactor(-7e6, 6_371_000)).toThrow(RangeError);
  });
});

describe('lines', () => {
  it('GDA Technical Manual: Flinders Peak to Buninyong', () => {
    const line = lineLengths(zone55, flinders, buninyong);
    expect(line.ellipsoidM).toBeCloseTo(54972.271, 3);
    expect(line.gridM).toBeCloseTo(54992.279, 3);
    expect(line.lineScale).toBeCloseTo(1.00036397, 8);
    expect(lineScale(zone55, flinders, buninyong)).toBeCloseTo(1.00036397, 8);
    const { azimuthDeg, azimuthAtEndDeg } = geodesicBetween(flinders, buninyong, GRS80);
    // printed to 0.01″; the manual's second azimuth points back
    expect(Math.abs(azimuthDeg - dms(306, 52, 5.37)) * 3600).toBeLessThan(0.006);
    expect(Math.abs(azimuthAtEndDeg - 180 - dms(127, 10, 25.07)) * 3600).toBeLessThan(0.006);
    // on the ellipsoid ground and ellipsoid are one, and the chord is s³/24R² shorter
    expect(line.groundM).toBeCloseTo(line.ellipsoidM, 9);
    expect(line.combinedFactor).toBeCloseTo(line.lineScale, 14);
    expect(line.ellipsoidM - line.chordM).toBeCloseTo(54972.271 ** 3 / 24 / 6_372_000 ** 2, 3);
  });
  it('geodesics of PROJ and of GeographicLib', () => {
    const all = rows('geodesics.csv').map(
      (row) => row.map(Number) as [number, number, number, number, number, number, number],
    );
    expect(all).toHaveLength(8);
    const turn = (a: number, b: number) => Math.abs(((a - b + 540) % 360) - 180);
    for (const [lat1, lon1, lat2, lon2, azimuth, back, length] of all) {
      const line = geodesicBetween(at(lat1, lon1), at(lat2, lon2));
      // Vincenty's series is stated to 0.1 mm, and longer lines are far from this trade
      expect(Math.abs(line.lengthM - length), String(length)).toBeLessThan(1e-4);
      // 1e-8° over the length, and 1 µm over short ones
      const tolerance = 1e-9 + (1e-5 / length) * 57.3;
      expect(turn(line.azimuthDeg, azimuth), String(length)).toBeLessThan(tolerance);
      expect(turn(line.azimuthAtEndDeg + 180, back), String(length)).toBeLessThan(tolerance);
    }
    // one of GeographicLib's test lines
    expect(geodesicBetween(at(35.60777, -139.44815), at(-11.17491, -69.95921)).lengthM).toBeCloseTo(
      8935244.5604818,
      3.9,
    );
    expect(geodesicBetween(at(35.60777, -139.44815), at(-11.17491, -69.95921)).azimuthAtEndDeg).toBeCloseTo(
      129.2892708897,
      8,
    );
  });
  it('the ground at a height is longer than the ellipsoid by h/R, and a slope makes the chord longer', () => {
    const line = lineLengths(projection('EPSG:32632'), at(46.5, 8, 1000), at(46.55, 8.05, 1000));
    expect((line.groundM / line.ellipsoidM - 1) * 6_380_000).toBeCloseTo(1000, -0.6);
    expect(line.groundM - line.chordM).toBeLessThan(0.001);
    const slope = lineLengths(projection('EPSG:32632'), at(46.5, 8, 900), at(46.55, 8.05, 1100));
    expect(slope.groundM).toBeCloseTo(line.groundM, 9);
    expect(slope.chordM).toBeCloseTo(Math.hypot(line.chordM, 200), 3);
  });
  it('have no scale without a length', () => {
    const line = lineLengths(zone55, flinders, flinders);
    expect(line).toEqual({
      chordM: 0,
      ellipsoidM: 0,
      groundM: 0,
      gridM: 0,
      lineScale: Number.NaN,
      combinedFactor: Number.NaN,
    });
    expect(lineScale(zone55, flinders, flinders)).toBeCloseTo(1.0002305586, 9);
  });
  it('along equator and meridian, across the date line, and almost to the other side', () => {
    expect(geodesicBetween(at(0, 179.5), at(0, -179.5)).lengthM).toBeCloseTo(111319.490793, 5);
    expect(geodesicBetween(at(0, 179.5), at(0, -179.5)).azimuthDeg).toBeCloseTo(90, 9);
    // quarter of a meridian of WGS 84
    expect(geodesicBetween(at(0, 10), at(90, 10)).lengthM).toBeCloseTo(10001965.7293, 3);
    expect(geodesicBetween(at(1, 2), at(1, 362))).toEqual({
      lengthM: 0,
      azimuthDeg: Number.NaN,
      azimuthAtEndDeg: Number.NaN,
    });
    expect(() => geodesicBetween(at(0, 0), at(0.1, 179.9))).toThrow(/not opposite each other/);
    expect(() => geodesicBetween(at(91, 0), at(0, 0))).toThrow(
      'latitudeDeg: expected -90 to 90, received 91',
    );
  });
  it('chord and arc, R 6371 km', () => {
    // 2R sin(s/2R) − s
    for (const [km, mm, ppm] of [
      [10, -1.0265, -0.103],
      [20, -8.2123, -0.411],
      [50, -128.317, -2.566],
    ] as const) {
      const shorter = (chordOfArcM(km * 1000, 6_371_000) - km * 1000) * 1000;
      expect(shorter).toBeCloseTo(mm, 3);
      expect(shorter / km).toBeCloseTo(ppm, 3);
      expect(arcOfChordM(chordOfArcM(km * 1000, 6_371_000), 6_371_000)).toBeCloseTo(km * 1000, 8);
    }
  });
  it('the chord of a geodesic lies within a micrometre of the arc formula on short lines', () => {
    const line = lineLengths(projection('EPSG:32632'), at(47.25, 9), at(47.25, 9.1));
    const { semiMajorAxisM: a, eccentricitySquared: e2 } = WGS84;
    const across = a / Math.sqrt(1 - e2 * Math.sin((47.25 * Math.PI) / 180) ** 2);
    expect(line.chordM).toBeCloseTo(chordOfArcM(line.ellipsoidM, across), 5);
  });
});

describe('groundGrid', () => {
  it('scales about a point and cuts coordinates short', () => {
    const job = groundGrid({
      factor: 1.0002,
      aboutEastingM: 450_000,
      aboutNorthingM: 5_200_000,
      shiftEastingM: -400_000,
      shiftNorthingM: -5_100_000,
    });
    const there = job.forward({ eastingM: 451_000, northingM: 5_198_000 });
    expect(there.eastingM).toBeCloseTo(51_000.2, 9);
    expect(there.northingM).toBeCloseTo(97_999.6, 9);
  });
  it('comes back to a nanometre', () => {
    const metres = fc.double({ min: -1e7, max: 1e7, noNaN: true });
    fc.assert(
      fc.property(
        fc.double({ min: 0.99, max: 1.01, noNaN: true }),
        fc.array(metres, { minLength: 6, maxLength: 6 }),
        (factor, [e, n, aboutE, aboutN, shiftE, shiftN]) => {
          const job = groundGrid({
            factor,
            aboutEastingM: aboutE!,
            aboutNorthingM: aboutN!,
            shiftEastingM: shiftE!,
            shiftNorthingM: shiftN!,
          });
          const back = job.inverse(job.forward({ eastingM: e!, northingM: n! }));
          expect(Math.hypot(back.eastingM - e!, back.northingM - n!)).toBeLessThan(2e-8);
        },
      ),
      { seed: 19 },
    );
  });
  it('makes grid distances ground distances at the point whose combined factor it undoes', () => {
    const grid = projection('EPSG:32632');
    const place = at(46.5, 10.5, 1200);
    const factor = combinedFactor(grid, place).combinedFactor;
    const job = groundGrid({ factor: 1 / factor });
    const near = at(46.501, 10.502, 1200);
    const [a, b] = [job.forward(grid.forward(place)), job.forward(grid.forward(near))];
    const length = Math.hypot(b.eastingM - a.eastingM, b.northingM - a.northingM);
    // 190 m: the factor changes by 1e-6 over it
    expect(Math.abs(length - lineLengths(grid, place, near).groundM)).toBeLessThan(3e-4);
  });
  it('says what it needs', () => {
    expect(() => groundGrid({ factor: 0 })).toThrow('factor: expected a number above 0, near 1, received 0');
    expect(() => groundGrid({ factor: 1, shiftEastingM: Number.NaN })).toThrow(
      'shiftEastingM: expected a finite number of metres, received NaN',
    );
  });
});
