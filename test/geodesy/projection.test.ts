import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { GRS80, meridianRadiusM, primeVerticalRadiusM } from '../../src/geodesy/ellipsoid.js';
import { metresPer } from '../../src/geodesy/lengthUnits.js';
import { projection } from '../../src/geodesy/projection.js';

const dms = (d: number, m: number, s: number) => d + m / 60 + s / 3600;
const at = (latitudeDeg: number, longitudeDeg: number) => ({ latitudeDeg, longitudeDeg });

describe('GDA Technical Manual: MGA94', () => {
  const zone55 = projection('+proj=utm +zone=55 +south +ellps=GRS80');
  const flinders = at(-dms(37, 57, 3.7203), dms(144, 25, 29.5244));
  const buninyong = at(-dms(37, 39, 10.1561), dms(143, 55, 35.3839));
  it.each([
    ['Flinders Peak, zone 55', zone55, flinders, 273741.2966, 5796489.7769],
    ['Buninyong, zone 55', zone55, buninyong, 228854.0513, 5828259.0384],
    [
      'Buninyong, zone 54',
      projection('+proj=utm +zone=54 +south +ellps=GRS80'),
      buninyong,
      758173.7973,
      5828674.3402,
    ],
  ])('%s, both ways', (_, zone, place, east, north) => {
    const plane = zone.forward(place);
    // the manual prints 0.1 mm
    expect(plane.eastingM).toBeCloseTo(east, 3.9);
    expect(plane.northingM).toBeCloseTo(north, 3.9);
    const back = zone.inverse({ eastingM: east, northingM: north });
    // 1e-9° is 0.1 mm
    expect(Math.abs(back.latitudeDeg - place.latitudeDeg)).toBeLessThan(1.5e-9);
    expect(Math.abs(back.longitudeDeg - place.longitudeDeg)).toBeLessThan(1.5e-9);
  });
  it.each([
    ['Flinders Peak', flinders, 1.00023056, -dms(1, 35, 3.65)],
    ['Buninyong', buninyong, 1.00050567, -dms(1, 52, 43.22)],
  ])(
    'point scale and convergence at %s, by differences along the meridian',
    (_, place, scale, convergence) => {
      const step = 0.001;
      const a = zone55.forward(at(place.latitudeDeg - step, place.longitudeDeg));
      const b = zone55.forward(at(place.latitudeDeg + step, place.longitudeDeg));
      const east = b.eastingM - a.eastingM;
      const north = b.northingM - a.northingM;
      const ground = (meridianRadiusM(place.latitudeDeg, GRS80) * 2 * step * Math.PI) / 180;
      expect(Math.hypot(east, north) / ground).toBeCloseTo(scale, 8);
      // the manual prints 0.01″
      const error = (Math.atan2(east, north) * 180) / Math.PI - convergence;
      expect(Math.abs(error) * 3600).toBeLessThan(0.006);
    },
  );
  it('plane distance and grid bearing between them', () => {
    const a = zone55.forward(flinders);
    const b = zone55.forward(buninyong);
    const east = b.eastingM - a.eastingM;
    const north = b.northingM - a.northingM;
    expect(Math.hypot(east, north)).toBeCloseTo(54992.279, 3);
    // The manual's grid bearings, 305 17 01.7259 and 125 17 41.8518, are those of the projected geodesic; the straight
    // line of the plane differs by the arc-to-chord correction, here to second order (good to 0.05″ over this line).
    const bearing = (Math.atan2(east, north) * 180) / Math.PI + 360;
    const radius2 = meridianRadiusM(-37.8, GRS80) * primeVerticalRadiusM(-37.8, GRS80) * 0.9996 ** 2;
    const [e1, e2] = [a.eastingM - 500_000, b.eastingM - 500_000];
    const correction = (nearer: number, other: number) =>
      (((-north * (2 * nearer + other)) / (6 * radius2)) * 180) / Math.PI;
    expect(Math.abs(bearing - correction(e1, e2) - dms(305, 17, 1.7259)) * 3600).toBeLessThan(0.05);
    expect(Math.abs(bearing - 180 + correction(e2, e1) - dms(125, 17, 41.8518)) * 3600).toBeLessThan(0.05);
  });
});

