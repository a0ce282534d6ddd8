import type { LogLengthUnit, LogUnits } from '../layout.js';
import type { Column } from './columns.js';
import type { Draft } from './draft.js';
import { type NamedUnit, unitOfName } from './headerName.js';

const FEET: readonly LogLengthUnit[] = ['international-foot', 'us-survey-foot'];

/** What is known of a unit of length: one, a foot of which it is unclear which, or nothing. */
export type KnownUnit = LogLengthUnit | 'foot' | null;

/** The unit that the names of columns state. */
export function statedUnit(columns: readonly (Column | undefined)[]): KnownUnit {
  const units = columns.flatMap((column) => (column === undefined ? [] : (unitOfName(column.name) ?? [])));
  const lengths = units.filter((unit): unit is Exclude<NamedUnit, 'millimetre'> => unit !== 'millimetre');
  return (
    lengths.find((unit) => unit === 'us-survey-foot' || unit === 'international-foot') ?? lengths[0] ?? null
  );
}

/** Adds to the units of a layout. */
export function setUnits(draft: Draft, units: Partial<LogUnits>): void {
  const before = draft.parts.units;
  draft.parts = { ...draft.parts, units: { ...(typeof before === 'object' ? before : {}), ...units } };
}

/** Asks which foot is meant: over a whole coordinate of 500 km the two differ by a metre. */
export function askFoot(draft: Draft, what: 'length' | 'height', because: string): void {
  draft.doubt({
    code: 'which-foot',
    question:
      what === 'length'
        ? 'Which foot are the coordinates written in?'
        : 'Which foot are the heights written in?',
    because,
    key: `layout.units.${what}`,
    choices: FEET,
    decisive: true,
  });
}

/** Asks for the unit of plane coordinates of which nothing tells. */
export function askUnit(draft: Draft, because: string): void {
  draft.doubt({
    code: 'length-unit',
    question: 'Are the coordinates written in metres, or in which foot?',
    because,
    key: 'layout.units.length',
    choices: ['metre', ...FEET],
    decisive: true,
  });
}

/** Tells that plane coordinates are read as metres, which nothing in the file says. */
export function tellMetres(draft: Draft, because: string): void {
  draft.doubt({
    code: 'length-unit',
    question: 'Are the coordinates rightly read as metres?',
    because,
    key: 'layout.units.length',
    choices: ['metre', ...FEET],
    decisive: false,
  });
}
