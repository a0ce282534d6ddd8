import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { projection } from '../../src/geodesy/index.js';
import { file, recognized } from './heads.js';

/*
 * Points on a known projection, listed without a header in one of two orders and three units. The order may be asked for;
 * when it is decided it is the right one, and feet are never read as metres unless both may be meant.
 */

const PROJECTIONS = [
  { system: '+proj=utm +zone=33 +ellps=WGS84', longitudeDeg: 15, latitudes: [0, 80] },
  { system: '+proj=utm +zone=19 +south +ellps=WGS84', longitudeDeg: -69, latitudes: [-80, 0] },
  {
    system: '+proj=lcc +lat_1=37 +lat_2=38.5 +lat_0=36.5 +lon_0=-120.5 +x_0=2000000 +y_0=500000 +ellps=GRS80',
    longitudeDeg: -120.5,
    latitudes: [35, 39],
  },
  {
    system: '+proj=tmerc +lat_0=0 +lon_0=9 +k=1 +x_0=3500000 +y_0=0 +ellps=bessel',
    longitudeDeg: 9,
    latitudes: [45, 56],
  },
] as const;
const UNITS = { metre: 1, foot: 0.3048 } as const;

const drawn = fc.record({
  where: fc.constantFrom(...PROJECTIONS),
  share: fc.double({ min: 0, max: 1, noNaN: true }),
  offsetDeg: fc.double({ min: -2.5, max: 2.5, noNaN: true }),
  northingFirst: fc.boolean(),
  unit: fc.constantFrom('metre', 'foot'),
});

describe('the order of plane coordinates', () => {
  it('is right wherever it is decided', () => {
    const tally = { decided: 0, asked: 0, feetFound: 0 };
    fc.assert(
      fc.property(drawn, ({ where, share, offsetDeg, northingFirst, unit }) => {
        const [south, north] = where.latitudes;
        const latitudeDeg = south + share * (north - south);
        const plane = projection(where.system).forward({
          latitudeDeg,
          longitudeDeg: where.longitudeDeg + offsetDeg,
        });
        const easting = (plane.eastingM / UNITS[unit]).toFixed(3);
        const northing = (plane.northingM / UNITS[unit]).toFixed(3);
        const pair = northingFirst ? [northing, easting] : [easting, northing];
        const found = recognized(file(`1,${pair.join()},35.120,CHK`), { coordinates: where.system });
        const codes = found.unsure.map(({ code }) => code);
        if (found.layout.kind !== 'delimited') throw new Error('expected delimited text');
        if (codes.includes('northing-easting-order')) tally.asked += 1;
        else {
          tally.decided += 1;
          expect(found.layout.columns, pair.join()).toMatchObject(
            northingFirst ? { northing: 2, easting: 3 } : { easting: 2, northing: 3 },
          );
          if (unit === 'metre') expect(codes).not.toContain('which-foot');
        }
        if (unit === 'foot') {
          expect(codes.includes('which-foot') || codes.includes('length-unit'), pair.join()).toBe(true);
          if (codes.includes('which-foot')) tally.feetFound += 1;
        }
      }),
      { seed: 3, numRuns: 600 },
    );
    expect(tally.decided).toBeGreaterThan(200);
    expect(tally.asked).toBeLessThan(150);
    expect(tally.feetFound).toBeGreaterThan(150);
  });
});
