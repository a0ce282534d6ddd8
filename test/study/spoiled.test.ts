import { beforeAll, describe, expect, it } from 'vitest';
import {
  type Geodetic,
  geocentricToGeodetic,
  geodeticToGeocentric,
  groundGrid,
  localFrame,
  metresPer,
  projection,
} from '../../src/geodesy/index.js';
import { testFolder } from '../files.js';
import {
  BASE,
  MARK_PLACES,
  type PlaneRow,
  planeRows,
  runParts,
  runWhole,
  type SpoiledRun,
  ZONE_32,
} from './spoiledStudy.js';

/*
 * Each study is spoiled in one way that is common in practice, must be diagnosed by name with its size, and gives the
 * fit of the unspoiled study once the remedy is stated.
 */

const folder = testFolder();
const ROWS = planeRows();
let clean: SpoiledRun;

beforeAll(async () => {
  clean = await runParts(folder, {});
});

const changed = (change: (row: PlaneRow) => Partial<PlaneRow>): PlaneRow[] =>
  ROWS.map((row) => ({ ...row, ...change(row) }));

const codes = ({ commonCauses }: SpoiledRun): string[] => commonCauses.causes.map(({ code }) => code);

const parameter = ({ commonCauses }: SpoiledRun, name: string): { estimate: number; se: number } => {
  const { estimate, standardError } = commonCauses.bases[0]!.parameters.find((one) => one.name === name)!;
  return { estimate, se: standardError! };
};

/** Within three standard errors, with a little for curvature. */
function expectSize(results: SpoiledRun, name: string, size: number, slack = 0): void {
  const { estimate, se } = parameter(results, name);
  expect(Math.abs(estimate - size)).toBeLessThan(3 * se + slack);
  expect(Math.abs(size)).toBeGreaterThan(3 * se);
}

function expectCleanFit(results: SpoiledRun, digits = 2): void {
  expect(codes(results)).toEqual([]);
  expect(results.fits).toHaveLength(clean.fits.length);
  for (const [k, fit] of clean.fits.entries()) {
    expect(results.fits[k]!.constantMm.estimate!).toBeCloseTo(fit.constantMm.estimate!, digits);
    expect(results.fits[k]!.ppm.estimate!).toBeCloseTo(fit.ppm.estimate!, digits);
  }
}

describe('an unspoiled study', () => {
  it('has no common cause, and shift, scale, rotation and tilts of nothing', () => {
    expect(codes(clean)).toEqual([]);
    expect(new Set(clean.fits.map(({ occupations }) => occupations))).toEqual(new Set([384]));
    const [base] = clean.commonCauses.bases;
    expect(base).toMatchObject({ base: 'B1', marks: 8, days: 24 });
    expect(base!.parameters.map(({ name, unit }) => [name, unit])).toEqual([
      ['shift-east', 'mm'],
      ['shift-north', 'mm'],
      ['scale', 'ppm'],
      ['rotation', 'arcsec'],
      ['shift-up', 'mm'],
      ['tilt-east', 'mm/km'],
      ['tilt-north', 'mm/km'],
    ]);
    for (const { estimate, standardError } of base!.parameters) {
      expect(Math.abs(estimate)).toBeLessThan(3.5 * standardError!);
    }
  });
});

