import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readAsciiGrid } from '../../src/geodesy/geoid/asciiGrid.js';
import { estimatedSlope, geoidGrid } from '../../src/geodesy/geoid/index.js';

const at = (latitudeDeg: number, longitudeDeg: number) => ({ latitudeDeg, longitudeDeg });

/** Invented: three columns 8, 8.5, 9 and rows 47.5, 47, 46.5. */
const SMALL = `ncols 3
nrows 3
xllcenter 8
yllcenter 46.5
cellsize 0.5
NODATA_value -9999
 50 51 52
 48.5 49.5 50.5
 47 48 -9999
`;

describe('readAsciiGrid', () => {
  it('reads rows from north to south, and gaps', () => {
    const grid = readAsciiGrid(SMALL);
    expect(grid).toMatchObject({ columns: 3, rows: 3, westX: 8, southY: 46.5, stepX: 0.5, stepY: 0.5 });
    expect([...grid.values]).toEqual([50, 51, 52, 48.5, 49.5, 50.5, 47, 48, Number.NaN]);
  });
  it('takes corners, steps of two sizes, any case and order, Windows line ends and values over several lines', () => {
    const grid = readAsciiGrid(
      '\uFEFFNROWS 2\r\nNCOLS 2\r\nXLLCORNER 7.75\r\nyllCorner 46.4\r\nDX 0.5\r\ndy 0.2\r\n1 2\r\n\r\n3\r\n4e0',
    );
    expect(grid).toMatchObject({ columns: 2, rows: 2, westX: 8, southY: 46.5, stepX: 0.5, stepY: 0.2 });
    expect([...grid.values]).toEqual([1, 2, 3, 4]);
  });
  it('takes another number, or nan itself, for a gap', () => {
    const text = SMALL.replace('NODATA_value -9999', 'nodata_value 49.5');
    expect(readAsciiGrid(text).values[4]).toBeNaN();
    expect(
      readAsciiGrid(SMALL.replace('NODATA_value -9999', 'nodata_value nan').replace(' -9999', ' NaN'))
        .values[8],
    ).toBeNaN();
  });
  it.each([
    ['ncols 3\n', '', 'expected ncols, a whole number of at least 2, received none'],
    ['ncols 3', 'ncols 2.5', 'expected ncols, a whole number of at least 2, received 2.5'],
    ['ncols 3', 'ncols 3e8', 'expected at most 100000000 values, received 300000000 columns times 3 rows'],
    ['nrows 3', 'nrows 4', 'expected 12 values for 3 columns and 4 rows, received 9'],
    ['nrows 3', 'nrows 2', 'expected 6 values for 3 columns and 2 rows, received 9'],
    ['xllcenter 8\n', '', 'expected either xllcorner or xllcenter, received none'],
    ['xllcenter 8', 'xllcenter 8\nxllcorner 8', 'expected either xllcorner or xllcenter, received both'],
    ['cellsize 0.5', 'cellsize 0', 'expected cellsize or dx, a number above 0, received 0'],
    ['cellsize 0.5', 'cellsize 0,5', 'expected a number after cellsize, with a decimal point, received 0,5'],
    ['cellsize 0.5', 'cellsize 0.5\ncellsize 0.5', 'expected cellsize once, received it twice'],
    ['cellsize', 'cellwidth', 'expected one of the keys ncols, nrows'],
    ['48.5', '48,5', 'expected numbers with a decimal point, received "48,5" as value 4'],
  ])('refuses "%s" as "%s"', (from, to, reason) => {
    expect(() => readAsciiGrid(SMALL.replace(from, to))).toThrow(`grid: ${reason}`);
  });
});

