import { forEachLine } from './byteChunks.js';
import { splitCells } from './cells.js';
import type { DelimitedOptions } from './header.js';

/** So many lines are looked at. */
const MOST_LINES = 200;

/** Where so many of the rows end with the description, it holds the delimiter in those that have more cells. */
const SHARE_WITHOUT_DELIMITER = 0.2;

/**
 * How many cells the rows of a log without a header have. The first row alone does not tell: its description may be
 * missing or hold the delimiter. It is what most of the first rows have; but if any of them reach the last column that
 * the layout numbers, no fewer than that, and no more if that is the description.
 * @param bytes whole lines in UTF-8 from the first row on
 * @param isRow whether a line is none of blank and comment
 */
export function numberedWidth(
  bytes: Buffer,
  isRow: (start: number, end: number) => boolean,
  delimiter: string,
  { columns }: DelimitedOptions,
): number {
  const counts = new Map<number, number>();
  let lines = 0;
  forEachLine(bytes, (start, end) => {
    if (lines >= MOST_LINES || !isRow(start, end)) return;
    const cells = splitCells(bytes.toString('utf8', start, end), delimiter);
    if (cells === null) return;
    lines += 1;
    counts.set(cells.length, (counts.get(cells.length) ?? 0) + 1);
  });
  const widths = [...counts.keys()];
  const last = Math.max(...Object.values(columns ?? {}).filter((column) => typeof column === 'number'));
  const described = columns?.description === last;
  if (described && (counts.get(last) ?? 0) > SHARE_WITHOUT_DELIMITER * lines) return last;
  const [usual = 0] = widths.sort((a, b) => counts.get(b)! - counts.get(a)! || b - a);
  return usual < last && widths.some((width) => width >= last) ? last : usual;
}