describe('coordinates read wrongly', () => {
  it('swapped northing and easting', async () => {
    const rows = changed(({ eastingM, northingM }) => ({ eastingM: northingM, northingM: eastingM }));
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)).toEqual(['swapped-axes']);
    expect(spoiled.commonCauses.causes[0]!.text).toContain('easting and northing look swapped');
    expectCleanFit(await runParts(folder, { rows, columns: ['northing', 'easting', 'height'] }));
  });

  it('swapped northing and easting in the marks file', async () => {
    const swapped = projection('EPSG:25832');
    const marks = new Map(
      [...MARK_PLACES].map(([name, place]): [string, Geodetic] => {
        const { eastingM, northingM } = ZONE_32.forward(place);
        return [name, { ...place, ...swapped.inverse({ eastingM: northingM, northingM: eastingM }) }];
      }),
    );
    const spoiled = await runParts(folder, { marks });
    expect(codes(spoiled)).toEqual(['swapped-axes']);
    expect(spoiled.commonCauses.causes[0]!.remedy).toMatch(/^For the marks,/);
  });

  it.each(['international-foot', 'us-survey-foot'] as const)('metres for %s', async (unit) => {
    const foot = metresPer(unit);
    const rows = changed(({ eastingM, northingM, heightM }) => ({
      eastingM: eastingM / foot,
      northingM: northingM / foot,
      heightM: heightM / foot,
    }));
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)).toEqual(['plan-unit', 'height-unit']);
    const words = unit === 'us-survey-foot' ? 'US survey feet' : 'international feet';
    expect(spoiled.commonCauses.causes[0]!.text).toContain(`${words} read as metres`);
    expectCleanFit(await runParts(folder, { rows, layoutKeys: `, units: ${unit}` }));
  });

  it('one foot for the other: shifts show first, 2 ppm of the northing', async () => {
    const [survey, international] = [metresPer('us-survey-foot'), metresPer('international-foot')];
    // Written in international feet, read as US survey feet.
    const rows = changed(({ eastingM, northingM, heightM }) => ({
      eastingM: eastingM / international,
      northingM: northingM / international,
      heightM: heightM / international,
    }));
    const spoiled = await runParts(folder, { rows, layoutKeys: ', units: us-survey-foot' });
    expect(codes(spoiled)).toEqual(['plan-unit']);
    expect(spoiled.commonCauses.causes[0]!.text).toContain('international feet read as US survey feet');
    // 2.000004 ppm (1200/3937 over 0.3048) of a northing of 5328 km.
    const { northingM } = ZONE_32.forward(BASE);
    expectSize(spoiled, 'shift-north', northingM * (survey / international - 1) * 1000, 20);
    expectCleanFit(await runParts(folder, { rows, layoutKeys: ', units: international-foot' }));
  });

  it('the wrong zone', async () => {
    const zone33 = projection('EPSG:25833');
    const rows = changed(({ eastingM, northingM }) =>
      zone33.forward(ZONE_32.inverse({ eastingM, northingM })),
    );
    const utm = (zone: number): string => `"+proj=utm +zone=${zone} +ellps=GRS80"`;
    const spoiled = await runParts(folder, { rows, logKeys: `, coordinates: ${utm(32)}` });
    expect(codes(spoiled)).toEqual(['wrong-zone']);
    expect(spoiled.commonCauses.causes[0]!.text).toContain('zone 33');
    expectCleanFit(await runParts(folder, { rows, logKeys: `, coordinates: ${utm(33)}` }));
    // A code names its zone too.
    const byCode = await runParts(folder, { rows });
    expect(byCode.commonCauses.causes[0]!.remedy).toContain('EPSG:25833');
  });
});

