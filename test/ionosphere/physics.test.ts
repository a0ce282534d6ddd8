import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  delayPerTecuM,
  expectedShorteningPpm,
  frequencyRatioSquared,
  geometryFreePerTecuM,
  gradientPpm,
  ionosphereFreeFactors,
  type KlobucharCoefficients,
  klobucharDelayM,
  klobucharDelayS,
  klobucharVerticalM,
  L1_HZ,
  L2_HZ,
  L5_HZ,
  modifiedMapping,
  piercePoint,
  rotiOf,
  SPEED_OF_LIGHT,
  shorteningPpmPerTecu,
  thinShellMapping,
  wavelengthM,
} from '../../src/ionosphere/index.js';
import { leastSquares } from '../../src/stats/index.js';

/*
 * Numbers of this file come from independent computations in double precision with the published formulas, where no
 * other source is named.
 */
const near = (value: number, expected: number, tolerance: number): void =>
  expect(Math.abs(value - expected), `${value} for ${expected}`).toBeLessThanOrEqual(tolerance);

describe('delays', () => {
  it('of one TECU are 40.3e16/f²', () => {
    near(delayPerTecuM(L1_HZ), 0.162372447512, 1e-11);
    near(delayPerTecuM(L2_HZ), 0.267418400361, 1e-11);
    near(delayPerTecuM(L5_HZ), 0.29117769113, 1e-11);
  });

  it('differ between carriers', () => {
    near(geometryFreePerTecuM(L1_HZ, L2_HZ), 0.105045952849, 1e-11);
    near(1 / geometryFreePerTecuM(L1_HZ, L2_HZ), 9.5196432883, 1e-9);
    near(1 / geometryFreePerTecuM(L1_HZ, L5_HZ), 7.7636590865, 1e-9);
    near((SPEED_OF_LIGHT * 1e-9) / geometryFreePerTecuM(L1_HZ, L2_HZ), 2.8539172607, 1e-9);
    near(wavelengthM(L1_HZ) / delayPerTecuM(L1_HZ), 1.1719579012, 1e-9);
    near(frequencyRatioSquared(L1_HZ, L2_HZ), (77 / 60) ** 2, 1e-12);
  });

  it('leave the ionosphere-free combination', () => {
    const { first, second } = ionosphereFreeFactors(L1_HZ, L2_HZ);
    near(first, 2.5457277802, 1e-9);
    near(second, 1.5457277802, 1e-9);
    near(first * delayPerTecuM(L1_HZ) - second * delayPerTecuM(L2_HZ), 0, 1e-12);
  });

  it('have the wave lengths of the carriers', () => {
    near(wavelengthM(L1_HZ), 0.190293672798, 1e-12);
    near(wavelengthM(L2_HZ), 0.244210213425, 1e-12);
    near(wavelengthM(L5_HZ), 0.254828048791, 1e-12);
    near(SPEED_OF_LIGHT / (L1_HZ - L2_HZ), 0.861918400322, 1e-12);
    near(SPEED_OF_LIGHT / (L1_HZ + L2_HZ), 0.106953378142, 1e-12);
  });

  it('grow over a baseline by mm per km, that is ppm', () => {
    near(gradientPpm(0.01), 1.62372447512, 1e-10);
    near(gradientPpm(0.01, 2, L2_HZ), 2 * 2.67418400361, 1e-9);
  });
});

