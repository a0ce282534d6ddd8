import { ByteCells } from './byteCells.js';
import { forEachLine, type LineChunk, LONGEST_LINE_BYTES } from './byteChunks.js';
import { DELIMITERS, splitCells } from './cells.js';
import { fittedCells } from './fittedCells.js';
import { chooseDelimiter, type DelimitedHeader, type DelimitedOptions, looksLikeHeader } from './header.js';
import { type Message, message } from './messages.js';
import { numberedWidth } from './numberedWidth.js';
import { type RowCells, TextCells } from './rowCells.js';
import { understandHeader, understandNumberedColumns } from './understandHeader.js';

/** Takes what a reader finds in a file, line by line. Cells are valid only during the call. */
export interface RowSink {
  readonly header: (header: DelimitedHeader) => void;
  readonly row: (row: number, cells: RowCells) => void;
  /** A row whose line cannot be cut into the columns of the header. */
  readonly fault: (row: number, fault: string) => void;
  readonly message: (message: Message) => void;
}

const NO_HEADER = 'the header above this row was not understood';

/**
 * Cuts the lines of a delimited file into rows. Blank lines, comments, skipped lines and headers are no rows. A header
 * that comes again further down with other columns (joined files) holds from there on, and this is told. When a header
 * cannot be understood every line below it is a faulty row, so that the account adds up.
 *
 * Plain lines are read straight from their bytes; quotes, blanks as delimiter, other decimal marks and everything odd go
 * through text. Both give the same cells.
 */
export class RowReader {
  readonly #comment: Buffer;
  #row = 0;
  #header: DelimitedHeader | null = null;
  #headerLine = '';
  #delimiter = ',';
  /** Where a number stands in every ordinary row: cheaper to look at than the whole line. */
  #numberAt = -1;
  #bytes: ByteCells | null = null;
  #toldEncoding = false;
  /** The first row and what follows it, as far as it is there yet. */
  #ahead: Buffer = Buffer.alloc(0);

  /** @param file name of the file in messages */
  constructor(
    readonly file: string,
    readonly options: DelimitedOptions,
    readonly sink: RowSink,
  ) {
    this.#comment = Buffer.from(options.comment ?? '#');
  }

  /** The file has had a header under which rows can be read. */
  get understood(): boolean {
    return this.#header?.readable ?? false;
  }

