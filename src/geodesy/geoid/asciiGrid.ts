/** A raster with values at the nodes of a regular net, as read: rows from north to south, NaN where there is no value. */
export interface AsciiGrid {
  readonly columns: number;
  readonly rows: number;
  /** Position of the first column's and the last row's values (cell centres). */
  readonly westX: number;
  readonly southY: number;
  readonly stepX: number;
  readonly stepY: number;
  readonly values: Float64Array;
}

const KEYS = new Set(
  'ncols nrows xllcorner xllcenter yllcorner yllcenter cellsize dx dy nodata_value'.split(' '),
);
const HEADER_LINE = /^[ \t]*([A-Za-z_]+)[ \t]+(\S+)[ \t]*\r?\n/;
const MOST_VALUES = 1e8;

/**
 * Reads an ASCII grid (`.asc`): lines `ncols`, `nrows`, `xllcorner` or `xllcenter`, `yllcorner` or `yllcenter`, `cellsize` (or
 * `dx` and `dy`) and, if there are gaps, `NODATA_value`, in any case and order; then the values, rows from north to
 * south, separated by blanks or line ends, decimal points. With `…corner` the values stand half a cell inside
 * (Library of Congress, Sustainability of Digital Formats, fdd000421; general raster tools write it).
 * @throws RangeError naming the key or value, what was expected and what came.
 */
export function readAsciiGrid(text: string): AsciiGrid {
  const header = new Map<string, number>();
  // the mark that some editors put before UTF-8
  let at = text.startsWith('\uFEFF') ? 1 : 0;
  for (;;) {
    const line = HEADER_LINE.exec(text.slice(at, at + 200));
    if (!line) break;
    const [whole, key = '', value = ''] = line;
    at += whole.length;
    addKey(header, key, value);
  }
  const columns = count(header, 'ncols');
  const rows = count(header, 'nrows');
  if (columns * rows > MOST_VALUES)
    throw new RangeError(
      `grid: expected at most ${MOST_VALUES} values, received ${columns} columns times ${rows} rows`,
    );
  const stepX = step(header, 'dx');
  const stepY = step(header, 'dy');
  return {
    columns,
    rows,
    westX: origin(header, 'xll', stepX),
    southY: origin(header, 'yll', stepY),
    stepX,
    stepY,
    values: readValues(text, at, columns, rows, header.get('nodata_value') ?? -9999),
  };
}

function addKey(header: Map<string, number>, written: string, value: string): void {
  const key = written.toLowerCase();
  if (!KEYS.has(key))
    throw new RangeError(`grid: expected one of the keys ${[...KEYS].join(', ')}, received ${written}`);
  if (header.has(key)) throw new RangeError(`grid: expected ${key} once, received it twice`);
  const number = Number(value);
  // "NaN" itself may stand for no value
  if (!Number.isFinite(number) && !(key === 'nodata_value' && /^nan$/i.test(value)))
    throw new RangeError(`grid: expected a number after ${written}, with a decimal point, received ${value}`);
  header.set(key, number);
}

function count(header: ReadonlyMap<string, number>, key: string): number {
  const value = header.get(key);
  if (value === undefined || !Number.isInteger(value) || value < 2)
    throw new RangeError(`grid: expected ${key}, a whole number of at least 2, received ${value ?? 'none'}`);
  return value;
}

function step(header: ReadonlyMap<string, number>, key: 'dx' | 'dy'): number {
  const value = header.get(key) ?? header.get('cellsize');
  if (value === undefined || !(value > 0))
    throw new RangeError(`grid: expected cellsize or ${key}, a number above 0, received ${value ?? 'none'}`);
  return value;
}

function origin(header: ReadonlyMap<string, number>, key: 'xll' | 'yll', size: number): number {
  const [corner, centre] = [header.get(`${key}corner`), header.get(`${key}center`)];
  if ((corner === undefined) === (centre === undefined))
    throw new RangeError(
      `grid: expected either ${key}corner or ${key}center, received ${corner === undefined ? 'none' : 'both'}`,
    );
  return centre ?? (corner as number) + size / 2;
}

function readValues(text: string, start: number, columns: number, rows: number, none: number): Float64Array {
  const values = new Float64Array(columns * rows);
  const word = /\S+/g;
  word.lastIndex = start;
  let found = 0;
  for (let match = word.exec(text); match; match = word.exec(text)) {
    const [written] = match;
    const value = Number(written);
    if (Number.isNaN(value) && !/^nan$/i.test(written))
      throw new RangeError(
        `grid: expected numbers with a decimal point, received "${written.slice(0, 40)}" as value ${found + 1}`,
      );
    if (found < values.length) values[found] = value === none ? Number.NaN : value;
    found += 1;
  }
  if (found !== values.length)
    throw new RangeError(
      `grid: expected ${values.length} values for ${columns} columns and ${rows} rows, received ${found}`,
    );
  return values;
}
