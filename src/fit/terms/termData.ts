import { type ErrorColumns, type ErrorsInput, errorColumns } from '../../errors/index.js';
import { inputError, type Message, message } from '../../logs/index.js';
import { median } from '../../stats/index.js';
import type { FitComponent } from '../forms.js';
import { type FitData, numbersOf, prepareErrors } from '../prepareErrors.js';

/** What may add to, or multiply, the spread beside constant and ppm. */
export type Term = 'height-difference' | 'pdop' | 'reported-sigma';

/** The columns of a model of terms; everything in one order of rows. */
export interface TermDesign {
  readonly y: Float64Array;
  readonly w: Float64Array;
  readonly dayOf: Int32Array;
  readonly dayNames: readonly string[];
  readonly components: number;
  /** Columns whose sum, times parameters, is σ² before multipliers: 1, L², height difference squared. */
  readonly additive: readonly Float64Array[];
  /** Logarithms of a value over its median: σ² is multiplied by exp(2 k z). */
  readonly multipliers: readonly Float64Array[];
}

export interface TermRows {
  readonly design: TermDesign;
  /** The terms that vary, in the order of the parameters after constant and ppm. */
  readonly terms: readonly Term[];
  readonly data: FitData;
  readonly notes: readonly Message[];
}

const METRES_OF_HEIGHT = 100;

/** The column of a term; a reported sigma is that of the plan or of the height. */
function columnOf(term: Term, component: FitComponent): string {
  if (term === 'height-difference') return 'heightDifferenceM';
  if (term === 'pdop') return 'pdop';
  return component === 'vertical' ? 'reportedVerticalMm' : 'reportedHorizontalMm';
}

/**
 * Rows in which every term is known. A term that is the same everywhere is left out, with a note.
 * @throws InputError when a column is missing, or no row knows all terms
 */
export function termRows(
  errors: ErrorsInput,
  component: FitComponent,
  wanted: readonly Term[],
  weights: Float64Array | undefined,
): TermRows {
  const columns = errorColumns(errors);
  const values = new Map(wanted.map((term) => [term, termValues(columns, term, component)]));
  const known = Int32Array.from({ length: columns.length }, (_, i) => i).filter((i) =>
    [...values.values()].every((column) => !Number.isNaN(column[i]!)),
  );
  if (columns.length > 0 && known.length === 0) {
    throw inputError(
      'no-errors',
      `Expected occupations with ${wanted.join(', ')} known, came none of ${columns.length}. Leave out the term or give its column.`,
    );
  }
  const isKnown = new Uint8Array(columns.length);
  for (const row of known) isKnown[row] = 1;
  const kept = weights ?? new Float64Array(columns.length).fill(1);
  const data = prepareErrors(
    errors,
    component,
    kept.map((w, i) => (isKnown[i] ? w : 0)),
  );
  const places = Int32Array.from(data.rows.keys()).filter((k) => isKnown[data.rows[k]!] === 1);
  const rows = places.map((k) => data.rows[k]!);
  const pick = (column: Float64Array): Float64Array => numbersOf(places, (k) => column[k]!);
  const dayNames = [...new Set(data.day)].sort();
  const rank = new Map(dayNames.map((day, d) => [day, d]));
  const notes: Message[] = [];
  const missing = data.rows.length - rows.length;
  if (missing > 0) notes.push(missingNote(missing, wanted));
  const additive = [new Float64Array(rows.length).fill(1), pick(data.l)];
  const multipliers: Float64Array[] = [];
  const terms = [...wanted]
    .sort((a, b) => order(a) - order(b))
    .filter((term) => {
      const column = numbersOf(rows, (row) => values.get(term)![row]!);
      const first = column[0]!;
      if (column.every((value) => value === first)) {
        notes.push(constantTermNote(term));
        return false;
      }
      if (term === 'height-difference') additive.push(column.map((value) => value ** 2));
      else {
        const middle = median(column);
        multipliers.push(column.map((value) => Math.log(value / middle)));
      }
      return true;
    });
  const design: TermDesign = {
    y: pick(data.y),
    w: pick(data.w),
    dayOf: Int32Array.from(places, (k) => rank.get(data.day[k]!)!),
    dayNames,
    components: data.components.length,
    additive,
    multipliers,
  };
  return { design, terms, data, notes };
}

/** Additive terms come before multipliers. */
const order = (term: Term): number => ['height-difference', 'pdop', 'reported-sigma'].indexOf(term);

/** Height difference in hundreds of metres, or the multiplier as it stands; NaN for what is not known. */
function termValues(columns: ErrorColumns, term: Term, component: FitComponent): Float64Array {
  const column = columns.numbers(columnOf(term, component), `term "${term}"`);
  if (term === 'height-difference') return column.map((metres) => Math.abs(metres) / METRES_OF_HEIGHT);
  return column.map((value) => (value > 0 && Number.isFinite(value) ? value : Number.NaN));
}

const missingNote = (missing: number, wanted: readonly Term[]): Message =>
  message(
    'info',
    'term-unknown',
    `${missing} ${missing === 1 ? 'occupation does' : 'occupations do'} not tell ${wanted.join(', ')} and ${missing === 1 ? 'takes' : 'take'} no part in the comparison of terms. The other fits use ${missing === 1 ? 'it' : 'them'}.`,
  );

const constantTermNote = (term: Term): Message =>
  message(
    'warning',
    'term-does-not-vary',
    `The term "${term}" is the same in every occupation: nothing can be said of it. Leave it out.`,
  );