describe('coordinates of another kind', () => {
  it('another frame: told with its size, undone by the transformation', async () => {
    // A shift of a metre and 0.3 ppm: the size of older realisations.
    const shift = { xM: 0.62, yM: -0.41, zM: 0.55 };
    const rows = changed(({ eastingM, northingM, heightM }) => {
      const place = { ...ZONE_32.inverse({ eastingM, northingM }), heightM };
      const { xM, yM, zM } = geodeticToGeocentric(place);
      const moved = geocentricToGeodetic({
        xM: xM * (1 + 3e-7) + shift.xM,
        yM: yM * (1 + 3e-7) + shift.yM,
        zM: zM * (1 + 3e-7) + shift.zM,
      });
      return { ...ZONE_32.forward(moved), heightM: moved.heightM };
    });
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)[0]).toBe('frame-or-base');
    const base = geodeticToGeocentric(BASE);
    const local = localFrame(BASE).rotate({
      xM: base.xM * 3e-7 + shift.xM,
      yM: base.yM * 3e-7 + shift.yM,
      zM: base.zM * 3e-7 + shift.zM,
    });
    expectSize(spoiled, 'shift-east', local.eastM * 1000);
    expectSize(spoiled, 'shift-north', local.northM * 1000);
    expectSize(spoiled, 'shift-up', local.upM * 1000);
    const logKeys = ', transformation: {shiftM: [0.62, -0.41, 0.55], scalePpm: 0.3, backwards: true}';
    expectCleanFit(await runParts(folder, { rows, logKeys }));
  });

  it('a grid taken for ground: the factor of the site in ppm', async () => {
    const about = ZONE_32.forward(BASE);
    const factor = 1.000357;
    const ground = groundGrid({ factor, aboutEastingM: about.eastingM, aboutNorthingM: about.northingM });
    const rows = changed((row) => ground.forward(row));
    const spoiled = await runParts(folder, { rows });
    // 357 ppm are no factor of this site, so the scale is told and not explained.
    expect(codes(spoiled)).toEqual(['systematic-scale']);
    expectSize(spoiled, 'scale', 357, 1);
    const logKeys = `, groundGrid: {factor: ${factor}, aboutEastingM: ${about.eastingM}, aboutNorthingM: ${about.northingM}}`;
    expectCleanFit(await runParts(folder, { rows, logKeys }));
  });

  it('the combined factor of the site: named', async () => {
    const about = ZONE_32.forward(BASE);
    // UTM at 44 km from the central meridian: 0.9996 (1 + 44.6²/(2 · 6380²)); 640 m up: 1 − 640/6380000.
    const factor = 1 / ((0.9996 + 0.9996 * (44.64 ** 2 / (2 * 6384 ** 2))) * (1 - 640 / 6384000));
    const ground = groundGrid({ factor, aboutEastingM: about.eastingM, aboutNorthingM: about.northingM });
    const spoiled = await runParts(folder, { rows: changed((row) => ground.forward(row)) });
    expect(codes(spoiled)).toEqual(['grid-for-ground']);
    expect(spoiled.commonCauses.causes[0]!.text).toContain('the combined factor');
    expectSize(spoiled, 'scale', (factor - 1) * 1e6, 1);
  });

  it('orthometric heights for ellipsoidal ones', async () => {
    const rows = changed(({ heightM }) => ({ heightM: heightM - 47.3 }));
    const spoiled = await runParts(folder, { rows });
    // All are off by more than 10 m and set aside, and the cause is named all the same.
    expect(spoiled.occupations.setAside['error-over-10-m']).toBe(384);
    expect(codes(spoiled)).toEqual(['height-kind']);
    expectSize(spoiled, 'shift-up', -47_300, 20);
    const logKeys = ', heights: {kind: orthometric, geoid: constant, separationM: 47.3}';
    const mended = await runParts(folder, { rows, logKeys });
    expectCleanFit(mended);
    expect(mended.messages.map(({ code }) => code)).toContain('constant-separation');
  });

  it('a geoid that slopes under one separation looks like vertical ppm', async () => {
    const slope = 30;
    const rows = changed(({ eastingM, heightM }) => {
      const km = (eastingM - ZONE_32.forward(BASE).eastingM) / 1000;
      return { heightM: heightM - (slope * km) / 1000 };
    });
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)).toEqual(['tilted']);
    expectSize(spoiled, 'tilt-east', -slope, 0.2);
    const whole = (await runWhole(folder, { rows })).fits.filter(({ component }) => component === 'vertical');
    const direct = whole.find((fit) => fit.reference === 'absolute' && !fit.composed)!;
    expect(direct.ppm.estimate!).toBeGreaterThan(5);
    // What is the same on all days is no part of repeatability.
    const basis = whole.find(({ basisOfRule }) => basisOfRule)!;
    expect(basis.reference).toBe('repeatability');
    expect(basis.ppm.estimate!).toBeLessThan(2);
    const logKeys = `, sitePlane: {aboutEastingM: ${ZONE_32.forward(BASE).eastingM}, tiltEastMmPerKm: -30, marks: [P1, P2]}`;
    const mended = await runParts(folder, { rows, logKeys });
    expectCleanFit(mended);
    expect(mended.siteMarks).toEqual(['P1', 'P2']);
  });

  it('a rod height', async () => {
    const rows = changed(({ heightM }) => ({ heightM: heightM + 0.1 }));
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)).toEqual(['rod-height']);
    expectSize(spoiled, 'shift-up', 100);
    expectCleanFit(
      await runParts(folder, { rows, layoutKeys: ', heightOf: antenna, constants: {antennaHeight: 0.1}' }),
    );
  });

  it('a base on an assumed coordinate: a shift, and metres / 20 in ppm', async () => {
    const offset = { eastM: 2.1, northM: -1.4, upM: 3.2 };
    const assumed = geocentricToGeodetic(localFrame(BASE).toGeocentric(offset));
    const from = geodeticToGeocentric(BASE);
    const to = geodeticToGeocentric(assumed);
    const rows = changed(({ eastingM, northingM, heightM }) => {
      const { xM, yM, zM } = geodeticToGeocentric({ ...ZONE_32.inverse({ eastingM, northingM }), heightM });
      const moved = geocentricToGeodetic({
        xM: xM + to.xM - from.xM,
        yM: yM + to.yM - from.yM,
        zM: zM + to.zM - from.zM,
      });
      return { ...ZONE_32.forward(moved), heightM: moved.heightM };
    });
    const spoiled = await runParts(folder, { rows });
    expect(codes(spoiled)).toEqual(['frame-or-base']);
    // √(2.1² + 1.4² + 3.2²) m = 4.076 m, and a twentieth of it: 0.20 ppm.
    expect(spoiled.commonCauses.causes[0]!.text).toMatch(/shifted by 4\.07\d m .*about 0\.20 ppm/);
    expectSize(spoiled, 'shift-east', 2100);
    expectSize(spoiled, 'shift-north', -1400);
    const constants = `, constants: {baseLatitude: ${assumed.latitudeDeg}, baseLongitude: ${assumed.longitudeDeg}, baseHeight: ${assumed.heightM}}`;
    const told = await runParts(folder, { rows, layoutKeys: constants });
    expect(told.messages.map(({ code }) => code)).toContain('base-coordinates-differ');
    expectCleanFit(
      await runParts(folder, { rows, layoutKeys: constants, logKeys: ', moveToPublishedBase: true' }),
    );
  });
});