describe('EPSG guidance note 7-2', () => {
  it('transverse Mercator, British National Grid on Airy 1830', () => {
    // k printed as 0.9996013 is rounded; 0.9996012717 is the defined value
    const grid = projection(
      '+proj=tmerc +lat_0=49 +lon_0=-2 +k=0.9996012717 +x_0=400000 +y_0=-100000 +ellps=airy',
    );
    const plane = grid.forward(at(50.5, 0.5));
    expect(Math.abs(plane.eastingM - 577274.99)).toBeLessThan(0.01);
    expect(Math.abs(plane.northingM - 69740.5)).toBeLessThan(0.01);
  });
  it('Lambert conic conformal, two parallels, in US survey feet: metres come out', () => {
    const texas = projection(
      `+proj=lcc +lat_1=${dms(28, 23, 0)} +lat_2=${dms(30, 17, 0)} +lat_0=${dms(27, 50, 0)} +lon_0=-99 +x_0=${
        2_000_000 * metresPer('us-survey-foot')
      } +y_0=0 +ellps=clrk66 +units=us-ft`,
    );
    const plane = texas.forward(at(28.5, -96));
    expect(Math.abs(plane.eastingM / metresPer('us-survey-foot') - 2963503.91)).toBeLessThan(0.01);
    expect(Math.abs(plane.northingM / metresPer('us-survey-foot') - 254759.8)).toBeLessThan(0.01);
    const back = texas.inverse(plane);
    expect(back.latitudeDeg).toBeCloseTo(28.5, 10);
    expect(back.longitudeDeg).toBeCloseTo(-96, 10);
  });
  it('Lambert conic conformal, one parallel, Jamaica', () => {
    const jamaica = projection(
      '+proj=lcc +lat_1=18 +lat_0=18 +lon_0=-77 +k_0=1 +x_0=250000 +y_0=150000 +ellps=clrk66',
    );
    const plane = jamaica.forward(at(dms(17, 55, 55.8), -dms(76, 56, 37.26)));
    expect(Math.abs(plane.eastingM - 255966.58)).toBeLessThan(0.01);
    expect(Math.abs(plane.northingM - 142493.51)).toBeLessThan(0.01);
  });
});

describe('GIGS 5101, UTM 31N (tolerance 3 cm)', () => {
  it.each([
    [80, 403186.945, 8885748.708],
    [60, 221288.77, 6661953.041],
    [40, 73106.698, 4439746.917],
    [0, -57087.12, 0],
  ])('latitude %d, longitude -2', (latitude, east, north) => {
    for (const definition of ['+proj=utm +zone=31 +datum=WGS84', 'EPSG:32631']) {
      const plane = projection(definition).forward(at(latitude, -2));
      expect(Math.hypot(plane.eastingM - east, plane.northingM - north)).toBeLessThan(0.03);
    }
  });
});

describe('PROJ', () => {
  it('agrees to 0.01 mm, both ways', () => {
    const rows = readFileSync(new URL('../fixtures/proj/projections.csv', import.meta.url), 'utf8')
      .trim()
      .split('\n')
      .slice(1);
    expect(rows).toHaveLength(20);
    for (const row of rows) {
      const [definition = '', ...numbers] = row.split(',');
      const [lat, lon, east, north] = numbers.map(Number) as [number, number, number, number];
      const math = projection(definition);
      const plane = math.forward(at(lat, lon));
      expect(Math.hypot(plane.eastingM - east, plane.northingM - north), row).toBeLessThan(1e-5);
      const back = math.inverse({ eastingM: east, northingM: north });
      // 1e-10° is 0.01 mm
      expect(Math.abs(back.latitudeDeg - lat), row).toBeLessThan(1e-10);
      expect(Math.abs(back.longitudeDeg - lon) * Math.cos((lat * Math.PI) / 180), row).toBeLessThan(1e-10);
    }
  });
});