describe('geoidGrid', () => {
  const grid = geoidGrid(SMALL);
  it('has its values at the nodes and between them', () => {
    expect(grid.separationM(at(47.5, 8))).toBe(50);
    expect(grid.separationM(at(47, 8.5))).toBe(49.5);
    expect(grid.separationM(at(47.25, 8.25))).toBeCloseTo(49.75, 12);
    // on its edge, also beside a gap
    expect(grid.separationM(at(47.2, 9))).toBeCloseTo(51.1, 12);
    expect(grid.separationM(at(46.5, 8.5))).toBe(48);
  });
  it('tells its extent, and refuses what it does not cover', () => {
    expect([grid.southDeg, grid.northDeg, grid.westDeg, grid.eastDeg]).toEqual([46.5, 47.5, 8, 9]);
    expect(() => grid.separationM(at(47, 9.01))).toThrow(
      new RangeError(
        'latitude 47, longitude 9.01: expected a place inside the geoid grid, which covers latitudes 46.5 to 47.5 and longitudes 8 to 9',
      ),
    );
    expect(() => grid.separationM(at(46.4, 8.5))).toThrow(RangeError);
    expect(() => grid.separationM(at(Number.NaN, 8.5))).toThrow(RangeError);
    expect(() => grid.separationM(at(46.75, 8.75))).toThrow(
      'latitude 46.75, longitude 8.75: expected separations around the place, received a gap in the geoid grid',
    );
    expect(() => grid.slope(at(46.75, 8.75))).toThrow(/a gap in the geoid grid/);
    expect([at(47, 8.5), at(46.75, 8.75), at(47, 9.01)].map((place) => grid.covers(place))).toEqual([
      true,
      false,
      false,
    ]);
  });
  it('understands longitudes of both habits, in the file and in the place', () => {
    const west = (from: number) =>
      geoidGrid(`ncols 2\nnrows 2\nxllcenter ${from}\nyllcenter 40\ncellsize 1\n-30 -32\n-31 -33\n`);
    for (const file of [west(-105), west(255)])
      for (const longitude of [-104.5, 255.5]) expect(file.separationM(at(40.5, longitude))).toBe(-31.5);
    // over the date line
    for (const file of [west(179.5), west(-180.5)])
      for (const longitude of [180, -180]) expect(file.separationM(at(40.5, longitude))).toBe(-31.5);
  });
  it('joins a grid around the earth', () => {
    const row = Array.from({ length: 36 }, (_, i) => i).join(' ');
    const world = geoidGrid(`ncols 36\nnrows 2\nxllcenter 0\nyllcenter 0\ncellsize 10\n${row}\n${row}\n`);
    expect(world.separationM(at(5, 355))).toBeCloseTo(17.5, 9);
    expect(world.separationM(at(5, -5))).toBeCloseTo(17.5, 9);
    expect(world.separationM(at(5, 360))).toBe(0);
    expect(world.separationM(at(5, 350))).toBe(35);
  });
  it('tells the slope', () => {
    // 3 m for a degree to the north, 2 m for one to the east; lengths of degrees of WGS 84 by their series
    const { eastMmPerKm, northMmPerKm, steepestMmPerKm } = grid.slope(at(47.25, 8.25));
    // 111 175.7 m at 47.25° (111 132.954 − 559.822 cos 2φ + 1.175 cos 4φ)
    expect(northMmPerKm).toBeCloseTo((3 / 111.1757) * 1000, 3);
    // 75 700.5 m there (111 412.84 cos φ − 93.5 cos 3φ + 0.118 cos 5φ)
    expect(eastMmPerKm).toBeCloseTo((2 / 75.7005) * 1000, 3);
    expect(steepestMmPerKm).toBe(Math.hypot(eastMmPerKm, northMmPerKm));
  });
  it('is exact on a tilted plane, wherever the place lies', () => {
    const values = Array.from({ length: 11 }, (_, r) =>
      Array.from({ length: 11 }, (_, c) => 40 + 0.5 * c - 0.25 * (10 - r)).join(' '),
    ).join('\n');
    const tilted = geoidGrid(`ncols 11\nnrows 11\nxllcenter 5\nyllcenter 45\ncellsize 0.1\n${values}\n`);
    fc.assert(
      fc.property(
        fc.double({ min: 45, max: 46, noNaN: true }),
        fc.double({ min: 5, max: 6, noNaN: true }),
        (lat, lon) => {
          expect(tilted.separationM(at(lat, lon))).toBeCloseTo(40 + 5 * (lon - 5) - 2.5 * (lat - 45), 9);
          expect(tilted.separationM(at(lat, lon + 360))).toBeCloseTo(tilted.separationM(at(lat, lon)), 9);
        },
      ),
      { seed: 21 },
    );
  });
  it('refuses metres for degrees and values that no geoid has', () => {
    expect(() => geoidGrid(SMALL.replace('yllcenter 46.5', 'yllcenter 5200000'))).toThrow(
      'grid: expected latitudes in degrees, received rows from 5200000 to 5200001',
    );
    expect(() => geoidGrid(SMALL.replace('xllcenter 8', 'xllcenter 450000'))).toThrow(
      'grid: expected longitudes in degrees, received columns from 450000 to 450001',
    );
    expect(() => geoidGrid(SMALL.replace('NODATA_value -9999', 'NODATA_value -32768'))).toThrow(
      'grid: expected geoid separations in metres, at most 130 either way, received -9999 as value 9; a value for gaps is named by NODATA_value',
    );
  });
});

