import type { Geodetic } from '../geodesy/index.js';
import {
  type ColumnRole,
  type CoordinateSystem,
  coordinateColumns,
  type DelimitedHeader,
  type DelimitedRow,
  InputError,
  type Message,
  message,
  parseNumber,
  readDelimitedTable,
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
  readonly position: Geodetic;
  readonly text: (role: ColumnRole) => string;
  /** NaN when blank; adds a message and gives NaN when it is no number. */
  readonly number: (role: ColumnRole) => number;
}

/**
 * The rows of a marks or bases file. A blank coordinate means not known (NaN).
 * @throws InputError with every faulty cell named
 */
export async function readControlRows(
  control: ControlFile,
  nameRole: 'mark' | 'base',
): Promise<{ rows: ControlRow[]; messages: Message[] }> {
  const { path, file, columns } = control;
  const { roles, toGeodetic } = coordinateColumns(control.coordinates);
  const required = [nameRole, ...roles] as const;
  const { header, rows } = await readDelimitedTable(path, file, { columns, required });
  const errors: Message[] = [];
  const report = (code: string, text: string, row: number, column: string | null): void => {
    errors.push(message('error', code, text, { file, row, ...(column === null ? {} : { column }) }));
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
      report(
        'not-a-number',
        `Expected a number, came ${JSON.stringify(text(role))}. Correct the cell or leave it blank.`,
        row,
        header.headers.get(role) ?? role,
      );
      return Number.NaN;
    };
    const name = text(nameRole);
    if (name === '') {
      report('no-name', `Expected the name of a ${nameRole}, came a blank cell. Fill it in.`, row, nameRole);
      continue;
    }
    if (seen.has(name)) {
      report(
        'repeated-name',
        `The ${nameRole} "${name}" stands already in row ${seen.get(name)}. Keep one of the two.`,
        row,
        nameRole,
      );
      continue;
    }
    seen.set(name, row);
    const [first, second, third] = roles.map(number) as [number, number, number];
    let position: Geodetic;
    try {
      position = toGeodetic(first, second, third);
    } catch (error) {
      report(
        'out-of-range',
        `The coordinates are impossible: ${(error as Error).message}. Correct them.`,
        row,
        roles[0],
      );
      continue;
    }
    result.push({ row, name, position, text, number });
  }
  if (errors.length > 0) throw new InputError(errors);
  return { rows: result, messages: [...header.messages] };
}

function cellOf(header: DelimitedHeader, data: DelimitedRow, role: ColumnRole): string {
  const index = header.positions.get(role);
  return index === undefined ? '' : data.cells![index]!;
}
