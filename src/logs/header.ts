import { parseIsoTime } from '../time/index.js';
import { DELIMITERS, splitCells } from './cells.js';
import { type Message, message, quoted, quotedList } from './messages.js';
import { parseNumber } from './numbers.js';
import { type ColumnRole, roleOfHeader } from './roles.js';

/** How a delimited file is to be understood. */
export interface DelimitedOptions {
  /** Name or character; without it the delimiter under which most headers are known is taken. */
  readonly delimiter?: string | undefined;
  /** Lines that begin with this are comments. */
  readonly comment?: string | undefined;
  /** Role → header, where a file does not spell the role itself. */
  readonly columns?: Readonly<Partial<Record<ColumnRole, string | number>>> | undefined;
  /** Character of the decimal mark; default a point. */
  readonly decimal?: string | undefined;
  /** False when the first line is data already. */
  readonly header?: boolean | undefined;
  /** Lines at the top that are passed over. */
  readonly skipLines?: number | undefined;
  /** Roles without which no row can be used. */
  readonly required: readonly ColumnRole[];
  /** Of each of these groups one role is needed; `what` names the group in a message. */
  readonly requiredOneOf?:
    | readonly { readonly what: string; readonly roles: readonly ColumnRole[] }[]
    | undefined;
}

/** The header of a file: where each role stands, or why no row can be read. */
export interface DelimitedHeader {
  readonly positions: ReadonlyMap<ColumnRole, number>;
  readonly headers: ReadonlyMap<ColumnRole, string>;
  /** Number of cells, with and without columns at the end that have no name. */
  readonly width: number;
  readonly namedWidth: number;
  /** Fewest cells of a row that can be used: all that is needed and one more, so that none of it can be cut off. */
  readonly leastWidth: number;
  /** The last column is a description, which may hold the delimiter. */
  readonly lastIsText: boolean;
  readonly readable: boolean;
  readonly messages: readonly Message[];
}

/** The delimiter asked for, or the one under which most cells of a header spell a role. */
export function chooseDelimiter(line: string, options: DelimitedOptions): string {
  const { delimiter: wanted } = options;
  if (wanted !== undefined) return Object.hasOwn(DELIMITERS, wanted) ? DELIMITERS[wanted]! : wanted;
  if (options.header === false) return mostFrequentDelimiter(line);
  const known = (delimiter: string): number =>
    (splitCells(line, delimiter) ?? []).filter((cell) => spellsRole(cell, options)).length;
  const marks = Object.values(DELIMITERS).filter((delimiter) => delimiter !== DELIMITERS.blanks);
  const best = marks.reduce((first, next) => (known(next) > known(first) ? next : first));
  // Names of columns may hold blanks: they part columns only where nothing else does.
  const parted = (splitCells(line, best) ?? []).length > 2;
  return parted || known(' ') <= known(best) ? best : ' ';
}

/** Without names of columns the delimiter that cuts the line into most cells; blanks only when no other cuts it. */
function mostFrequentDelimiter(line: string): string {
  const cuts = (delimiter: string): number => splitCells(line, delimiter)?.length ?? 0;
  const marks = [',', ';', '\t', '|'].reduce((best, next) => (cuts(next) > cuts(best) ? next : best));
  return cuts(marks) > 2 ? marks : ' ';
}

const spellsRole = (cell: string, { columns }: DelimitedOptions): boolean =>
  roleOfHeader(cell) !== null || Object.values(columns ?? {}).includes(cell);

/** Whether cells are names of columns, not data: none is a number or a time, and more than half spell a role. */
export function looksLikeHeader(cells: readonly string[], options: DelimitedOptions): boolean {
  const filled = cells.filter((cell) => cell !== '');
  const roles = filled.filter((cell) => spellsRole(cell, options)).length;
  return roles >= 2 && 2 * roles > filled.length && filled.every(isNoValue);
}

const isNoValue = (cell: string): boolean =>
  parseNumber(cell) === null && parseIsoTime(cell).kind === 'invalid';

/** Why nothing in a first line is the name of a column. */
export function describeHeaderless(
  line: string,
  { required, requiredOneOf, columns }: DelimitedOptions,
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
  const groups = (requiredOneOf ?? []).map(({ roles }) => roles[0]!);
  const names = [...groups, ...required].map((role) => String(columns?.[role] ?? role));
  return tell(
    'no-header',
    `Expected a header that names the columns ${quotedList(names)}, came ${quoted(line)}. Write the names of the columns into the first line.`,
  );
}
