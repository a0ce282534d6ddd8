import type { Geodetic } from '../geodesy/index.js';
import {
  type ColumnRole,
  CoordinateFault,
  type CoordinateSystem,
  coordinateColumns,
  type DelimitedHeader,
  InputError,
  type Message,
  message,
  parseNumber,
  quoted,
  readDelimitedTable,
  type TableRow,
} from '../logs/index.js';

/** Where a table of points with known coordinates stands and in which system it is written. */
export interface ControlFile {
  readonly path: string;
  /** Name in messages. */
  readonly file: string;
  readonly coordinates: CoordinateSystem;
  readonly columns?: Readonly<Partial<Record<ColumnRole, string>>> | undefined;
}

/** One row of a marks or bases file, its cells by role. */
export interface ControlRow {
  readonly row: number;
  readonly name: string;
  /** What is not known is NaN. */
  readonly position: Geodetic;
  /** Some, but not all, of the coordinates that are only known together are given; they count as not known. */
  readonly half: boolean;
  readonly text: (role: ColumnRole) => string;
  /** One of the numbers asked for; NaN when blank. */
  readonly number: (role: ColumnRole) => number;
}

const NOT_KNOWN: Geodetic = { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: Number.NaN };

/**
 * The rows of a marks or bases file. A blank coordinate means not known (NaN).
 * @param numberRoles columns with further numbers, none of them negative
 * @throws InputError with every faulty cell named
 */
export async function readControlRows(
  control: ControlFile,
  nameRole: 'mark' | 'base',
  numberRoles: readonly ColumnRole[] = [],
): Promise<{ rows: ControlRow[]; messages: Message[] }> {
  const { path, file, columns } = control;
  const { roles, together, toGeodetic } = coordinateColumns(control.coordinates);
  const required = [nameRole, ...roles] as const;
  const { header, rows, messages } = await readDelimitedTable(path, file, { columns, required });
  const errors: Message[] = [];
  const report = (code: string, text: string, row: number, role: ColumnRole | null): void => {
    const column = role === null ? {} : { column: header.headers.get(role) ?? role };
    errors.push(message('error', code, text, { file, row, ...column }));
  };
  const seen = new Map<string, number>();
  const result: ControlRow[] = [];
  for (const data of rows) {
    const { row } = data;
    if (data.cells === null) {
      report('unreadable', `The row cannot be read: ${data.fault}. Correct it.`, row, null);
      continue;
    }
    const text = (role: ColumnRole): string => cellOf(header, data, role);
    const number = (role: ColumnRole): number => {
      const value = parseNumber(text(role));
      if (value !== null) return value;
      const came = quoted(text(role));
      report(
        'not-a-number',
        `Expected a number, came ${came}. Correct the cell or leave it blank.`,
        row,
        role,
      );
      return Number.NaN;
    };
    const name = text(nameRole);
    if (name === '') {
      report('no-name', `Expected the name of a ${nameRole}, came a blank cell. Fill it in.`, row, nameRole);
      continue;
    }
    if (seen.has(name)) {
      const before = `The ${nameRole} ${quoted(name)} stands already in row ${seen.get(name)}.`;
      report('repeated-name', `${before} Keep one of the two.`, row, nameRole);
      continue;
    }
    seen.set(name, row);
    const faultsBefore = errors.length;
    const [first, second, third] = roles.map(number) as [number, number, number];
    const numbers = new Map(numberRoles.map((role) => [role, number(role)]));
    for (const [role, value] of numbers) {
      if (!(value < 0)) continue;
      report('out-of-range', `Expected a number of at least 0, came ${value}. Correct the cell.`, row, role);
    }
    if (errors.length > faultsBefore) continue;
    const blank = [first, second, third].slice(0, together).filter(Number.isNaN).length;
    let position: Geodetic = { ...NOT_KNOWN, heightM: together === 2 ? third : Number.NaN };
    if (blank === 0) {
      try {
        position = toGeodetic(first, second, third);
      } catch (error) {
        if (!(error instanceof CoordinateFault)) throw error;
        const impossible = `The coordinates are impossible: ${error.message}. Correct them.`;
        report('out-of-range', impossible, row, roles[error.index]);
        continue;
      }
    }
    const half = blank > 0 && blank < together;
    result.push({ row, name, position, half, text, number: (role) => numbers.get(role) ?? Number.NaN });
  }
  if (errors.length > 0) throw new InputError(errors);
  return { rows: result, messages };
}

function cellOf(header: DelimitedHeader, data: TableRow, role: ColumnRole): string {
  const index = header.positions.get(role);
  return index === undefined ? '' : data.cells![index]!;
}