describe('the thin shell', () => {
  it.each([
    [90, 1, 1, 1],
    [60, 1.13566, 1.130902, 1.122317],
    [45, 1.347518, 1.331799, 1.306717],
    [30, 1.75121, 1.700801, 1.636004],
    [20, 2.200323, 2.086754, 1.970873],
    [15, 2.487351, 2.318487, 2.170632],
    [10, 2.78927, 2.549069, 2.373785],
    [5, 3.039178, 2.729552, 2.547117],
  ])('maps %d degrees', (elevation, at350, at450, modified) => {
    near(thinShellMapping(elevation, 350), at350, 1e-6);
    near(thinShellMapping(elevation), at450, 1e-6);
    near(modifiedMapping(elevation), modified, 1e-6);
  });

  // tests of a space-dynamics library, to two decimals
  it.each([
    [20, 2.09],
    [15, 2.32],
    [10, 2.55],
    [5, 2.73],
  ])('maps %d degrees as others do', (elevation, mapping) => {
    near(thinShellMapping(elevation), mapping, 0.01);
  });

  it.each([
    [40, -100, 210, 20, 450, 8.634027183, 32.405631301, -105.100681853],
    [40, -100, 210, 20, 350, 7.031401218, 33.830828464, -104.225504732],
    [52, 5, 135, 30, 450, 6.012246413, 47.567992166, 11.302027139],
  ])(
    'is pierced from %d, %d',
    (latitudeDeg, longitudeDeg, azimuthDeg, elevationDeg, height, psi, latitude, longitude) => {
      const point = piercePoint({ latitudeDeg, longitudeDeg, azimuthDeg, elevationDeg }, height);
      near(point.centralAngleDeg, psi, 1e-8);
      near(point.latitudeDeg, latitude, 1e-8);
      near(point.longitudeDeg, longitude, 1e-8);
    },
  );

  it('is pierced over the receiver at the zenith, and on the way of a great circle', () => {
    const angle = fc.double({ min: -89, max: 89, noNaN: true });
    const turn = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(angle, turn, turn, (latitudeDeg, longitudeDeg, azimuthDeg) => {
        const zenith = piercePoint({ latitudeDeg, longitudeDeg, azimuthDeg, elevationDeg: 90 });
        near(zenith.latitudeDeg, latitudeDeg, 1e-6);
        const point = piercePoint({ latitudeDeg, longitudeDeg, azimuthDeg, elevationDeg: 10 });
        const [a, b, d] = [latitudeDeg, point.latitudeDeg, point.longitudeDeg - longitudeDeg].map(
          (x) => (x * Math.PI) / 180,
        ) as [number, number, number];
        const cosine = Math.sin(a) * Math.sin(b) + Math.cos(a) * Math.cos(b) * Math.cos(d);
        near(cosine, Math.cos((point.centralAngleDeg * Math.PI) / 180), 1e-9);
        expect(Math.abs(point.longitudeDeg)).toBeLessThanOrEqual(180);
      }),
      { seed: 11 },
    );
  });
});

/**
 * The same number by brute force: a 10 km baseline, satellites on a grid that covers the sky evenly, their elevations at
 * both ends from three-dimensional vectors, and least squares for east, north, up and the clock.
 */
function simulatedPpm(maskDeg: number, shellHeightKm: number): { north: number; east: number; up: number } {
  const [earth, orbit, length] = [6371, 26_560, 10];
  const columns = [0, 1, 2, 3].map((): number[] => []);
  const observed: number[] = [];
  const turn = length / earth;
  const base = [0, 0, earth];
  const rover = [0, earth * Math.sin(turn), earth * Math.cos(turn)];
  const middle = [0, earth * Math.sin(turn / 2), earth * Math.cos(turn / 2)];
  const sine = (from: readonly number[], satellite: readonly number[]): number => {
    const ray = satellite.map((x, k) => x - from[k]!);
    const dot = ray.reduce((total, x, k) => total + x * from[k]!, 0);
    return dot / Math.hypot(...ray) / Math.hypot(...from);
  };
  const low = Math.sin((maskDeg * Math.PI) / 180);
  const [bands, sectors] = [400, 48];
  for (let i = 0; i < bands; i++)
    for (let k = 0; k < sectors; k++) {
      // equal steps of the sine of the elevation are equal areas of the sky
      const up = low + ((i + 0.5) / bands) * (1 - low);
      const azimuth = (2 * Math.PI * (k + 0.5)) / sectors;
      const flat = Math.sqrt(1 - up * up);
      const [east, north] = [flat * Math.sin(azimuth), flat * Math.cos(azimuth)];
      const rotated = [
        east,
        north * Math.cos(turn / 2) + up * Math.sin(turn / 2),
        up * Math.cos(turn / 2) - north * Math.sin(turn / 2),
      ];
      const along = middle.reduce((total, x, j) => total + x * rotated[j]!, 0);
      const range = -along + Math.sqrt(along ** 2 + orbit ** 2 - earth ** 2);
      const satellite = middle.map((x, j) => x + range * rotated[j]!);
      const slant = (from: readonly number[]): number =>
        thinShellMapping((Math.asin(sine(from, satellite)) * 180) / Math.PI, shellHeightKm);
      // the phase is advanced: a range measured too short
      observed.push(-delayPerTecuM(L1_HZ) * (slant(rover) - slant(base)));
      for (const [j, x] of [-east, -north, -up, 1].entries()) columns[j]!.push(x);
    }
  const { coefficients } = leastSquares(
    columns.map((column) => Float64Array.from(column)),
    Float64Array.from(observed),
  );
  const ppm = (metres: number): number => (metres / (1000 * length)) * 1e6;
  return { east: ppm(coefficients[0]!), north: ppm(coefficients[1]!), up: ppm(coefficients[2]!) };
}

