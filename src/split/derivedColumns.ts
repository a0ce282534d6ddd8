import type { ErrorColumns } from '../errors/index.js';

/** A column that follows from others, so that no table need carry it. */
interface Derived {
  /** The column it follows from. */
  readonly from: readonly string[];
  /** Whether a visit without a fix has it too. */
  readonly ofVisits: boolean;
}

/** Eight directions, each 45° wide about its name. */
const DIRECTIONS = ['N', 'NE', 'E', 'SE', 'S', 'SW', 'W', 'NW'] as const;

const DERIVED = {
  month: { from: ['day'], ofVisits: true },
  direction: { from: ['azimuthDeg'], ofVisits: true },
  occupationSeconds: { from: ['startMs', 'endMs'], ofVisits: false },
} as const satisfies Record<string, Derived>;
type DerivedName = keyof typeof DERIVED;

const isDerived = (name: string): name is DerivedName => name in DERIVED;

/** Groups of a column in their natural order; null where names are sorted. */
export const groupOrder = (name: string): readonly string[] | null =>
  name === 'direction' ? DIRECTIONS : null;

/**
 * The same columns with those that follow from them: `month` (YYYY-MM) of the day, `direction` from the base in eight
 * sectors, `occupationSeconds` from the first to the last epoch. A table's own column of that name goes before.
 * @param areVisits leaves out what only an occupation has
 */
export function withDerived(columns: ErrorColumns, areVisits = false): ErrorColumns {
  const derives = (name: string): name is DerivedName =>
    isDerived(name) && !columns.has(name) && (DERIVED[name].ofVisits || !areVisits);
  return {
    length: columns.length,
    has: (name) =>
      columns.has(name) || (derives(name) && DERIVED[name].from.every((each) => columns.has(each))),
    numbers: (name, neededFor) =>
      derives(name) && name === 'occupationSeconds'
        ? occupationSeconds(columns, neededFor)
        : columns.numbers(name, neededFor),
    texts: (name, neededFor) => {
      if (!derives(name)) return columns.texts(name, neededFor);
      if (name === 'month') return columns.texts('day', neededFor).map((day) => day.slice(0, 7));
      if (name === 'direction') return Array.from(columns.numbers('azimuthDeg', neededFor), directionOf);
      return Array.from(occupationSeconds(columns, neededFor), String);
    },
  };
}

/** Empty for a mark on the base itself, which has no direction. */
const directionOf = (azimuthDeg: number): string =>
  Number.isNaN(azimuthDeg) ? '' : DIRECTIONS[Math.round((((azimuthDeg % 360) + 360) % 360) / 45) % 8]!;

function occupationSeconds(columns: ErrorColumns, neededFor: string): Float64Array {
  const startMs = columns.numbers('startMs', neededFor);
  return columns.numbers('endMs', neededFor).map((endMs, i) => (endMs - startMs[i]!) / 1000);
}