describe('estimatedSlope', () => {
  it('lays a plane through points, as the grid has it', () => {
    const values = Array.from({ length: 11 }, (_, r) =>
      Array.from({ length: 11 }, (_, c) => 40 + 0.005 * c - 0.0025 * (10 - r)).join(' '),
    ).join('\n');
    const grid = geoidGrid(`ncols 11\nnrows 11\nxllcenter 5\nyllcenter 45\ncellsize 0.01\n${values}\n`);
    const points = [at(45.01, 5.02), at(45.08, 5.05), at(45.03, 5.09), at(45.06, 5.01)].map((place) => ({
      ...place,
      separationM: grid.separationM(place),
    }));
    const fitted = estimatedSlope(points);
    const slope = grid.slope(at(45.045, 5.0425));
    expect(fitted.points).toBe(4);
    expect(fitted.middleM).toBeCloseTo(grid.separationM(at(45.045, 5.0425)), 5);
    expect(fitted.eastMmPerKm).toBeCloseTo(slope.eastMmPerKm, 1);
    expect(fitted.northMmPerKm).toBeCloseTo(slope.northMmPerKm, 1);
    expect(fitted.residualMm).toBeLessThan(0.01);
    expect(estimatedSlope(points.slice(1)).residualMm).toBeNull();
    const beyond = estimatedSlope(points.map((p) => ({ ...p, longitudeDeg: p.longitudeDeg + 174.95 })));
    const turned = estimatedSlope(
      points.map((p) => ({
        ...p,
        longitudeDeg: p.longitudeDeg + 174.95 - (p.longitudeDeg > 5.05 ? 360 : 0),
      })),
    );
    expect(turned.eastMmPerKm).toBeCloseTo(beyond.eastMmPerKm, 7);
  });
  it('says what it needs', () => {
    const point = { ...at(45, 5), separationM: 40 };
    expect(() => estimatedSlope([point, point])).toThrow(
      'points: expected at least three to lay a plane through, received 2',
    );
    expect(() => estimatedSlope([point, point, point])).toThrow(/received points almost on one line/);
    expect(() =>
      estimatedSlope([
        point,
        { ...point, latitudeDeg: 45.1 },
        { ...point, latitudeDeg: 45.2, longitudeDeg: 5.0001 },
      ]),
    ).toThrow(/almost on one line/);
    expect(() => estimatedSlope([point, point, { ...point, separationM: Number.NaN }])).toThrow(
      /^points\[2\]: expected/,
    );
  });
});
