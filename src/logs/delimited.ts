import { DELIMITERS, splitCells } from './cells.js';
import { readLines } from './lines.js';
import { InputError, inputError, type Message, message } from './messages.js';
import { suggestion } from './nearestName.js';
import { COLUMN_ROLES, type ColumnRole, roleOfHeader } from './roles.js';

/** How a delimited file is to be understood. */
export interface DelimitedOptions {
  /** Name or character; without it the delimiter under which most headers are known is taken. */
  readonly delimiter?: string | undefined;
  /** Lines that begin with this are comments. */
  readonly comment?: string | undefined;
  /** Role → header, where a file does not spell the role itself. */
  readonly columns?: Readonly<Partial<Record<ColumnRole, string>>> | undefined;
  /** Roles without which no row can be used. */
  readonly required: readonly ColumnRole[];
}

/** A data line and its cells; null cells when a quote does not close or the number of cells is not the header's. */
export interface DelimitedRow {
  readonly row: number;
  readonly cells: readonly string[] | null;
  /** Why there are no cells. */
  readonly fault: string;
}

/** The header of a file: where each role stands, or why no row can be read. */
export interface DelimitedHeader {
  readonly positions: ReadonlyMap<ColumnRole, number>;
  readonly headers: ReadonlyMap<ColumnRole, string>;
  readonly width: number;
  readonly readable: boolean;
  readonly messages: readonly Message[];
}

export interface DelimitedBatch {
  readonly header: DelimitedHeader;
  readonly rows: readonly DelimitedRow[];
}

/**
 * The data rows of a delimited text file as a stream of batches. Blank lines, comments and repeated headers are no
 * rows. When the header cannot be understood every line is a row without cells, so that the account adds up.
 * @param file name of the file in messages
 */
export async function* readDelimited(
  path: string,
  file: string,
  options: DelimitedOptions,
): AsyncGenerator<DelimitedBatch> {
  const comment = options.comment ?? '#';
  let header: DelimitedHeader | null = null;
  let headerLine = '';
  let delimiter = ',';
  for await (const batch of readLines(path)) {
    const rows: DelimitedRow[] = [];
    for (let i = 0; i < batch.lines.length; i++) {
      const line = batch.lines[i]!;
      if (line.trim() === '' || line.startsWith(comment)) continue;
      const row = batch.firstLine + i;
      if (header === null) {
        delimiter = chooseDelimiter(line, options.delimiter);
        header = understandHeader(line, delimiter, row, file, options);
        headerLine = line;
        if (header.positions.size > 0) continue;
      } else if (line === headerLine && header.positions.size > 0) continue;
      rows.push(header.readable ? dataRow(line, delimiter, row, header.width) : unreadableRow(row));
    }
    if (header !== null) yield { header, rows };
  }
}

const unreadableRow = (row: number): DelimitedRow => ({
  row,
  cells: null,
  fault: 'the header of the file was not understood',
});

function dataRow(line: string, delimiter: string, row: number, width: number): DelimitedRow {
  const cells = splitCells(line, delimiter);
  if (cells === null) return { row, cells, fault: 'a quote opens and does not close in this line' };
  while (cells.length > width && cells.at(-1) === '') cells.pop();
  if (cells.length === width) return { row, cells, fault: '' };
  return { row, cells: null, fault: `expected ${width} cells as in the header, came ${cells.length}` };
}

function chooseDelimiter(line: string, wanted: string | undefined): string {
  if (wanted !== undefined) return DELIMITERS[wanted] ?? wanted;
  const known = (delimiter: string): number =>
    (splitCells(line, delimiter) ?? []).filter((cell) => roleOfHeader(cell) !== null).length;
  return Object.values(DELIMITERS).reduce((best, next) => (known(next) > known(best) ? next : best));
}

function understandHeader(
  line: string,
  delimiter: string,
  row: number,
  file: string,
  options: DelimitedOptions,
): DelimitedHeader {
  const cells = splitCells(line, delimiter) ?? [];
  const positions = new Map<ColumnRole, number>();
  const headers = new Map<ColumnRole, string>();
  const messages: Message[] = [];
  const error = (code: string, text: string, column?: string): void => {
    messages.push(message('error', code, text, column === undefined ? { file, row } : { file, row, column }));
  };
  const renamed = new Map(Object.entries(options.columns ?? {}).map(([role, name]) => [name, role]));
  const ignored: string[] = [];
  cells.forEach((cell, index) => {
    const role = (renamed.get(cell) as ColumnRole | undefined) ?? roleOfHeader(cell);
    if (role === null) ignored.push(cell);
    else if (positions.has(role)) {
      error(
        'repeated-column',
        `Two columns, "${headers.get(role)}" and "${cell}", have the role ${role}. Rename the one that is not meant.`,
        cell,
      );
    } else {
      positions.set(role, index);
      headers.set(role, cell);
    }
  });
  if (positions.size === 0) {
    const [code, text] = describeHeaderless(line, options.required);
    error(code, text);
    return { positions, headers, width: cells.length, readable: false, messages };
  }
  for (const [role, name] of Object.entries(options.columns ?? {}) as [ColumnRole, string][]) {
    if (cells.includes(name)) continue;
    error(
      'missing-column',
      `The layout names a column "${name}" for ${role}, the file has none.${suggestion(name, cells)} Correct the layout or the header.`,
      name,
    );
  }
  for (const role of options.required) {
    if (positions.has(role) || options.columns?.[role] !== undefined) continue;
    const near = suggestion(role, ignored);
    error(
      'missing-column',
      `Expected a column "${role}", came ${quoted(cells)}.${near} Add the column or name it in the layout.`,
      role,
    );
  }
  if (ignored.length > 0) {
    const near = ignored.map((name) => suggestion(name, COLUMN_ROLES)).find((text) => text !== '') ?? '';
    messages.push(
      message('info', 'ignored-column', `Columns that are no role are not read: ${quoted(ignored)}.${near}`, {
        file,
        row,
        column: ignored[0]!,
      }),
    );
  }
  const readable = messages.every(({ severity }) => severity !== 'error');
  return { positions, headers, width: cells.length, readable, messages };
}

function describeHeaderless(line: string, required: readonly string[]): [code: string, text: string] {
  // Control characters and undecodable bytes do not stand in a list of coordinates.
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the ones to be found
  if (/[\u0000-\u0008\u000e-\u001f\ufffd]/.test(line)) {
    return [
      'not-text',
      'Expected delimited text, came binary data. Export the positions as text (CSV) and name that file.',
    ];
  }
  const came = line.length > 60 ? `${line.slice(0, 60)}…` : line;
  return [
    'no-header',
    `Expected a header that names the columns ${quoted(required)}, came ${JSON.stringify(came)}. Write the names of the columns into the first line.`,
  ];
}

const quoted = (names: readonly string[]): string => names.map((name) => JSON.stringify(name)).join(', ');

/** A whole delimited file in memory, for marks and bases; throws InputError when its header is not understood. */
export async function readDelimitedTable(
  path: string,
  file: string,
  options: DelimitedOptions,
): Promise<{ header: DelimitedHeader; rows: DelimitedRow[] }> {
  let header: DelimitedHeader | null = null;
  const rows: DelimitedRow[] = [];
  for await (const batch of readDelimited(path, file, options)) {
    header = batch.header;
    rows.push(...batch.rows);
  }
  if (header === null) {
    throw inputError(
      'empty-file',
      `Expected a header and at least one row, came an empty file. Fill it in.`,
      { file },
    );
  }
  if (!header.readable) throw new InputError(header.messages.filter(({ severity }) => severity === 'error'));
  return { header, rows };
}
