import { parseNumber } from './numbers.js';
import type { ColumnRole } from './roles.js';

/** The cells of one data row by index, from 0. An index below 0 or beyond the row is a blank cell. */
export interface RowCells {
  /** Text of a cell, trimmed. */
  readonly text: (index: number) => string;
  /** The same for a cell whose text hardly ever comes twice, such as a time: it is not remembered. */
  readonly uniqueText: (index: number) => string;
  /** Number of a cell: NaN when blank, null when it is no plain number. */
  readonly number: (index: number) => number | null;
}

/** Text of a role in a row: its cell, or the constant where the cell is blank or there is no column. */
export type TextOf = (role: ColumnRole, cells: RowCells) => string;

/** How numbers are written: the decimal mark, a point or one other character. */
export type DecimalMark = string;

/** Cells that were cut out of a line of text. */
export class TextCells implements RowCells {
  constructor(
    readonly cells: readonly string[],
    readonly decimal: DecimalMark = '.',
  ) {}

  text(index: number): string {
    return this.cells[index] ?? '';
  }

  uniqueText(index: number): string {
    return this.text(index);
  }

  number(index: number): number | null {
    const cell = this.text(index);
    if (this.decimal === '.') return parseNumber(cell);
    // With another mark a point would be a thousands separator or a slip: neither is guessed.
    if (cell.includes('.')) return null;
    return parseNumber(cell.replace(this.decimal, '.'));
  }
}
