import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { geographicProblem } from '../../src/geodesy/geographicProblem.js';
import { wrappedLongitude } from '../../src/geodesy/longitude.js';

const at = (latitudeDeg: number, longitudeDeg: number) => ({ latitudeDeg, longitudeDeg });
const base = at(47.25, 8.5);
const kind = (latitude: number, longitude: number, near?: typeof base) =>
  geographicProblem(at(latitude, longitude), near)?.kind;

describe('geographicProblem', () => {
  it('finds nothing wrong with a place on earth, in either habit of longitudes', () => {
    expect(kind(-33.75, 151.125)).toBeUndefined();
    expect(kind(40, 255.5)).toBeUndefined();
    expect(kind(40, 255.5, at(40.1, -104.6))).toBeUndefined();
    expect(kind(47.5, 8.75, base)).toBeUndefined();
    expect(kind(0, 0, at(0.1, 0.1))).toBeUndefined();
  });
  it('tells exchanged, wrong signs and radians from a place that must be near', () => {
    expect(geographicProblem(at(8.5, 47.25), base)).toEqual({
      kind: 'swapped',
      text: 'Expected a place within 200 km of latitude 47.25, longitude 8.5, received latitude 8.5, longitude 47.25; latitude and longitude are probably exchanged: exchange their columns.',
    });
    expect(kind(47.3, -8.6, base)).toBe('longitude-sign');
    expect(kind(33.7, 151.1, at(-33.75, 151.125))).toBe('latitude-sign');
    expect(kind(0.8247, 0.1484, base)).toBe('radians');
    expect(kind(-104.6, 40, at(40.1, -104.7))).toBe('swapped');
  });
  it('tells out of range, exchanged where it shows by itself, zeros and distance', () => {
    expect(geographicProblem(at(151.125, -33.75))).toEqual({
      kind: 'swapped',
      text: 'Expected a latitude from -90 to 90, received latitude 151.125, longitude -33.75; latitude and longitude are probably exchanged: exchange their columns.',
    });
    expect(geographicProblem(at(5_200_000, 450_000))?.text).toBe(
      'Expected a latitude from -90 to 90 and a longitude from -180 to 360 degrees, received latitude 5200000, longitude 450000; state the units if they are metres or degrees and minutes.',
    );
    expect(kind(47, 361)).toBe('out-of-range');
    expect(kind(Number.NaN, 8)).toBe('not-a-number');
    expect(kind(0, 0)).toBe('zero');
    expect(kind(0, 0, base)).toBe('zero');
    expect(geographicProblem(at(50.25, 8.5), base)?.text).toBe(
      'Expected a place within 200 km of latitude 47.25, longitude 8.5, received latitude 50.25, longitude 8.5, which is 334 km away; check both.',
    );
    expect(geographicProblem(at(50.25, 8.5), base, 400)).toBeUndefined();
  });
  it('never doubts what is near, and always finds an exchange of places far enough from the diagonal', () => {
    const latitude = fc.double({ min: -80, max: 80, noNaN: true });
    const longitude = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(latitude, longitude, (lat, lon) => {
        const near = at(lat + 0.5, lon + 0.5);
        expect(kind(lat, lon, near)).toBeUndefined();
        fc.pre(Math.abs(lat - lon) > 10 && Math.abs(lat) > 10);
        const problem = kind(lon, lat, near);
        // seen from near the equator or the meridian of Greenwich another sign may do as well
        if (Math.abs(lat + lon) > 10) expect(problem).toBe('swapped');
      }),
      { seed: 22 },
    );
  });
});

describe('wrappedLongitude', () => {
  it.each([
    [0, 0],
    [180, 180],
    [-180, 180],
    [181, -179],
    [359.5, -0.5],
    [360, 0],
    [540, 180],
    [-190, 170],
  ])('%d is %d', (longitude, wrapped) => expect(wrappedLongitude(longitude) + 0).toBe(wrapped));
});
