import { parseIsoTime } from '../time/index.js';
import { DELIMITERS, splitCells } from './cells.js';
import { type Message, message, quoted, quotedList } from './messages.js';
import { suggestion } from './nearestName.js';
import { parseNumber } from './numbers.js';
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

/** The header of a file: where each role stands, or why no row can be read. */
export interface DelimitedHeader {
  readonly positions: ReadonlyMap<ColumnRole, number>;
  readonly headers: ReadonlyMap<ColumnRole, string>;
  /** Number of cells, with and without columns at the end that have no name. */
  readonly width: number;
  readonly namedWidth: number;
  readonly readable: boolean;
  readonly messages: readonly Message[];
}

/** The delimiter asked for, or the one under which most cells of a header spell a role. */
export function chooseDelimiter(line: string, options: DelimitedOptions): string {
  const { delimiter: wanted } = options;
  if (wanted !== undefined) return Object.hasOwn(DELIMITERS, wanted) ? DELIMITERS[wanted]! : wanted;
  const known = (delimiter: string): number =>
    (splitCells(line, delimiter) ?? []).filter((cell) => spellsRole(cell, options)).length;
  return Object.values(DELIMITERS).reduce((best, next) => (known(next) > known(best) ? next : best));
}

const spellsRole = (cell: string, { columns }: DelimitedOptions): boolean =>
  roleOfHeader(cell) !== null || (columns !== undefined && Object.values(columns).includes(cell));

/** Whether cells are names of columns, not data: none is a number or a time, and more than half spell a role. */
export function looksLikeHeader(cells: readonly string[], options: DelimitedOptions): boolean {
  const filled = cells.filter((cell) => cell !== '');
  const roles = filled.filter((cell) => spellsRole(cell, options)).length;
  return roles >= 2 && 2 * roles > filled.length && filled.every(isNoValue);
}

const isNoValue = (cell: string): boolean =>
  parseNumber(cell) === null && parseIsoTime(cell).kind === 'invalid';

/** Finds the roles in a header; columns that the layout names go before columns that spell a role. */
export function understandHeader(
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
  const error = (code: string, text: string, column: string): void => {
    messages.push(message('error', code, text, { file, row, column }));
  };
  const found = (role: ColumnRole, index: number): void => {
    const [cell, before] = [cells[index]!, headers.get(role)];
    if (before !== undefined) {
      const text = `Two columns, ${quoted(before)} and ${quoted(cell)}, have the role ${role}. Rename the one that is not meant.`;
      error('repeated-column', text, cell);
      return;
    }
    positions.set(role, index);
    headers.set(role, cell);
  };
  const named = new Map(Object.entries(options.columns ?? {}) as [ColumnRole, string][]);
  for (const [role, name] of named) {
    cells.forEach((cell, index) => {
      if (cell === name.trim()) found(role, index);
    });
  }
  const taken = new Set(positions.values());
  const ignored: string[] = [];
  cells.forEach((cell, index) => {
    if (taken.has(index) || cell === '') return;
    const role = roleOfHeader(cell);
    if (role === null || named.has(role)) ignored.push(cell);
    else found(role, index);
  });
  const width = cells.length;
  const namedWidth = cells.findLastIndex((cell) => cell !== '') + 1;
  if (positions.size === 0) {
    const headerless = describeHeaderless(line, options);
    return { positions, headers, width, namedWidth, readable: false, messages: [headerless(file, row)] };
  }
  for (const [role, name] of named) {
    if (positions.has(role)) continue;
    error(
      'missing-column',
      `The layout names a column ${quoted(name)} for ${role}, the file has none.${suggestion(name, cells)} Correct the layout or the header.`,
      name,
    );
  }
  for (const role of options.required) {
    if (positions.has(role) || named.has(role)) continue;
    error(
      'missing-column',
      `Expected a column "${role}", came ${quotedList(cells)}.${suggestion(role, ignored)} Add the column or name it in the layout.`,
      role,
    );
  }
  if (ignored.length > 0) {
    const missing = COLUMN_ROLES.filter((role) => !positions.has(role));
    const near = ignored.map((name) => suggestion(name, missing)).find((text) => text !== '') ?? '';
    const remedy = near === '' ? '' : `${near} Correct the header or name the column in the layout if so.`;
    const text = `Columns that are no role are not read: ${quotedList(ignored)}.${remedy}`;
    messages.push(message('info', 'ignored-column', text, { file, row, column: ignored[0]! }));
  }
  const readable = messages.every(({ severity }) => severity !== 'error');
  return { positions, headers, width, namedWidth, readable, messages };
}

/** Why nothing in a first line is the name of a column. */
function describeHeaderless(
  line: string,
  { required, columns }: DelimitedOptions,
): (file: string, row: number) => Message {
  const tell =
    (code: string, text: string) =>
    (file: string, row: number): Message =>
      message('error', code, text, { file, row });
  const nulls = line.split('\u0000').length - 1;
  // In UTF-16 every second byte of plain letters is zero.
  if (nulls > line.length / 3) {
    return tell(
      'not-utf8',
      'Expected text in UTF-8, came what looks like UTF-16. Open the file in an editor and save it as UTF-8.',
    );
  }
  // Control characters and undecodable bytes do not stand in a list of coordinates.
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the ones to be found
  if (/[\u0000-\u0008\u000e-\u001f\ufffd]/.test(line)) {
    return tell(
      'not-text',
      'Expected delimited text, came binary data. Export the positions as text (CSV) and name that file.',
    );
  }
  const names = required.map((role) => columns?.[role] ?? role);
  return tell(
    'no-header',
    `Expected a header that names the columns ${quotedList(names)}, came ${quoted(line)}. Write the names of the columns into the first line.`,
  );
}