describe('the shortening of a baseline', () => {
  // simulation by an independent script: 10 km, even sky, ambiguities fixed, clock estimated
  it.each([
    [5, -0.0738, -0.0611],
    [10, -0.0734, -0.0622],
    [15, -0.069, -0.0601],
    [20, -0.0632, -0.0564],
    [25, -0.0574, -0.0522],
  ])('above %d degrees', (maskDeg, at350, at450) => {
    near(shorteningPpmPerTecu({ maskDeg, shellHeightKm: 350 }), at350, 1e-4);
    near(shorteningPpmPerTecu({ maskDeg }), at450, 1e-4);
  });

  it('is what least squares over a sky full of satellites give, and nothing goes into height or across', () => {
    const simulated = simulatedPpm(15, 350);
    near(simulated.north, shorteningPpmPerTecu({ shellHeightKm: 350 }), 2e-5);
    near(simulated.up, 0, 2e-4);
    near(simulated.east, 0, 1e-9);
  });

  it('goes with the square of the wave length', () => {
    const l2 = shorteningPpmPerTecu({ shellHeightKm: 350, frequencyHz: L2_HZ });
    near(l2, -0.1137, 1e-4);
    near(l2 / shorteningPpmPerTecu({ shellHeightKm: 350 }), 1.64694, 1e-5);
  });

  it('is about 2 ppm in 30 TECU', () => {
    near(expectedShorteningPpm(30, { shellHeightKm: 350 }), -2.07, 0.01);
    // Beutler et al. 1988, from memory: about -0.7 ppm in 10 TECU
    near(expectedShorteningPpm(10, { shellHeightKm: 350 }), -0.7, 0.05);
  });

  it.each([{ maskDeg: -1 }, { maskDeg: 90 }, { shellHeightKm: 0 }, { frequencyHz: Number.NaN }])(
    'refuses %j',
    (options) => {
      expect(() => shorteningPpmPerTecu(options)).toThrow(RangeError);
    },
  );
});

describe('the broadcast model', () => {
  const first: KlobucharCoefficients = {
    alpha: [0.382e-7, 0.149e-7, -0.179e-6, 0],
    beta: [0.143e6, 0, -0.328e6, 0.113e6],
  };

  it('gives the worked example of a space-dynamics library, 23.784 m', () => {
    const input = {
      latitudeDeg: 40,
      longitudeDeg: -100,
      azimuthDeg: 210,
      elevationDeg: 20,
      secondOfDay: 74_700,
    };
    near(klobucharDelayM(input, first), 23.784, 1e-3);
    near(klobucharDelayM(input, first), 23.78414759, 1e-7);
    near(klobucharDelayS(input, first), 7.93353767e-8, 1e-15);
  });

  it('gives a second example, computed step by step', () => {
    const input = {
      latitudeDeg: 47.1888,
      longitudeDeg: 18.4188,
      azimuthDeg: 191.1257,
      elevationDeg: 78.2541,
      secondOfDay: 49_331.21456,
    };
    const second: KlobucharCoefficients = {
      alpha: [1.49e-8, 2.24e-8, -1.19e-7, -1.19e-7],
      beta: [1.17e5, 1.8e5, -1.31e5, -4.95e5],
    };
    near(klobucharDelayS(input, second), 1.55537937e-8, 1e-16);
    near(klobucharDelayM(input, second), 4.66291004, 1e-7);
  });

  it('is 5 ns at night, greatest at 14 local time, and the same a day later', () => {
    const at = (hour: number): number => klobucharVerticalM(45, 15, (hour - 1) * 3600, first);
    near(at(2), 5e-9 * SPEED_OF_LIGHT, 1e-9);
    const hours = Array.from({ length: 97 }, (_, k) => k / 4);
    expect(hours.reduce((best, hour) => (at(hour) > at(best) ? hour : best))).toBe(14);
    near(at(10), at(34), 1e-9);
  });
});

describe('rotiOf', () => {
  const times = Array.from({ length: 11 }, (_, k) => 30_000 * k);

  it('is the population deviation of the rates by hand', () => {
    // steps of 0.1 and 0.3 TECU in turn: rates of 0.2 and 0.6 TECU/min
    const tec = times.map((_, k) => 0.2 * k + (k % 2 === 1 ? -0.1 : 0));
    const [only, ...rest] = rotiOf(times, tec);
    expect(rest).toEqual([]);
    expect(only).toMatchObject({ startMs: 0, endMs: 300_000, rates: 10 });
    near(only!.roti, 0.2, 1e-12);
  });

  it('does not see a bias, a steady trend or a gap', () => {
    const tec = times.map((_, k) => 5 + 0.7 * k);
    near(rotiOf(times, tec)[0]!.roti, 0, 1e-12);
    tec[4] = Number.NaN;
    expect(rotiOf(times, tec)[0]!.rates).toBe(8);
    expect(rotiOf([0, 60_000, 120_000], [0, 1, 5])).toEqual([]);
  });

  it('refuses lists of different lengths', () => {
    expect(() => rotiOf([0, 1], [0])).toThrow(RangeError);
  });
});
