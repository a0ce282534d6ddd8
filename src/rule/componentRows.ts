import type { ErrorColumns } from '../errors/index.js';
import type { Component } from '../fit/index.js';

/** Rows that take part in the fit of a component: its errors are known and the rover is not on the base itself. */
export function componentRows(columns: ErrorColumns, component: Component): number[] {
  const needed = `component "${component}"`;
  const names = component === 'horizontal' ? ['east', 'north'] : ['up'];
  const values = names.map((name) => columns.numbers(name, needed));
  const lengths = columns.numbers('baselineKm', needed);
  return Array.from(lengths.keys()).filter(
    (i) => lengths[i]! > 0 && values.every((column) => !Number.isNaN(column[i]!)),
  );
}