describe('what a definition may and may not say', () => {
  const plain = projection('+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel').forward(at(48, 9.5));
  it.each([
    [
      '+towgs84',
      '+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel +towgs84=598,73,418,0.2,0.05,-2.5,6.7 +no_defs',
    ],
    ['+datum', '+proj=tmerc +lat_0=0 +lon_0=9 +datum=potsdam +type=crs'],
    ['+nadgrids', '+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel +nadgrids=absent.gsb'],
    ['+units', '+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel +units=km'],
    ['+to_meter', '+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel +to_meter=0.3048'],
    ['+axis', '+proj=tmerc +lat_0=0 +lon_0=9 +ellps=bessel +axis=wsu'],
    ['blanks', '  +proj=tmerc   +lat_0=0 +lon_0=9 +a=6377397.155 +rf=299.1528128 '],
  ])('%s changes nothing', (_, definition) => {
    const plane = projection(definition).forward(at(48, 9.5));
    expect(plane.eastingM).toBeCloseTo(plain.eastingM, 6);
    expect(plane.northingM).toBeCloseTo(plain.northingM, 6);
  });
  it('counts longitudes from Greenwich also with another prime meridian', () => {
    // Paris: 2°20′14.025″ E of Greenwich
    const paris = projection('+proj=tmerc +lat_0=0 +lon_0=0 +ellps=WGS84 +pm=paris');
    const plane = paris.forward(at(48, dms(2, 20, 14.025)));
    expect(plane.eastingM).toBeCloseTo(0, 4);
    expect(paris.inverse({ eastingM: 0, northingM: plane.northingM }).longitudeDeg).toBeCloseTo(
      dms(2, 20, 14.025),
      9,
    );
  });
  it.each([
    ['', '"" is not an EPSG code; expected a number of four or five digits, e.g. EPSG:25832'],
    [
      'EPSG:999999',
      '"EPSG:999999" is not an EPSG code; expected a number of four or five digits, e.g. EPSG:25832',
    ],
    [
      'EPSG:4326',
      'EPSG:4326 (WGS 84) stands for latitudes and longitudes in degrees; expected a code for eastings and northings of a map projection',
    ],
    ['+proj=longlat +ellps=WGS84', '+proj=longlat is not a map projection'],
    ['+proj=latlong', '+proj=latlong is not a map projection'],
    ['+proj=geocent +ellps=WGS84', '+proj=geocent is not a map projection'],
    ['+ellps=WGS84 +zone=31', '+proj is missing'],
    ['+proj=nonsense', '+proj=nonsense is not known'],
    ['+proj=pipeline +step', '+step is not supported'],
    ['+proj=utm +zone=31 +ellps=nonsense', '+ellps=nonsense: no ellipsoid of this name is known'],
    ['+proj=utm +zone=31 +datum=nonsense', '+datum=nonsense: no datum of this name is known'],
    ['+proj=utm +zone=31 +units=cubit', '+units=cubit: no unit of this name is known'],
    ['+proj=utm +zone=31 +pm=atlantis', '+pm=atlantis: no prime meridian of this name is known'],
    ['+proj=utm +zone=61', '+zone=61 is not a zone from 1 to 60'],
    ['+proj=utm +zone=abc', '+zone=abc is not a decimal number'],
    ['+proj=tmerc +lon_0=9d30', '+lon_0=9d30 is not a decimal number'],
    ['+proj=tmerc +lat_0=', '+lat_0= is not a decimal number'],
    ['+proj=tmerc +f=0.0033', '+f=0.0033 is not supported'],
    ['+proj=utm zone=31', '"zone=31" is not a parameter'],
  ])('refuses "%s"', (definition, reason) => {
    expect(() => projection(definition)).toThrow(
      new Error(
        `projection "${definition}": ${reason}; expected a proj string of a map projection, e.g. "+proj=utm +zone=31 +ellps=WGS84"`,
      ),
    );
  });
  it('refuses places it cannot project', () => {
    const utm = projection('EPSG:32631');
    expect(() => utm.forward(at(95, 3))).toThrow(
      new RangeError('latitudeDeg: expected -90 to 90, received 95'),
    );
    expect(() => utm.forward(at(50, Number.NaN))).toThrow(RangeError);
    expect(() => projection('+proj=gnom +lat_0=0 +lon_0=0 +ellps=WGS84').forward(at(57, 115))).toThrow(
      /^latitude 57, longitude 115 cannot/,
    );
    // beyond the equator of an equal-area disc there is nothing
    expect(() =>
      projection('+proj=laea +lat_0=90 +lon_0=0 +ellps=WGS84').inverse({ eastingM: 1.4e7, northingM: 0 }),
    ).toThrow(/^easting 14000000, northing 0 cannot/);
    expect(() => utm.inverse({ eastingM: Number.NaN, northingM: 0 })).toThrow(/outside its reach/);
    expect(() =>
      projection('+proj=lcc +lat_1=30 +lat_2=40 +lat_0=35 +lon_0=0 +ellps=WGS84').forward(at(-90, 0)),
    ).toThrow(/^latitude -90, longitude 0 cannot be computed with the projection "\+proj=lcc/);
  });
  it('comes back, also by a longitude of another turn', () => {
    const utm = projection('+proj=utm +zone=60 +ellps=WGS84');
    const latitude = fc.double({ min: -80, max: 84, noNaN: true });
    const longitude = fc.double({ min: 172, max: 182, noNaN: true });
    fc.assert(
      fc.property(latitude, longitude, (lat, lon) => {
        const plane = utm.forward(at(lat, lon));
        const back = utm.inverse(plane);
        expect(back.latitudeDeg).toBeCloseTo(lat, 9);
        expect(back.longitudeDeg).toBeGreaterThan(-180);
        expect(back.longitudeDeg).toBeLessThanOrEqual(180);
        expect(Math.cos(((back.longitudeDeg - lon) * Math.PI) / 180)).toBeCloseTo(1, 12);
        const turned = utm.forward(at(lat, lon - 360));
        expect(turned.eastingM).toBeCloseTo(plane.eastingM, 6);
      }),
      { seed: 15 },
    );
  });
});
