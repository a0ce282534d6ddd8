import { meridianRadiusM, primeVerticalRadiusM, WGS84 } from '../ellipsoid.js';
import type { Geographic } from '../projection.js';
import { type AsciiGrid, readAsciiGrid } from './asciiGrid.js';

/** Slope of the geoid against the ellipsoid. */
export interface GeoidSlope {
  /** Growth of the separation for every kilometre to the east, and to the north, mm. */
  readonly eastMmPerKm: number;
  readonly northMmPerKm: number;
  /** √(east² + north²): along the steepest direction. */
  readonly steepestMmPerKm: number;
}

/** Geoid separations on a grid of latitudes and longitudes. */
export interface GeoidGrid {
  /** Where there are separations, degrees; west may be given from −180 or from 0, as the file has it. */
  readonly southDeg: number;
  readonly northDeg: number;
  readonly westDeg: number;
  readonly eastDeg: number;
  covers(place: Geographic): boolean;
  /**
   * Height of the geoid over the ellipsoid, metres, bilinear between four values: orthometric height = ellipsoidal height −
   * separation. Longitudes of any turn are taken.
   * @throws RangeError outside the grid and beside a gap.
   */
  separationM(place: Geographic): number;
  /** Slope of the bilinear surface, in the cell to the north-east on a line between cells. @throws RangeError as `separationM`. */
  slope(place: Geographic): GeoidSlope;
}

/** The geoid lies within −107 and +86 m of the ellipsoid; local height datums add a few metres. */
const MOST_SEPARATION_M = 130;
/** Of a cell: places this near outside count as on the edge. */
const EDGE = 1e-6;
const DEG = Math.PI / 180;

/** Cell and place in it. */
interface Cell {
  /** South-west, south-east, north-west, north-east. */
  readonly corners: readonly [number, number, number, number];
  /** 0 to 1, from the west and from the south. */
  readonly x: number;
  readonly y: number;
}

/**
 * Geoid separations in metres from the text of an ASCII grid (see `readAsciiGrid`) whose x are longitudes, −180 to 180 or 0
 * to 360, and y latitudes, degrees. A grid around the whole earth is joined at its ends.
 * @throws RangeError for text that is no such grid, coordinates that are no degrees, and values no geoid has.
 */
export function geoidGrid(text: string): GeoidGrid {
  const grid = readAsciiGrid(text);
  const eastDeg = grid.westX + (grid.columns - 1) * grid.stepX;
  const northDeg = grid.southY + (grid.rows - 1) * grid.stepY;
  checkDegrees(grid, eastDeg, northDeg);
  checkSeparations(grid.values);
  const around = Math.abs(grid.columns * grid.stepX - 360) < grid.stepX * EDGE;
  const extent = `latitudes ${shown(grid.southY)} to ${shown(northDeg)} and longitudes ${shown(grid.westX)} to ${shown(eastDeg)}`;

  const cellAt = ({ latitudeDeg, longitudeDeg }: Geographic): Cell | undefined => {
    const row = clamped((latitudeDeg - grid.southY) / grid.stepY, grid.rows - 1);
    const turns = Math.floor((longitudeDeg - grid.westX) / 360 + (EDGE * grid.stepX) / 360);
    const cells = (longitudeDeg - grid.westX - 360 * turns) / grid.stepX;
    const column = clamped(cells, around ? grid.columns : grid.columns - 1);
    if (row === undefined || column === undefined) return undefined;
    const south = Math.min(Math.floor(row), grid.rows - 2);
    const west = Math.min(Math.floor(column), around ? grid.columns - 1 : grid.columns - 2);
    const east = (west + 1) % grid.columns;
    const value = (r: number, c: number) => grid.values[(grid.rows - 1 - r) * grid.columns + c]!;
    return {
      corners: [value(south, west), value(south, east), value(south + 1, west), value(south + 1, east)],
      x: column - west,
      y: row - south,
    };
  };
  const needed = (place: Geographic): Cell => {
    const cell = cellAt(place);
    if (cell) return cell;
    throw new RangeError(
      `latitude ${place.latitudeDeg}, longitude ${place.longitudeDeg}: expected a place inside the geoid grid, which covers ${extent}`,
    );
  };
  const valued = (value: number, place: Geographic): number => {
    if (!Number.isNaN(value)) return value;
    throw new RangeError(
      `latitude ${place.latitudeDeg}, longitude ${place.longitudeDeg}: expected separations around the place, received a gap in the geoid grid`,
    );
  };
  return {
    southDeg: grid.southY,
    northDeg,
    westDeg: grid.westX,
    eastDeg,
    covers: (place) => {
      const cell = cellAt(place);
      return cell !== undefined && !Number.isNaN(bilinear(cell));
    },
    separationM: (place) => valued(bilinear(needed(place)), place),
    slope: (place) => {
      const { corners, x, y } = needed(place);
      const [sw, se, nw, ne] = corners;
      const east = valued(((se - sw) * (1 - y) + (ne - nw) * y) / (grid.stepX * DEG), place);
      const north = valued(((nw - sw) * (1 - x) + (ne - se) * x) / (grid.stepY * DEG), place);
      const { latitudeDeg } = place;
      const across = primeVerticalRadiusM(latitudeDeg, WGS84) * Math.cos(latitudeDeg * DEG);
      const eastMmPerKm = (east / across) * 1e6;
      const northMmPerKm = (north / meridianRadiusM(latitudeDeg, WGS84)) * 1e6;
      return { eastMmPerKm, northMmPerKm, steepestMmPerKm: Math.hypot(eastMmPerKm, northMmPerKm) };
    },
  };
}

/** Corners of no weight are left out, so that a value next to a gap can be had. */
function bilinear({ corners, x, y }: Cell): number {
  const weights = [(1 - x) * (1 - y), x * (1 - y), (1 - x) * y, x * y];
  return weights.reduce((total, weight, i) => (weight === 0 ? total : total + weight * corners[i]!), 0);
}

function clamped(cells: number, last: number): number | undefined {
  if (!(cells >= -EDGE && cells <= last + EDGE)) return undefined;
  return Math.min(Math.max(cells, 0), last);
}

function checkDegrees(grid: AsciiGrid, eastDeg: number, northDeg: number): void {
  const slack = EDGE * grid.stepY;
  if (grid.southY < -90 - slack || northDeg > 90 + slack)
    throw new RangeError(
      `grid: expected latitudes in degrees, received rows from ${shown(grid.southY)} to ${shown(northDeg)}`,
    );
  if (grid.westX < -360 || eastDeg > 720 || eastDeg - grid.westX > 360 + EDGE * grid.stepX)
    throw new RangeError(
      `grid: expected longitudes in degrees, received columns from ${shown(grid.westX)} to ${shown(eastDeg)}`,
    );
}

function checkSeparations(values: Float64Array): void {
  const i = values.findIndex((value) => Math.abs(value) > MOST_SEPARATION_M);
  if (i >= 0)
    throw new RangeError(
      `grid: expected geoid separations in metres, at most ${MOST_SEPARATION_M} either way, received ${values[i]} as value ${i + 1}; a value for gaps is named by NODATA_value`,
    );
}

function shown(degrees: number): string {
  return String(Number(degrees.toFixed(6)));
}
