import { parseNumber } from './numbers.js';
import type { RowCells } from './rowCells.js';

const [BLANK, TAB, QUOTE, ZERO, NINE, POINT, PLUS, MINUS] = [0x20, 0x09, 0x22, 0x30, 0x39, 0x2e, 0x2b, 0x2d];
/** Powers of ten that a double holds exactly. */
const POWERS = Array.from({ length: 23 }, (_, k) => 10 ** k);
/** Digits whose integer value a double holds exactly. */
const EXACT_DIGITS = 15;
const MOST_REMEMBERED = 4096;

/**
 * Cells read straight from the bytes of a line: the fast way for plain rows (one-byte delimiter, decimal point, no
 * quotes). It gives what {@link TextCells} gives for the same line; `split` says when a line is not plain.
 */
export class ByteCells implements RowCells {
  readonly #starts: Int32Array;
  readonly #ends: Int32Array;
  /** Texts seen lately, by length and bytes: names of marks and crews come back a million times. */
  readonly #texts = new Map<number, { bytes: Buffer; text: string }>();
  #bytes: Buffer = Buffer.alloc(0);
  #count = 0;
  /** A cell held bytes that are no UTF-8. */
  sawInvalid = false;

  /**
   * @param delimiter code of the delimiter, below 128
   * @param width most cells of a row; a line with more is not plain
   */
  constructor(
    readonly delimiter: number,
    readonly width: number,
  ) {
    this.#starts = new Int32Array(width + 1);
    this.#ends = new Int32Array(width + 1);
  }

  /** Cuts the line from `start` to `end`; the number of cells, or -1 when the general reader must take the line. */
  split(bytes: Buffer, start: number, end: number): number {
    this.#bytes = bytes;
    const { delimiter, width } = this;
    const starts = this.#starts;
    const ends = this.#ends;
    let count = 0;
    let from = start;
    for (let at = start; at <= end; at++) {
      const byte = at === end ? delimiter : bytes[at]!;
      if (byte !== delimiter) {
        // Quotes and control characters other than a tab need the general reader.
        if (byte === QUOTE || (byte < BLANK && byte !== TAB)) return -1;
        continue;
      }
      if (count >= width) return -1;
      let to = at;
      while (from < to && isBlank(bytes[from]!)) from++;
      while (to > from && isBlank(bytes[to - 1]!)) to--;
      starts[count] = from;
      ends[count] = to;
      count++;
      from = at + 1;
    }
    this.#count = count;
    return count;
  }

  /** Whether a cell begins as a number does; so do no names of columns. */
  startsLikeNumber(index: number): boolean {
    if (index < 0 || index >= this.#count) return false;
    const byte = this.#bytes[this.#starts[index]!]!;
    if (this.#starts[index] === this.#ends[index]) return false;
    return (byte >= ZERO && byte <= NINE) || byte === POINT || byte === MINUS || byte === PLUS;
  }

  text(index: number): string {
    if (index < 0 || index >= this.#count) return '';
    const [start, end] = [this.#starts[index]!, this.#ends[index]!];
    if (start === end) return '';
    return this.#remembered(start, end);
  }

  uniqueText(index: number): string {
    if (index < 0 || index >= this.#count) return '';
    return this.#bytes.toString('utf8', this.#starts[index]!, this.#ends[index]!).trim();
  }

  number(index: number): number | null {
    if (index < 0 || index >= this.#count) return Number.NaN;
    const bytes = this.#bytes;
    const end = this.#ends[index]!;
    let at = this.#starts[index]!;
    if (at === end) return Number.NaN;
    const first = bytes[at]!;
    const negative = first === MINUS;
    if (negative || first === PLUS) at++;
    let value = 0;
    let digits = 0;
    let decimals = -1;
    for (; at < end; at++) {
      const byte = bytes[at]!;
      if (byte >= ZERO && byte <= NINE) {
        value = value * 10 + (byte - ZERO);
        if (value > 0) digits++;
        if (decimals >= 0) decimals++;
      } else if (byte === POINT && decimals < 0) decimals = 0;
      else return this.#slowNumber(index);
    }
    if (digits > EXACT_DIGITS || decimals >= POWERS.length) return this.#slowNumber(index);
    if (digits === 0 && value === 0 && !hasDigit(bytes, this.#starts[index]!, end)) return null;
    // An exact integer over an exact power of ten is rounded once, as Number() rounds.
    const size = decimals > 0 ? value / POWERS[decimals]! : value;
    return negative ? -size : size;
  }

  #slowNumber(index: number): number | null {
    return parseNumber(this.#bytes.toString('utf8', this.#starts[index]!, this.#ends[index]!));
  }

  #remembered(start: number, end: number): string {
    const bytes = this.#bytes;
    let hash = end - start;
    for (let at = start; at < end; at++) hash = (Math.imul(hash, 31) + bytes[at]!) | 0;
    const known = this.#texts.get(hash);
    if (known !== undefined && sameBytes(known.bytes, bytes, start, end)) return known.text;
    const own = Buffer.from(bytes.subarray(start, end));
    const text = own.toString('utf8').trim();
    if (text.includes('\ufffd')) this.sawInvalid = true;
    if (this.#texts.size >= MOST_REMEMBERED) this.#texts.clear();
    this.#texts.set(hash, { bytes: own, text });
    return text;
  }
}

const isBlank = (byte: number): boolean => byte === BLANK || byte === TAB;

function hasDigit(bytes: Buffer, start: number, end: number): boolean {
  for (let at = start; at < end; at++) if (bytes[at]! >= ZERO && bytes[at]! <= NINE) return true;
  return false;
}

function sameBytes(own: Buffer, bytes: Buffer, start: number, end: number): boolean {
  if (own.length !== end - start) return false;
  for (let k = 0; k < own.length; k++) if (own[k] !== bytes[start + k]) return false;
  return true;
}