  take({ bytes, unterminated }: LineChunk): void {
    const skip = this.options.skipLines ?? 0;
    forEachLine(bytes, (start, end) => {
      this.#row += 1;
      if (this.#row <= skip || start === end || this.#isComment(bytes, start, end)) return;
      if (end - start > LONGEST_LINE_BYTES) {
        this.#odd(`the line has more than ${LONGEST_LINE_BYTES} characters`);
        return;
      }
      if (this.#bytes !== null && this.#takePlain(this.#bytes, bytes, start, end)) return;
      const cutOff = unterminated && end === bytes.length;
      if (this.#header === null) this.#ahead = bytes.subarray(start);
      this.#takeText(bytes.toString('utf8', start, end), cutOff);
    });
    if (this.#bytes?.sawInvalid) this.#tellEncoding();
  }

  #isComment(bytes: Buffer, start: number, end: number): boolean {
    const comment = this.#comment;
    if (comment.length === 0 || bytes[start] !== comment[0] || end - start < comment.length) return false;
    return comment.equals(bytes.subarray(start, start + comment.length));
  }

  /** True when the line was a plain data row and was passed on. */
  #takePlain(cells: ByteCells, bytes: Buffer, start: number, end: number): boolean {
    const count = cells.split(bytes, start, end);
    if (count < this.#header!.namedWidth || !cells.startsLikeNumber(this.#numberAt)) return false;
    this.sink.row(this.#row, cells);
    return true;
  }

  #takeText(line: string, cutOff: boolean): void {
    if (line.trim() === '') return;
    const header = this.#header;
    if (header === null) {
      this.#begin(line);
      return;
    }
    if (line === this.#headerLine && header.positions.size > 0) return;
    const delimiter = header.positions.size > 0 ? this.#delimiter : chooseDelimiter(line, this.options);
    const cells = splitCells(line, delimiter);
    if (cells !== null && !startsLikeNumber(cells[this.#numberAt]) && looksLikeHeader(cells, this.options)) {
      this.#again(line);
      return;
    }
    if (line.includes('\ufffd')) this.#tellEncoding();
    this.#data(line, cells, header, cutOff);
  }

  /** The first line: a header, or data whose columns the layout gives by number. */
  #begin(line: string): void {
    const { options, file } = this;
    this.#delimiter = chooseDelimiter(line, options);
    if (isNumbered(options)) {
      this.#beginNumbered(line, splitCells(line, this.#delimiter));
      return;
    }
    this.#accept(understandHeader(line, this.#delimiter, this.#row, file, options), line);
    // A first line without any name of a column is data without a header, so it counts as a row.
    if (this.#header!.positions.size === 0) this.sink.fault(this.#row, NO_HEADER);
  }

  /** The first line where the layout gives columns by number: names of columns, which are not asked, or data. */
  #beginNumbered(line: string, cells: string[] | null): void {
    const { options, file } = this;
    const named = cells !== null && options.header !== false && !cells.some(startsLikeNumber);
    const width = named ? cells.length : this.#widthAhead();
    this.#accept(understandNumberedColumns(width, this.#row, file, options), named ? line : '');
    if (!named) this.#data(line, cells, this.#header!, false);
  }

  #widthAhead(): number {
    const ahead = this.#ahead;
    const isRow = (start: number, end: number): boolean =>
      end - start <= LONGEST_LINE_BYTES &&
      !this.#isComment(ahead, start, end) &&
      ahead.toString('utf8', start, end).trim() !== '';
    return numberedWidth(ahead, isRow, this.#delimiter, this.options);
  }

  /** A header further down: the same columns again, or other ones. */
  #again(line: string): void {
    const before = this.#header!;
    const delimiter = chooseDelimiter(line, this.options);
    const next = understandHeader(line, delimiter, this.#row, this.file, this.options);
    if (before.positions.size > 0 && sameColumns(next, before)) return;
    this.#delimiter = delimiter;
    this.sink.message(
      message(
        'warning',
        'changed-header',
        'Expected rows under the first header, came a header with other columns: the rows below it are read by it. Check that this file was joined on purpose.',
        { file: this.file, row: this.#row },
      ),
    );
    this.#accept(next, line);
  }

  #accept(header: DelimitedHeader, line: string): void {
    const { options } = this;
    this.#header = header;
    this.#headerLine = line;
    this.#numberAt = header.positions.get(options.required.at(-1)!) ?? -1;
    const plain =
      header.readable &&
      this.#numberAt >= 0 &&
      this.#delimiter !== DELIMITERS.blanks &&
      this.#delimiter.length === 1 &&
      this.#delimiter.charCodeAt(0) < 128 &&
      (options.decimal ?? '.') === '.';
    this.#bytes = plain ? new ByteCells(this.#delimiter.charCodeAt(0), header.width) : null;
    for (const told of header.messages) this.sink.message(told);
    this.sink.header(header);
  }

  #data(line: string, cells: string[] | null, header: DelimitedHeader, cutOff: boolean): void {
    const fitted = header.readable ? fittedCells(line, cells, header, this.#delimiter, cutOff) : NO_HEADER;
    if (typeof fitted === 'string') this.sink.fault(this.#row, fitted);
    else this.sink.row(this.#row, new TextCells(fitted, this.options.decimal));
  }

  /** A line that is no text of a log: a row that cannot be read, or the whole file where a header is expected. */
  #odd(fault: string): void {
    if (this.#header === null && !isNumbered(this.options)) this.#begin('\u0000');
    else this.sink.fault(this.#row, fault);
  }

  #tellEncoding(): void {
    if (this.#toldEncoding || this.#header === null || this.#header.positions.size === 0) return;
    this.#toldEncoding = true;
    this.sink.message(
      message(
        'warning',
        'not-utf8',
        'Expected text in UTF-8, came bytes that are not: letters are lost, and a name that holds one may match no mark or the wrong one. Save the file as UTF-8 or state its encoding in the layout.',
        { file: this.file, row: this.#row },
      ),
    );
  }
}

const startsLikeNumber = (cell: string | undefined): boolean => cell !== undefined && /^[-+.\d]/.test(cell);

/** Whether columns are given by number, so that no header is asked. */
const isNumbered = ({ header, columns }: DelimitedOptions): boolean => {
  const given = Object.values(columns ?? {});
  return header === false || (given.length > 0 && given.every((column) => typeof column === 'number'));
};

function sameColumns(a: DelimitedHeader, b: DelimitedHeader): boolean {
  return (
    a.width === b.width &&
    a.positions.size === b.positions.size &&
    [...a.positions].every(([role, index]) => b.positions.get(role) === index)
  );
}
