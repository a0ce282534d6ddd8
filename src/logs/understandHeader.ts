import { splitCells } from './cells.js';
import { type DelimitedHeader, type DelimitedOptions, describeHeaderless } from './header.js';
import { type Message, message, quoted, quotedList } from './messages.js';
import { suggestion } from './nearestName.js';
import { COLUMN_ROLES, type ColumnRole, roleOfHeader } from './roles.js';

/** Where the columns of a file stand while its header is read. */
class Columns {
  readonly positions = new Map<ColumnRole, number>();
  readonly headers = new Map<ColumnRole, string>();
  readonly messages: Message[] = [];

  constructor(
    readonly file: string,
    readonly row: number,
    readonly options: DelimitedOptions,
  ) {}

  error(code: string, text: string, column: string): void {
    this.messages.push(message('error', code, text, { file: this.file, row: this.row, column }));
  }

  found(role: ColumnRole, index: number, name: string): void {
    const before = this.headers.get(role);
    if (before !== undefined) {
      const text = `Two columns, ${quoted(before)} and ${quoted(name)}, have the role ${role}. Rename the one that is not meant.`;
      this.error('repeated-column', text, name);
      return;
    }
    this.positions.set(role, index);
    this.headers.set(role, name);
  }

  /** Columns that the layout gives by number; the header is not asked. */
  numbered(width: number): void {
    for (const [role, column] of Object.entries(this.options.columns ?? {}) as [ColumnRole, unknown][]) {
      if (typeof column !== 'number') continue;
      if (column <= width) this.found(role, column - 1, `column ${column}`);
      else
        this.error(
          'missing-column',
          `The layout names column ${column} for ${role}, the rows have ${width} cells. Correct the layout.`,
          role,
        );
    }
  }

  /** What is needed and not there. */
  missing(came: readonly string[], ignored: readonly string[]): void {
    const { columns, required, requiredOneOf } = this.options;
    const absent = (role: ColumnRole): boolean => !this.positions.has(role) && columns?.[role] === undefined;
    for (const role of required.filter(absent)) {
      const text = `Expected a column "${role}", came ${quotedList(came)}.${suggestion(role, ignored)} Add the column or name it in the layout.`;
      this.error('missing-column', text, role);
    }
    for (const { what, roles } of requiredOneOf ?? []) {
      if (!roles.every(absent)) continue;
      const near = roles.map((role) => suggestion(role, ignored)).find((text) => text !== '') ?? '';
      const text = `Expected a column for ${what} (${quotedList(roles)}), came ${quotedList(came)}.${near} Add the column or name it in the layout.`;
      this.error('missing-column', text, roles[0]!);
    }
  }

  header(width: number, namedWidth: number): DelimitedHeader {
    const { required, requiredOneOf = [] } = this.options;
    const place = (role: ColumnRole): number => this.positions.get(role) ?? -1;
    // Of several that serve the same purpose the first one does.
    const firstOf = (roles: readonly ColumnRole[]): number =>
      Math.min(...roles.map((role) => this.positions.get(role) ?? Number.POSITIVE_INFINITY));
    const groups = requiredOneOf.map(({ roles }) => firstOf(roles)).filter(Number.isFinite);
    const lastNeeded = Math.max(place('fix'), ...required.map(place), ...groups);
    return {
      positions: this.positions,
      headers: this.headers,
      width,
      namedWidth,
      // One cell more than needed: a needed one at the end of a shortened line might be cut off itself.
      leastWidth: Math.min(lastNeeded + 2, namedWidth),
      lastIsText: this.positions.get('description') === width - 1,
      readable: this.positions.size > 0 && this.messages.every(({ severity }) => severity !== 'error'),
      messages: this.messages,
    };
  }
}

/** Finds the roles in a header; columns that the layout names go before columns that spell a role. */
export function understandHeader(
  line: string,
  delimiter: string,
  row: number,
  file: string,
  options: DelimitedOptions,
): DelimitedHeader {
  const cells = splitCells(line, delimiter) ?? [];
  const columns = new Columns(file, row, options);
  columns.numbered(cells.length);
  const named = new Map(
    (Object.entries(options.columns ?? {}) as [ColumnRole, string | number][]).map(([role, name]) => [
      role,
      String(name),
    ]),
  );
  for (const [role, name] of named) {
    if (columns.positions.has(role)) continue;
    cells.forEach((cell, index) => {
      if (cell === name.trim()) columns.found(role, index, cell);
    });
  }
  const taken = new Set(columns.positions.values());
  const ignored: string[] = [];
  cells.forEach((cell, index) => {
    if (taken.has(index) || cell === '') return;
    const role = roleOfHeader(cell);
    if (role === null || named.has(role)) ignored.push(cell);
    else columns.found(role, index, cell);
  });
  const namedWidth = cells.findLastIndex((cell) => cell !== '') + 1;
  if (columns.positions.size === 0) {
    columns.messages.push(describeHeaderless(line, options)(file, row));
    return columns.header(cells.length, namedWidth);
  }
  for (const [role, name] of named) {
    if (columns.positions.has(role) || typeof options.columns?.[role] === 'number') continue;
    columns.error(
      'missing-column',
      `The layout names a column ${quoted(name)} for ${role}, the file has none.${suggestion(name, cells)} Correct the layout or the header.`,
      name,
    );
  }
  columns.missing(cells, ignored);
  if (ignored.length > 0) columns.messages.push(ignoredMessage(ignored, columns, file, row));
  return columns.header(cells.length, namedWidth);
}

/** Columns of a file without a header, by their numbers in the layout. */
export function understandNumberedColumns(
  width: number,
  row: number,
  file: string,
  options: DelimitedOptions,
): DelimitedHeader {
  const columns = new Columns(file, row, options);
  columns.numbered(width);
  for (const [role, name] of Object.entries(options.columns ?? {})) {
    if (typeof name === 'number') continue;
    columns.error(
      'missing-column',
      `The layout names a column ${quoted(name)} for ${role}, the file has no header. Give the number of the column, from 1.`,
      role,
    );
  }
  columns.missing([`${width} columns without names`], []);
  return columns.header(width, width);
}

function ignoredMessage(ignored: readonly string[], columns: Columns, file: string, row: number): Message {
  const missing = COLUMN_ROLES.filter((role) => !columns.positions.has(role));
  const near = ignored.map((name) => suggestion(name, missing)).find((text) => text !== '') ?? '';
  const remedy = near === '' ? '' : `${near} Correct the header or name the column in the layout if so.`;
  const text = `Columns that are no role are not read: ${quotedList(ignored)}.${remedy}`;
  return message('info', 'ignored-column', text, { file, row, column: ignored[0]! });
}
