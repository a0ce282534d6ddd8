import { splitCells } from './cells.js';
import {
  chooseDelimiter,
  type DelimitedHeader,
  type DelimitedOptions,
  looksLikeHeader,
  understandHeader,
} from './header.js';
import { LONGEST_LINE, readLines } from './lines.js';
import { InputError, inputError, type Message, message } from './messages.js';

/** A data line and its cells; null cells when the line cannot be cut into the columns of the header. */
export interface DelimitedRow {
  readonly row: number;
  readonly cells: readonly string[] | null;
  /** Why there are no cells. */
  readonly fault: string;
}

/** Rows under one header. */
export interface DelimitedBatch {
  readonly header: DelimitedHeader;
  readonly rows: readonly DelimitedRow[];
  /** What is new to tell, of the header and of the file as a whole. */
  readonly messages: readonly Message[];
}

/**
 * The data rows of a delimited text file as a stream of batches. Blank lines, comments and headers are no rows. A
 * header that comes again further down with other columns (joined files) holds from there on, and this is told. When a
 * header cannot be understood every line below it is a row without cells, so that the account adds up.
 * @param file name of the file in messages
 */
export async function* readDelimited(
  path: string,
  file: string,
  options: DelimitedOptions,
): AsyncGenerator<DelimitedBatch> {
  const reader = new DelimitedReader(file, options);
  for await (const { firstLine, lines } of readLines(path)) {
    for (let i = 0; i < lines.length; i++) {
      const done = reader.take(lines[i]!, firstLine + i);
      if (done !== null) yield done;
    }
    const batch = reader.batch();
    if (batch !== null) yield batch;
  }
}

class DelimitedReader {
  readonly #comment: string;
  #header: DelimitedHeader | null = null;
  #headerLine = '';
  #delimiter = ',';
  /** Where a number stands in every ordinary row: cheaper to look at than the whole line. */
  #numberAt = -1;
  #rows: DelimitedRow[] = [];
  #messages: Message[] = [];
  #toldEncoding = false;

  constructor(
    readonly file: string,
    readonly options: DelimitedOptions,
  ) {
    this.#comment = options.comment ?? '#';
  }

  /** Takes one line; gives back the rows so far when the line is a header that changes the columns. */
  take(line: string, row: number): DelimitedBatch | null {
    if (line.trim() === '' || line.startsWith(this.#comment)) return null;
    const header = this.#header;
    if (header === null) {
      this.#begin(line, row);
      this.#messages.push(...this.#header!.messages);
      // A first line without any name of a column is data without a header, so it counts as a row.
      if (this.#header!.positions.size === 0) this.#rows.push(unreadable(row, NO_HEADER));
      return null;
    }
    if (header.positions.size === 0) {
      const cells = splitCells(line, chooseDelimiter(line, this.options));
      if (cells !== null && looksLikeHeader(cells, this.options)) return this.#change(line, row);
    } else if (line === this.#headerLine) return null;
    const cells = splitCells(line, this.#delimiter);
    if (cells !== null && !startsLikeNumber(cells[this.#numberAt]) && looksLikeHeader(cells, this.options)) {
      const next = understandHeader(line, this.#delimiter, row, this.file, this.options);
      return sameColumns(next, header) ? null : this.#change(line, row);
    }
    this.#tellEncoding(line, row);
    this.#rows.push(
      header.readable ? dataRow(line, cells, row, header, this.#delimiter) : unreadable(row, NO_HEADER),
    );
    return null;
  }

  /** The rows and messages since the last batch; null before the first header. */
  batch(): DelimitedBatch | null {
    if (this.#header === null) return null;
    const batch = { header: this.#header, rows: this.#rows, messages: this.#messages };
    this.#rows = [];
    this.#messages = [];
    return batch;
  }

  #begin(line: string, row: number): void {
    this.#delimiter = chooseDelimiter(line, this.options);
    this.#header = understandHeader(line, this.#delimiter, row, this.file, this.options);
    this.#headerLine = line;
    this.#numberAt = this.#header.positions.get(this.options.required.at(-1)!) ?? -1;
  }

  #change(line: string, row: number): DelimitedBatch | null {
    const before = this.batch();
    this.#begin(line, row);
    this.#messages.push(
      message(
        'warning',
        'changed-header',
        'Expected rows under the first header, came a header with other columns: the rows below it are read by it. Check that this file was joined on purpose.',
        { file: this.file, row },
      ),
      ...this.#header!.messages,
    );
    return before;
  }

  #tellEncoding(line: string, row: number): void {
    if (this.#toldEncoding || this.#header!.positions.size === 0 || !line.includes('\ufffd')) return;
    this.#toldEncoding = true;
    this.#messages.push(
      message(
        'warning',
        'not-utf8',
        'Expected text in UTF-8, came bytes that are not: letters are lost, and a name that holds one may match no mark or the wrong one. Save the file as UTF-8.',
        { file: this.file, row },
      ),
    );
  }
}

const NO_HEADER = 'the header above this row was not understood';

const unreadable = (row: number, fault: string): DelimitedRow => ({ row, cells: null, fault });

const startsLikeNumber = (cell: string | undefined): boolean => cell !== undefined && /^[-+.\d]/.test(cell);

function sameColumns(a: DelimitedHeader, b: DelimitedHeader): boolean {
  return (
    a.width === b.width &&
    a.positions.size === b.positions.size &&
    [...a.positions].every(([role, index]) => b.positions.get(role) === index)
  );
}

function dataRow(
  line: string,
  cells: string[] | null,
  row: number,
  header: DelimitedHeader,
  delimiter: string,
): DelimitedRow {
  if (line.length > LONGEST_LINE) return unreadable(row, `the line has more than ${LONGEST_LINE} characters`);
  if (line.includes('\u0000')) return unreadable(row, 'the line holds zero bytes, which text does not');
  if (cells === null) {
    return unreadable(row, 'a quote does not close in this line, or text follows a closing quote');
  }
  const { width, namedWidth } = header;
  while (cells.length > width && cells.at(-1) === '') cells.pop();
  if (cells.length >= namedWidth && cells.length <= width) return { row, cells, fault: '' };
  const split =
    cells.length > width && delimiter === ',' ? ' (does a decimal comma cut numbers in two?)' : '';
  return unreadable(row, `expected ${width} cells as in the header, came ${cells.length}${split}`);
}

/** A whole delimited file in memory, for marks and bases; throws InputError when its header is not understood. */
export async function readDelimitedTable(
  path: string,
  file: string,
  options: DelimitedOptions,
): Promise<{ header: DelimitedHeader; rows: DelimitedRow[]; messages: Message[] }> {
  let header: DelimitedHeader | null = null;
  const rows: DelimitedRow[] = [];
  const messages: Message[] = [];
  for await (const batch of readDelimited(path, file, options)) {
    if (header !== null && batch.header !== header && header.readable) {
      const { row } = batch.messages[0]!;
      throw inputError(
        'changed-header',
        'Expected one header, came a second one with other columns. Give the rows below it a file of their own.',
        { file, row: row! },
      );
    }
    header ??= batch.header;
    rows.push(...batch.rows);
    messages.push(...batch.messages);
  }
  if (header === null) {
    throw inputError(
      'empty-file',
      `Expected a header and at least one row, came an empty file. Fill it in.`,
      { file },
    );
  }
  if (!header.readable) throw new InputError(header.messages.filter(({ severity }) => severity === 'error'));
  return { header, rows, messages };
}
