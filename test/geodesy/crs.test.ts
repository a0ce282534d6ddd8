import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { epsgRows } from '../../src/geodesy/crs/epsgRows.js';
import { crsDefinition, crsOfKind } from '../../src/geodesy/crs/index.js';
import { likelyCodes } from '../../src/geodesy/crs/likelyCodes.js';
import { GRS80 } from '../../src/geodesy/ellipsoid.js';
import { metresPer } from '../../src/geodesy/lengthUnits.js';
import { projection } from '../../src/geodesy/projection.js';

describe('EPSG codes', () => {
  const rows = readFileSync(new URL('../fixtures/epsg/codes.csv', import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(',').map(Number) as [number, number, number, number, number]);
  it('has 47 codes to compare', () => expect(rows).toHaveLength(47));
  it.each(rows)(
    'EPSG:%d agrees with PROJ and its copy of the register to 0.01 mm, both ways',
    (code, latitudeDeg, longitudeDeg, easting, northing) => {
      const crs = crsOfKind(code, 'projected');
      const math = projection(crs.code);
      const unitM = crs.unit === 'degree' ? Number.NaN : metresPer(crs.unit);
      const plane = math.forward({ latitudeDeg, longitudeDeg });
      expect(Math.hypot(plane.eastingM - easting * unitM, plane.northingM - northing * unitM)).toBeLessThan(
        1e-5,
      );
      const back = math.inverse({ eastingM: easting * unitM, northingM: northing * unitM });
      // 1e-10° is 0.01 mm
      expect(Math.abs(back.latitudeDeg - latitudeDeg)).toBeLessThan(1e-10);
      expect(Math.abs(back.longitudeDeg - longitudeDeg)).toBeLessThan(2e-10);
    },
  );
  it.each([
    // kind, frame and unit as in the register
    [4326, 'geographic', 'WGS 84', 'degree'],
    [4979, 'geographic', 'WGS 84', 'degree'],
    [4978, 'geocentric', 'WGS 84', 'metre'],
    [7789, 'geocentric', 'ITRF2014', 'metre'],
    [4258, 'geographic', 'ETRS89', 'degree'],
    [7844, 'geographic', 'GDA2020', 'degree'],
    [6318, 'geographic', 'NAD83(2011)', 'degree'],
    [28356, 'projected', 'GDA94', 'metre'],
    [31985, 'projected', 'SIRGAS 2000', 'metre'],
    [2263, 'projected', 'NAD83', 'us-survey-foot'],
    [6543, 'projected', 'NAD83(2011)', 'us-survey-foot'],
    [6499, 'projected', 'NAD83(2011)', 'international-foot'],
    [2222, 'projected', 'NAD83', 'international-foot'],
  ])('EPSG:%d is %s on %s in %s', (code, kind, frame, unit) => {
    expect(crsDefinition(code)).toMatchObject({ code: `EPSG:${code}`, kind, frame, unit, note: null });
  });
  it('takes a code with or without its prefix', () => {
    expect(crsDefinition('epsg:25832 ')).toEqual(crsDefinition(25832));
    expect(crsDefinition(25832)).toEqual({
      code: 'EPSG:25832',
      name: 'ETRS89 / UTM zone 32N',
      kind: 'projected',
      frame: 'ETRS89',
      ellipsoid: { ...GRS80, name: 'GRS80' },
      unit: 'metre',
      axes: 'enu',
      projString: '+proj=utm +zone=32 +ellps=GRS80',
      originShiftM: 0,
      note: null,
    });
  });
  it('tells of frames with another origin, of turned axes and of the sphere', () => {
    // shifts of the register's transformations: 734 m for Amersfoort, 326 m for GGRS87, on an ellipsoid of the satellite age
    expect(crsDefinition(28992).note).toBe(
      'Coordinates on Amersfoort (its origin is about 734 m from that of WGS 84) are not satellite coordinates: state the transformation that leads to them.',
    );
    expect(crsDefinition(2100)).toMatchObject({ originShiftM: 326, note: expect.stringMatching(/326 m/) });
    for (const code of [27700, 26741, 4267, 31467, 23032, 28992, 4277, 21781])
      expect(crsDefinition(code).note, String(code)).toMatch(/are not satellite coordinates/);
    expect(crsDefinition(2048)).toMatchObject({ axes: 'wsu', note: expect.stringMatching(/turn the signs/) });
    expect(crsDefinition(3857).note).toMatch(/neither its distances nor its angles are true/);
  });
  it('knows the ellipsoid of each frame', () => {
    // semi-major axis and inverse flattening of the register
    for (const [code, a, inverseFlattening] of [
      [4326, 6378137, 298.257223563],
      [4277, 6377563.396, 299.3249646],
      [4289, 6377397.155, 299.1528128],
      [4267, 6378206.4, 294.978698213898],
      [4230, 6378388, 297],
      [4284, 6378245, 298.3],
      [4322, 6378135, 298.26],
    ] as const) {
      const { ellipsoid } = crsDefinition(code);
      expect(ellipsoid.semiMajorAxisM).toBe(a);
      expect(ellipsoid.inverseFlattening).toBeCloseTo(inverseFlattening, 7);
      const { projString } = crsDefinition(code);
      expect(projection(projString.replace('longlat', 'merc')).ellipsoid.semiMajorAxisM).toBe(a);
    }
    expect(projection('EPSG:3857').ellipsoid.inverseFlattening).toBe(Number.POSITIVE_INFINITY);
  });
  it('never asks for a change of frame', () => {
    for (const { code } of epsgRows().values())
      expect(crsDefinition(code).projString).not.toMatch(/towgs84|nadgrids|geoidgrids|datum/);
  });
  it('can project every plane code, and comes back', () => {
    const definitions = new Set(
      [...epsgRows().values()]
        .filter(({ kind }) => kind === 'projected')
        .map(({ code }) => crsDefinition(code).projString),
    );
    expect(definitions.size).toBeGreaterThan(2500);
    for (const definition of definitions) {
      const value = (key: string) =>
        Number(new RegExp(`\\+${key}=(\\S+)`).exec(definition)?.[1] ?? Number.NaN);
      const [latitude, meridian] = [
        value('lat_0') || value('lat_1') || value('lat_ts') || 45,
        value('lon_0'),
      ];
      const place = {
        latitudeDeg: Math.abs(latitude) > 80 ? Math.sign(latitude) * 80 : latitude,
        longitudeDeg: [meridian, value('lonc'), 6 * value('zone') - 183].find(Number.isFinite)! + 0.5,
      };
      // another prime meridian moves the place away from the middle, not out of reach
      if (definition.includes('+pm=')) place.longitudeDeg += definition.includes('+pm=ferro') ? -17.7 : 0;
      const math = projection(definition);
      const plane = math.forward(place);
      const again = math.forward(math.inverse(plane));
      expect(
        Math.hypot(again.eastingM - plane.eastingM, again.northingM - plane.northingM),
        definition,
      ).toBeLessThan(1e-6);
    }
  });
  it('says which codes may be meant', () => {
    expect(() => crsDefinition(25823)).toThrow(
      new Error(
        `EPSG:25823 is not among the ${epsgRows().size} known codes; near it are EPSG:25832 (ETRS89 / UTM zone 32N), EPSG:25828 (ETRS89 / UTM zone 28N), EPSG:25829 (ETRS89 / UTM zone 29N); a proj string can be given instead`,
      ),
    );
    expect(() => crsDefinition('EPSG:31')).toThrow('"EPSG:31" is not an EPSG code');
    expect(() => crsDefinition('+proj=utm')).toThrow('"+proj=utm" is not an EPSG code');
  });
  it('offers the code meant by two exchanged digits first, if no other can be', () => {
    const known = [...epsgRows().values()];
    const exchanged = (digits: string, i: number) =>
      digits.slice(0, i) + digits[i + 1] + digits[i] + digits.slice(i + 2);
    fc.assert(
      fc.property(fc.constantFrom(...known), fc.integer({ min: 0, max: 2 }), ({ code }, i) => {
        const typed = exchanged(String(code), i);
        fc.pre(Number(typed) !== code && Number(typed) >= 1000 && !epsgRows().has(Number(typed)));
        const meant = [0, 1, 2, 3]
          .map((k) => exchanged(typed, k))
          .filter((other) => epsgRows().has(Number(other)));
        const [first] = likelyCodes(Number(typed), known);
        expect(meant).toContain(String(first!.code));
      }),
      { seed: 16 },
    );
  });
  it('refuses degrees where a plane is needed, and the other way round', () => {
    expect(() => crsOfKind('EPSG:4258', 'projected')).toThrow(
      new Error(
        'EPSG:4258 (ETRS89) stands for latitudes and longitudes in degrees; expected a code for eastings and northings of a map projection',
      ),
    );
    expect(() => crsOfKind(25832, 'geographic')).toThrow(
      'EPSG:25832 (ETRS89 / UTM zone 32N) stands for eastings and northings of a map projection; expected a code for latitudes and longitudes in degrees',
    );
    expect(() => crsOfKind(4978, 'geographic')).toThrow(/stands for geocentric x, y, z in metres/);
  });
});
