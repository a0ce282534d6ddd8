import type { ColumnTable } from 'arquero';
import { inputError } from '../logs/index.js';

/** Errors as they come from `computeErrors`, or any arquero table or array of records with the needed columns. */
export type ErrorsInput = ColumnTable | readonly object[];

/** Reads columns out of a table or an array of records, and says which option asked for one that is missing. */
export interface ErrorColumns {
  readonly length: number;
  readonly has: (name: string) => boolean;
  /** @throws InputError when the column is missing */
  readonly numbers: (name: string, neededFor: string) => Float64Array;
  /** @throws InputError when the column is missing */
  readonly texts: (name: string, neededFor: string) => string[];
}

/** @param input columns that were taken out before are given back */
export function errorColumns(input: ErrorsInput | ErrorColumns): ErrorColumns {
  if (isColumns(input)) return input;
  const source = isTable(input) ? tableSource(input) : recordSource(input);
  const column = (name: string, neededFor: string): ArrayLike<unknown> => {
    if (source.length === 0) return [];
    const values = source.column(name);
    if (values !== null) return values;
    throw inputError(
      'missing-column',
      `Expected a column "${name}" in the errors, needed for ${neededFor}, came ${source
        .names()
        .map((known) => JSON.stringify(known))
        .join(', ')}. Add the column or change the option.`,
    );
  };
  return {
    length: source.length,
    has: (name) => source.length > 0 && source.names().includes(name),
    numbers: (name, neededFor) => {
      const values = column(name, neededFor);
      // A plain loop: Float64Array.from takes many times as long.
      const numbers = new Float64Array(values.length);
      for (let i = 0; i < numbers.length; i++) numbers[i] = Number(values[i]);
      return numbers;
    },
    texts: (name, neededFor) => {
      const values = column(name, neededFor);
      const texts: string[] = [];
      for (let i = 0; i < values.length; i++) texts.push(String(values[i]));
      return texts;
    },
  };
}

interface Source {
  readonly length: number;
  readonly names: () => string[];
  readonly column: (name: string) => ArrayLike<unknown> | null;
}

/** The same columns, each of them read once only: for many looks at a long table. What they give is not to be changed. */
export function heldColumns(columns: ErrorColumns): ErrorColumns {
  const numbers = new Map<string, Float64Array>();
  const texts = new Map<string, string[]>();
  return {
    ...columns,
    numbers: (name, neededFor) => {
      const held = numbers.get(name) ?? columns.numbers(name, neededFor);
      numbers.set(name, held);
      return held;
    },
    texts: (name, neededFor) => {
      const held = texts.get(name) ?? columns.texts(name, neededFor);
      texts.set(name, held);
      return held;
    },
  };
}

const isColumns = (input: ErrorsInput | ErrorColumns): input is ErrorColumns =>
  typeof (input as Partial<ErrorColumns>).texts === 'function';

const isTable = (input: ErrorsInput): input is ColumnTable =>
  typeof (input as { numRows?: unknown }).numRows === 'function';

function tableSource(table: ColumnTable): Source {
  return {
    length: table.numRows(),
    names: () => table.columnNames(),
    column: (name) => (table.columnIndex(name) < 0 ? null : (table.array(name) as ArrayLike<unknown>)),
  };
}

function recordSource(records: readonly object[]): Source {
  return {
    length: records.length,
    names: () => Object.keys(records[0]!),
    column: (name) =>
      name in records[0]! ? records.map((record) => (record as Record<string, unknown>)[name]) : null,
  };
}
