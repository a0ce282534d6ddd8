import { DELIMITERS, splitCells } from '../cells.js';
import { roleOfHeader } from '../roles.js';
import { findComment } from './comments.js';
import { type Cut, cutBy, findCut, valueCount } from './delimiter.js';
import { roleOfName } from './headerName.js';
import type { HeadLine } from './headText.js';

/** A row of cells and the line where it stands. */
export interface SheetRow {
  readonly row: number;
  readonly cells: readonly string[];
}

/** The head of a file, cut into rows of cells. */
export interface Sheet {
  readonly cut: Cut;
  /** Mark of comment lines; null when there are none. */
  readonly comment: string | null;
  /** Title lines above header or data, comments not counted among them. */
  readonly titles: readonly HeadLine[];
  /** Lines to pass over so that the titles are not read. */
  readonly skipLines: number;
  /** The header as it stands in the file; null without one. */
  readonly header: SheetRow | null;
  /** Names of columns above the data in a line that cannot be read as a header, such as a comment; null otherwise. */
  readonly looseNames: readonly string[] | null;
  readonly rows: readonly SheetRow[];
}

/** Why there is no sheet. */
export type NoSheet = 'empty' | 'header-alone' | 'no-rows';

/** Cuts lines into a sheet: finds comments, delimiter, titles and header. */
export function cutSheet(lines: readonly HeadLine[]): Sheet | NoSheet {
  const filled = lines.filter(({ text }) => text.trim() !== '');
  if (filled.length === 0) return 'empty';
  const comment = findComment(filled);
  const body = comment === null ? filled : filled.filter(({ text }) => !text.startsWith(comment));
  const cut = findCut(body);
  if (cut === null) return sheetByHeader(body, comment);
  const first = body.findIndex(({ text }) => isData(splitCells(text, cut.character), cut));
  const headerAt = headerAbove(body, first, cut);
  const start = headerAt ?? first;
  const named = headerAt === null ? null : cutLine(body[headerAt]!, cut);
  const looseNames = named === null ? namesAbove(filled, body[first]!, comment, cut) : null;
  return assemble(body, cut, comment, start, named, looseNames);
}

/** A file whose rows hold hardly any values: its header alone shows how it is cut. */
function sheetByHeader(body: readonly HeadLine[], comment: string | null): Sheet | NoSheet {
  for (const [at, { text }] of body.entries()) {
    const names = Object.keys(DELIMITERS).filter(
      (name) => roleCount(splitCells(text, DELIMITERS[name]!)) >= 2,
    );
    const [name] = names.sort(
      (a, b) => roleCount(splitCells(text, DELIMITERS[b]!)) - roleCount(splitCells(text, DELIMITERS[a]!)),
    );
    if (name === undefined) continue;
    if (at === body.length - 1) return 'header-alone';
    const cut = cutBy(name, body);
    return assemble(body, cut, comment, at, cutLine(body[at]!, cut), null);
  }
  return 'no-rows';
}

function assemble(
  body: readonly HeadLine[],
  cut: Cut,
  comment: string | null,
  start: number,
  header: SheetRow | null,
  looseNames: readonly string[] | null,
): Sheet {
  const titles = body.slice(0, start);
  const headerText = header === null ? null : body[start]!.text;
  const rows = body
    .slice(header === null ? start : start + 1)
    .filter(({ text }) => text !== headerText)
    .map((line) => cutLine(line, cut))
    .filter((row) => row !== null);
  const skipLines = titles.length === 0 ? 0 : body[start]!.row - 1;
  return { cut, comment, titles, skipLines, header, looseNames, rows };
}

function cutLine({ row, text }: HeadLine, { character }: Cut): SheetRow | null {
  const cells = splitCells(text, character);
  return cells === null ? null : { row, cells };
}

function isData(cells: readonly string[] | null, { width }: Cut): boolean {
  if (cells === null) return false;
  const values = valueCount(cells);
  return values >= 3 || (values >= 2 && cells.length >= width);
}

const roleCount = (cells: readonly string[] | null): number =>
  cells === null || valueCount(cells) > 0 ? 0 : cells.filter((cell) => roleOfHeader(cell) !== null).length;

/**
 * The line above the data that names its columns: it holds no value and spells two roles, or it stands right above
 * with as many words as the data has columns.
 */
function headerAbove(body: readonly HeadLine[], first: number, cut: Cut): number | null {
  for (let at = first - 1; at >= 0; at--) {
    const cells = splitCells(body[at]!.text, cut.character);
    if (cells !== null && fitsData(cells, cut) && knownNames(cells) >= 2) return at;
  }
  const above = first > 0 ? (splitCells(body[first - 1]!.text, cut.character) ?? []) : [];
  const words = above.filter((cell) => /\p{L}/u.test(cell)).length;
  return words >= 3 && valueCount(above) === 0 && above.length === cut.width ? first - 1 : null;
}

/** Cells between blanks must be as many as in the data: a sentence of a title may hold names of roles too. */
function fitsData(cells: readonly string[], { name, width }: Cut): boolean {
  return valueCount(cells) === 0 && (name !== 'blanks' || cells.length === width);
}

const knownNames = (cells: readonly string[]): number =>
  cells.filter((cell) => roleOfName(cell) !== null).length;

/** Names of columns in the last line above the data that has as many, a comment or not. */
function namesAbove(
  filled: readonly HeadLine[],
  first: HeadLine,
  comment: string | null,
  cut: Cut,
): readonly string[] | null {
  const above = filled.filter(({ row }) => row < first.row).at(-1);
  if (above === undefined) return null;
  const isComment = comment !== null && above.text.startsWith(comment);
  const cells = splitCells(isComment ? above.text.slice(comment.length) : above.text, cut.character);
  if (cells === null || valueCount(cells) > 0 || knownNames(cells) < 2) return null;
  return cells.length === cut.width ? cells : withDateApart(cells, cut);
}

/** Between blanks one name `time` may stand above a date and a time of day. */
function withDateApart(cells: readonly string[], { name, width }: Cut): readonly string[] | null {
  const at = cells.findIndex((cell) => roleOfName(cell) === 'time');
  if (name !== 'blanks' || at < 0 || cells.length !== width - 1) return null;
  const clock = cells[at]!.replace(/[()[\]]/g, ' ').trim();
  return [...cells.slice(0, at), 'date', `timeOfDay (${clock})`, ...cells.slice(at + 1)];
}
