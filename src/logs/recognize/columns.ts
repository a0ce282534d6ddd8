import { quoted } from '../messages.js';
import { cellNumber } from './cellKinds.js';
import type { Sheet } from './sheet.js';

/** A column of a sheet: its name and what its cells are like. */
export interface Column {
  /** From 0. */
  readonly index: number;
  /** As in the header or in a comment; empty without one. */
  readonly name: string;
  /** For sentences: the name in quotes, or the number. */
  readonly label: string;
  /** For a layout: the name where the file has it once, else the number from 1. */
  readonly reference: string | number;
  /** Cells that are not blank, in order. */
  readonly texts: readonly string[];
  /** The same as numbers when (nearly) all are numbers; null otherwise. */
  readonly numbers: readonly number[] | null;
  /** Most decimals of a number. */
  readonly decimals: number;
  /** Of absolute values. */
  readonly median: number;
  readonly least: number;
  readonly greatest: number;
  readonly distinct: number;
}

/** A stray word does not make a column of words. */
const NUMBER_SHARE = 0.9;

/** The columns of a sheet whose numbers have this decimal mark. */
export function sheetColumns(sheet: Sheet, decimal: '.' | ','): readonly Column[] {
  const names = sheet.header?.cells ?? sheet.looseNames ?? [];
  // Longer rows end in descriptions that hold the delimiter: the usual width counts.
  const width = Math.max(names.length, sheet.cut.width);
  return Array.from({ length: width }, (_, index) => {
    const name = names[index] ?? '';
    const once = name !== '' && names.filter((other) => other === name).length === 1;
    const texts = sheet.rows.map(({ cells }) => cells[index] ?? '').filter((cell) => cell !== '');
    return {
      index,
      name,
      label: name === '' ? `column ${index + 1}` : `column ${quoted(name)}`,
      reference: once && sheet.header !== null ? name : index + 1,
      texts,
      ...numberFacts(texts, decimal),
      distinct: new Set(texts).size,
    };
  });
}

function numberFacts(
  texts: readonly string[],
  decimal: '.' | ',',
): Pick<Column, 'numbers' | 'decimals' | 'median' | 'least' | 'greatest'> {
  const values = texts.map((text) => cellNumber(text, decimal));
  const numbers = values.filter((value) => !Number.isNaN(value));
  if (numbers.length === 0 || numbers.length < NUMBER_SHARE * texts.length) {
    return { numbers: null, decimals: 0, median: Number.NaN, least: Number.NaN, greatest: Number.NaN };
  }
  const sizes = numbers.map(Math.abs).sort((a, b) => a - b);
  const decimals = texts.reduce((most, text) => Math.max(most, text.split(decimal)[1]?.length ?? 0), 0);
  const sorted = [...numbers].sort((a, b) => a - b);
  return {
    numbers,
    decimals,
    median: sizes[sizes.length >> 1]!,
    least: sorted[0]!,
    greatest: sorted.at(-1)!,
  };
}

/** Whole numbers without a decimal mark. */
export const isInteger = ({ numbers, decimals }: Column): boolean => numbers !== null && decimals === 0;
