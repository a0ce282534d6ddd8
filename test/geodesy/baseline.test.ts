import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { baselineBetween } from '../../src/geodesy/baseline.js';
import type { Geodetic } from '../../src/geodesy/coordinates.js';
import { GRS80, meridianRadiusM, primeVerticalRadiusM } from '../../src/geodesy/ellipsoid.js';
import { distanceErrorMm, metresPer } from '../../src/geodesy/lengthUnits.js';

const place = (latitudeDeg: number, longitudeDeg: number, heightM = 0): Geodetic => ({
  latitudeDeg,
  longitudeDeg,
  heightM,
});
const dms = (d: number, m: number, s: number) => d + m / 60 + s / 3600;

describe('Flinders Peak to Buninyong (GDA Technical Manual, GRS 80)', () => {
  const flinders = place(-dms(37, 57, 3.7203), dms(144, 25, 29.5244));
  const buninyong = place(-dms(37, 39, 10.1561), dms(143, 55, 35.3839));
  const line = baselineBetween(flinders, buninyong, GRS80);

  it('chord and its arc', () => {
    // The manual gives the geodesic, 54972.271 m. An arc over the chord with Euler's radius of the section at mid-latitude
    // (both ends at height 0) is the same within 2 mm.
    const middle = (flinders.latitudeDeg + buninyong.latitudeDeg) / 2;
    const azimuth = (((line.azimuthDeg + line.azimuthAtRoverDeg) / 2) * Math.PI) / 180;
    const radius =
      1 /
      (Math.cos(azimuth) ** 2 / meridianRadiusM(middle, GRS80) +
        Math.sin(azimuth) ** 2 / primeVerticalRadiusM(middle, GRS80));
    const chord = line.lengthKm * 1000;
    const arc = 2 * radius * Math.asin(chord / (2 * radius));
    expect(Math.abs(arc - 54972.271)).toBeLessThan(0.002);
    // the correction itself is c³/24R²: 0.170 m, 85 times that tolerance
    expect(arc - chord).toBeCloseTo(chord ** 3 / (24 * radius ** 2), 4);
  });
  it('azimuths at both ends', () => {
    // The manual's 306 52 05.37 and 127 10 25.07 are of the geodesic; ours are of the normal sections, which differ over
    // this line by e² s² cos²φ sin 2A / 12a² ≈ 0.006″ at height 0. The manual's second azimuth points back.
    const arcSecond = 1 / 3600;
    expect(Math.abs(line.azimuthDeg - dms(306, 52, 5.37))).toBeLessThan(0.015 * arcSecond);
    expect(Math.abs(line.azimuthAtRoverDeg - 180 - dms(127, 10, 25.07))).toBeLessThan(0.015 * arcSecond);
  });
});

describe('simple lines', () => {
  it('points the four ways and straight up', () => {
    const base = place(10, 20, 50);
    // north is 0, or just below 360 by rounding
    const north = (baselineBetween(base, place(10.1, 20, 50)).azimuthDeg * Math.PI) / 180;
    expect(Math.sin(north)).toBeCloseTo(0, 11);
    expect(Math.cos(north)).toBeCloseTo(1, 11);
    expect(baselineBetween(base, place(9.9, 20, 50)).azimuthDeg).toBeCloseTo(180, 9);
    expect(baselineBetween(place(0, 20), place(0, 20.1)).azimuthDeg).toBeCloseTo(90, 9);
    expect(baselineBetween(place(0, 20), place(0, 19.9)).azimuthDeg).toBeCloseTo(270, 9);
    const up = baselineBetween(base, place(10, 20, 80));
    expect(up.lengthKm).toBeCloseTo(0.03, 11);
    expect(up.heightDifferenceM).toBe(30);
    expect([up.azimuthDeg, up.azimuthAtRoverDeg]).toEqual([Number.NaN, Number.NaN]);
  });
  it('no length has no direction', () => {
    const base = place(10, 20, 50);
    expect(baselineBetween(base, base)).toEqual({
      lengthKm: 0,
      azimuthDeg: Number.NaN,
      azimuthAtRoverDeg: Number.NaN,
      heightDifferenceM: 0,
    });
  });
  it('crosses the date line the short way', () => {
    const line = baselineBetween(place(0, 179.95), place(0, -179.95));
    expect(line.azimuthDeg).toBeCloseTo(90, 9);
    // 0.1° of the equator, 11 131.949 m of arc; chord 1.4 mm shorter
    expect(line.lengthKm).toBeCloseTo(11.131949 - 0.0000014, 6);
  });
  it('meridians converge: east of the base a line has turned by Δλ sin φ', () => {
    const line = baselineBetween(place(50, 10), place(50, 10.3));
    expect(line.azimuthAtRoverDeg - line.azimuthDeg).toBeCloseTo(0.3 * Math.sin((50 * Math.PI) / 180), 5);
  });
});

describe('laws', () => {
  const latitude = fc.double({ min: -89, max: 89, noNaN: true });
  const longitude = fc.double({ min: -180, max: 180, noNaN: true });
  const step = fc.double({ min: -0.5, max: 0.5, noNaN: true });
  const height = fc.double({ min: -100, max: 4000, noNaN: true });
  it('a turn about the axis of the earth changes nothing', () => {
    fc.assert(
      fc.property(
        latitude,
        longitude,
        step,
        step,
        height,
        height,
        longitude,
        (lat, lon, dLat, dLon, h1, h2, turn) => {
          const line = (by: number) =>
            baselineBetween(place(lat, lon + by, h1), place(lat + dLat, lon + dLon + by, h2));
          const [a, b] = [line(0), line(turn)];
          expect(Math.abs(a.lengthKm - b.lengthKm)).toBeLessThan(1e-11 + 1e-12 * a.lengthKm);
          expect(a.heightDifferenceM).toBe(b.heightDifferenceM);
          if (a.lengthKm > 5) {
            const difference = Math.abs(a.azimuthDeg - b.azimuthDeg);
            expect(Math.min(difference, 360 - difference)).toBeLessThan(1e-9);
          }
        },
      ),
      { seed: 13 },
    );
  });
  it('the line back has the same length and the opposite direction', () => {
    fc.assert(
      fc.property(latitude, longitude, step, step, (lat, lon, dLat, dLon) => {
        const a = baselineBetween(place(lat, lon), place(lat + dLat, lon + dLon));
        const b = baselineBetween(place(lat + dLat, lon + dLon), place(lat, lon));
        expect(Math.abs(a.lengthKm - b.lengthKm)).toBeLessThan(1e-11);
        if (a.lengthKm > 1)
          expect(Math.cos(((a.azimuthDeg - b.azimuthAtRoverDeg) * Math.PI) / 180)).toBeCloseTo(-1, 9);
      }),
      { seed: 14 },
    );
  });
});

describe('lengthUnits', () => {
  it('feet', () => {
    expect(metresPer('metre')).toBe(1);
    expect(metresPer('international-foot')).toBe(0.3048);
    // 1200/3937 m: Federal Register 85 FR 62698
    expect(metresPer('us-survey-foot')).toBeCloseTo(0.3048006096012192, 16);
    expect(metresPer('us-survey-foot') / metresPer('international-foot')).toBeCloseTo(1.000002000004, 12);
  });
  it('one ppm is one millimetre per kilometre', () => {
    expect(distanceErrorMm(1, 10)).toBe(10);
    expect(distanceErrorMm(2.5, 4)).toBe(10);
  });
});
