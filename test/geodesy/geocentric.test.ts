import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Geocentric, Geodetic } from '../../src/geodesy/coordinates.js';
import {
  ellipsoid,
  GRS80,
  meridianRadiusM,
  primeVerticalRadiusM,
  WGS84,
} from '../../src/geodesy/ellipsoid.js';
import { geocentricToGeodetic, geodeticToGeocentric } from '../../src/geodesy/geocentric.js';
import { localFrame } from '../../src/geodesy/localFrame.js';

const rows = (name: string) =>
  readFileSync(new URL(`../fixtures/proj/${name}`, import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(','));
const place = (latitudeDeg: number, longitudeDeg: number, heightM: number): Geodetic => ({
  latitudeDeg,
  longitudeDeg,
  heightM,
});
const point = (xM: number, yM: number, zM: number): Geocentric => ({ xM, yM, zM });
const distanceM = (a: Geocentric, b: Geocentric) => Math.hypot(a.xM - b.xM, a.yM - b.yM, a.zM - b.zM);
const DEG = Math.PI / 180;

describe('ellipsoids', () => {
  it('has the derived constants of WGS 84 and GRS 80', () => {
    // EPSG guidance note 7-2 and the definitions of the two systems
    expect(WGS84.flattening).toBeCloseTo(0.0033528106647474805, 18);
    expect(WGS84.eccentricitySquared).toBeCloseTo(0.0066943799901413165, 17);
    expect(WGS84.semiMinorAxisM).toBeCloseTo(6356752.314245179, 8);
    expect(GRS80.flattening).toBeCloseTo(0.003352810681182319, 18);
  });
  it('has the radii of curvature of WGS 84', () => {
    // a²/b at the pole and a(1 − e²) at the equator; 45° computed independently from the same formulas in other code
    expect(primeVerticalRadiusM(0, WGS84)).toBeCloseTo(6378137, 6);
    expect(meridianRadiusM(0, WGS84)).toBeCloseTo(6335439.327293, 6);
    expect(primeVerticalRadiusM(45, WGS84)).toBeCloseTo(6388838.290121, 6);
    expect(meridianRadiusM(45, WGS84)).toBeCloseTo(6367381.81562, 6);
    expect(primeVerticalRadiusM(90, WGS84)).toBeCloseTo(6399593.625758, 6);
    expect(meridianRadiusM(-90, WGS84)).toBeCloseTo(6399593.625758, 6);
    expect(meridianRadiusM(45, WGS84) * DEG).toBeCloseTo(111131.7774, 4);
    expect(primeVerticalRadiusM(45, WGS84) * Math.cos(45 * DEG) * DEG).toBeCloseTo(78846.835094, 6);
  });
  it('takes a sphere and refuses nonsense', () => {
    expect(ellipsoid('sphere', 6371000, Number.POSITIVE_INFINITY).semiMinorAxisM).toBe(6371000);
    expect(() => ellipsoid('x', 0, 298)).toThrow(
      new RangeError('semiMajorAxisM: expected a finite number of metres above 0, received 0'),
    );
    expect(() => ellipsoid('x', 6e6, 0)).toThrow(
      new RangeError('inverseFlattening: expected a number above 1, received 0'),
    );
  });
});

describe('geodetic and geocentric coordinates', () => {
  it('EPSG guidance note 7-2, method 9602', () => {
    const c = geodeticToGeocentric(place(53 + 48 / 60 + 33.82 / 3600, 2 + 7 / 60 + 46.38 / 3600, 73));
    expect(c.xM).toBeCloseTo(3771793.968, 3);
    expect(c.yM).toBeCloseTo(140253.342, 3);
    expect(c.zM).toBeCloseTo(5124304.349, 3);
  });
  it('test values of an astronomy library (ERFA), both ways and both ellipsoids', () => {
    const there = point(2e6, 3e6, 5.244e6);
    const wgs84 = geocentricToGeodetic(there);
    expect(Math.abs(wgs84.longitudeDeg * DEG - 0.982793723247329)).toBeLessThan(1e-14);
    expect(Math.abs(wgs84.latitudeDeg * DEG - 0.9716018481907546)).toBeLessThan(1e-14);
    expect(wgs84.heightM).toBeCloseTo(331.4172461426, 8);
    const grs80 = geocentricToGeodetic(there, GRS80);
    expect(Math.abs(grs80.latitudeDeg * DEG - 0.9716018482060785)).toBeLessThan(1e-14);
    expect(grs80.heightM).toBeCloseTo(331.41731754844, 8);
    const c = geodeticToGeocentric(place(-0.5 / DEG, 3.1 / DEG, 2500));
    expect(c.xM).toBeCloseTo(-5599000.557704994, 7);
    expect(c.yM).toBeCloseTo(233011.67223479203, 7);
    expect(c.zM).toBeCloseTo(-3040909.470698336, 7);
  });
  it.each([
    // GIGS test procedure 5201, tolerance 1 cm
    [80, 150, 1214.137, -962479.5924, 555687.8517, 6260738.6526],
    [30, 60, 0, 2764128.3196, 4787610.6883, 3170373.7354],
  ])('GIGS 5201: %d %d %d', (latitude, longitude, height, x, y, z) => {
    expect(distanceM(geodeticToGeocentric(place(latitude, longitude, height)), point(x, y, z))).toBeLessThan(
      0.01,
    );
  });
  it('PROJ to 0.1 µm, and back', () => {
    for (const [name, latitude, longitude, height, x, y, z] of rows('geocentric.csv')) {
      const g = place(Number(latitude), Number(longitude), Number(height));
      const c = point(Number(x), Number(y), Number(z));
      expect(distanceM(geodeticToGeocentric(g), c), name).toBeLessThan(2e-7);
      const back = geocentricToGeodetic(c);
      // printed to 1e-7 m, that is 2e-14 rad
      expect(Math.abs(back.latitudeDeg - g.latitudeDeg) * DEG, name).toBeLessThan(5e-14);
      expect(Math.abs(back.heightM - g.heightM), name).toBeLessThan(2e-7);
    }
  });
  it('on the axis and on the date line', () => {
    expect(geocentricToGeodetic(point(0, 0, 6400000))).toMatchObject({ latitudeDeg: 90, longitudeDeg: 0 });
    expect(geocentricToGeodetic(point(0, 0, -6400000)).latitudeDeg).toBe(-90);
    expect(geocentricToGeodetic(point(0, 0, -6400000)).heightM).toBeCloseTo(6400000 - 6356752.314245179, 8);
    expect(geocentricToGeodetic(point(-6378137, 0, 0))).toEqual(place(0, 180, 0));
    expect(geocentricToGeodetic(point(-6378137, -0, 0)).longitudeDeg).toBe(180);
  });
  it('refuses points without a useful latitude', () => {
    for (const c of [point(0, 0, 0), point(3771.8, 140.3, 5124.3), point(Number.NaN, 1, 1)])
      expect(() => geocentricToGeodetic(c)).toThrow(/^c: expected geocentric metres more than 3178376 m/);
  });
  it('round trip to 1e-12 rad, from 3000 km below to 40 000 km above', () => {
    const latitude = fc.double({ min: -90, max: 90, noNaN: true });
    const longitude = fc.double({ min: -179.999, max: 180, noNaN: true });
    const height = fc.double({ min: -3e6, max: 4e7, noNaN: true });
    fc.assert(
      fc.property(latitude, longitude, height, (lat, lon, h) => {
        const c = geodeticToGeocentric(place(lat, lon, h));
        const g = geocentricToGeodetic(c);
        expect(Math.abs(g.latitudeDeg - lat) * DEG).toBeLessThan(1e-12);
        expect(Math.abs(g.heightM - h)).toBeLessThan(1e-7);
        expect(distanceM(geodeticToGeocentric(g), c)).toBeLessThan(1e-7);
      }),
      { seed: 11, numRuns: 2000 },
    );
  });
});

describe('local frame', () => {
  it('EPSG guidance note 7-2, methods 9836 and 9837', () => {
    const frame = localFrame(place(55, 5, 200));
    const v = frame.toLocal(point(3771793.968, 140253.342, 5124304.349));
    expect(v.eastM).toBeCloseTo(-189013.869, 3);
    expect(v.northM).toBeCloseTo(-128642.04, 3);
    expect(v.upM).toBeCloseTo(-4220.171, 3);
    const centre = frame.toGeocentric({ eastM: 0, northM: 0, upM: 0 });
    expect(distanceM(centre, point(3652755.3058, 319574.6799, 5201547.3536))).toBeLessThan(1e-4);
  });
  it('PROJ to 0.1 mm', () => {
    const places = new Map(
      rows('geocentric.csv').map(([name, , , , x, y, z]) => [name, point(Number(x), Number(y), Number(z))]),
    );
    const all = rows('topocentric.csv');
    expect(all).toHaveLength(24);
    for (const [lat, lon, h, name, east, north, up] of all) {
      const v = localFrame(place(Number(lat), Number(lon), Number(h))).toLocal(places.get(name)!);
      const error = Math.hypot(v.eastM - Number(east), v.northM - Number(north), v.upM - Number(up));
      expect(error, `${name} from ${lat} ${lon}`).toBeLessThan(1e-6);
    }
  });
  it('turns a covariance matrix as a government geodesy library does', () => {
    // its test values: place, matrix and result
    const frame = localFrame(place(19.4792453, 70.69315634, 0));
    const axes = [point(1, 0, 0), point(0, 1, 0), point(0, 0, 1)].map((axis) => {
      const { eastM, northM, upM } = frame.rotate(axis);
      return [eastM, northM, upM];
    });
    expect(axes.flat().map((v) => Number(v.toFixed(8)) + 0)).toEqual([
      -0.94376147, -0.1102527, 0.3117028, 0.33062712, -0.31471177, 0.88974278, 0, 0.94276235, 0.33346538,
    ]);
    const v = [
      [1.44, -1.32, 1.32],
      [-1.32, 1.22, -1.2],
      [1.32, -1.2, 1.2],
    ];
    const local = (i: number, j: number) =>
      axes.reduce(
        (total, a, m) => total + axes.reduce((part, b, n) => part + a[i]! * v[m]![n]! * b[j]!, 0),
        0,
      );
    expect(local(0, 0)).toBeCloseTo(2.23971834, 8);
    expect(local(0, 1)).toBeCloseTo(-1.86955194, 8);
    expect(local(0, 2)).toBeCloseTo(0.3599339, 8);
    expect(local(1, 1)).toBeCloseTo(1.55096504, 8);
    expect(local(1, 2)).toBeCloseTo(-0.29615085, 8);
    expect(local(2, 2)).toBeCloseTo(0.06931662, 8);
  });
  it('keeps lengths and comes back', () => {
    const number = fc.double({ min: -50_000, max: 50_000, noNaN: true });
    const latitude = fc.double({ min: -90, max: 90, noNaN: true });
    const longitude = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(latitude, longitude, number, number, number, (lat, lon, x, y, z) => {
        const frame = localFrame(place(lat, lon, 100));
        const v = frame.rotate(point(x, y, z));
        expect(Math.abs(Math.hypot(v.eastM, v.northM, v.upM) - Math.hypot(x, y, z))).toBeLessThan(1e-10);
        const back = frame.toLocal(frame.toGeocentric(v));
        // geocentric coordinates of 6e6 m carry 1e-9 m
        expect(Math.hypot(back.eastM - v.eastM, back.northM - v.northM, back.upM - v.upM)).toBeLessThan(1e-8);
      }),
      { seed: 12 },
    );
  });
});
