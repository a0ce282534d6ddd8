import { DELIMITERS } from './cells.js';
import type { DelimitedHeader } from './header.js';

/** The cells of a data line in the columns of the header, or what is wrong with it. */
export function fittedCells(
  line: string,
  cells: string[] | null,
  header: DelimitedHeader,
  delimiter: string,
  cutOff: boolean,
): readonly string[] | string {
  if (line.includes('\u0000')) return 'the line holds zero bytes, which text does not';
  if (cells === null) return 'a quote does not close in this line, or text follows a closing quote';
  const { width, namedWidth, leastWidth, lastIsText } = header;
  while (cells.length > width && cells.at(-1) === '') cells.pop();
  if (cells.length > width && lastIsText) {
    // A description may hold the delimiter: what is left of the line belongs to it.
    return [...cells.slice(0, width - 1), restOf(line, cells, width - 1, delimiter)];
  }
  if (cells.length >= namedWidth && cells.length <= width) return cells;
  // Controllers leave out blank cells at the end; a line that was cut off may end inside a number instead.
  if (cells.length >= leastWidth && cells.length < namedWidth && !cutOff) return cells;
  const split =
    cells.length > width && delimiter === ',' ? ' (does a decimal comma cut numbers in two?)' : '';
  return `expected ${width} cells as in the header, came ${cells.length}${split}`;
}

/** What is left of a line from a cell on: as it is written where nothing is quoted, so that blanks stay. */
function restOf(line: string, cells: readonly string[], from: number, delimiter: string): string {
  if (delimiter === DELIMITERS.blanks || line.includes('"')) return cells.slice(from).join(delimiter);
  return line.split(delimiter).slice(from).join(delimiter).trim();
}
