import { type ColumnTable, from } from 'arquero';
import type { OccupationError } from './computeErrors.js';

/** Errors as an arquero table, one row an occupation, with the columns of {@link OccupationError}. */
export function errorTable(errors: readonly OccupationError[]): ColumnTable {
  return from([...errors]) as ColumnTable;
}
