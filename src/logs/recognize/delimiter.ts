import { DELIMITERS, splitCells } from '../cells.js';
import { hasDecimalComma, isValue } from './cellKinds.js';
import type { HeadLine } from './headText.js';

/** How lines are cut into cells. */
export interface Cut {
  /** Name as in a layout. */
  readonly name: string;
  readonly character: string;
  /** Most frequent number of cells of lines with values. */
  readonly width: number;
  /** Lines with values and this number of cells. */
  readonly agreeing: number;
}

/** In the order in which one is believed: commas and blanks stand in texts and times too. */
const NAMES = ['tab', 'semicolon', 'pipe', 'comma', 'blanks'] as const;
/** A delimiter earlier in the order wins when it cuts at least this share of the lines that the best one cuts. */
const ENOUGH = 0.6;

/** Number of cells that hold values. */
export const valueCount = (cells: readonly string[]): number => cells.filter(isValue).length;

/** The delimiter of the lines, or null when none cuts them into cells with at least two values. */
export function findCut(lines: readonly HeadLine[]): Cut | null {
  const cuts = NAMES.map((name) => cutBy(name, lines)).filter(({ agreeing }) => agreeing > 0);
  if (cuts.length === 0) return null;
  const most = Math.max(...cuts.map(({ agreeing }) => agreeing));
  const good = cuts.filter(({ agreeing }) => agreeing >= ENOUGH * most);
  const blanks = good.find(({ name }) => name === 'blanks');
  if (blanks !== undefined && good[0]!.name === 'comma' && commasAreDecimal(lines)) return blanks;
  return good[0]!;
}

/** A cut by a delimiter that a header has shown already. */
export function cutBy(name: string, lines: readonly HeadLine[]): Cut {
  const character = DELIMITERS[name]!;
  const widths = new Map<number, number>();
  for (const { text } of lines) {
    const cells = splitCells(text, character);
    if (cells === null || valueCount(cells) < 2) continue;
    widths.set(cells.length, (widths.get(cells.length) ?? 0) + 1);
  }
  let [width, agreeing] = [0, 0];
  for (const [cells, count] of widths) {
    if (count > agreeing || (count === agreeing && cells < width)) [width, agreeing] = [cells, count];
  }
  return { name, character, width, agreeing };
}

/** Between blanks stand whole numbers with one comma each: `1 1234,56 5678,90`. */
function commasAreDecimal(lines: readonly HeadLine[]): boolean {
  const withValues = lines.filter(({ text }) => /\d,\d/.test(text));
  const decimal = withValues.filter(({ text }) => {
    const pieces = text.trim().split(/\s+/);
    const commas = pieces.filter((piece) => /\d,/.test(piece) || /,\d/.test(piece));
    return commas.length >= 2 && commas.every(hasDecimalComma);
  });
  return decimal.length > 0.8 * withValues.length;
}
