import { type ErrorsInput, errorColumns } from '../errors/index.js';
import type { Component } from '../fit/index.js';
import { componentRows } from './componentRows.js';

/** Data at or beyond a length without which no rule reaches it (rules of thumb). */
const FEWEST_OCCUPATIONS = 20;
const FEWEST_DAYS = 5;
const FEWEST_MARKS = 2;

/** Marks with known errors in the component that lie beyond a length, the nearest first. */
export function marksBeyond(
  errors: ErrorsInput,
  component: Component,
  km: number,
): { mark: string; baselineKm: number }[] {
  const columns = errorColumns(errors);
  const needed = 'the supported length';
  const lengths = columns.numbers('baselineKm', needed);
  const marks = columns.texts('mark', needed);
  const beyond = new Map<string, number>();
  for (const i of componentRows(columns, component)) {
    if (lengths[i]! > km) beyond.set(marks[i]!, lengths[i]!);
  }
  return [...beyond]
    .map(([mark, baselineKm]) => ({ mark, baselineKm }))
    .sort((a, b) => a.baselineKm - b.baselineKm || (a.mark < b.mark ? -1 : 1));
}

/**
 * The longest length with at least 20 occupations on 5 days and 2 marks at or beyond it, km; null when there is none.
 * Only occupations whose error is known in the component count.
 * @throws InputError when `day`, `mark`, `baselineKm` or a column of the component is missing
 */
export function longestSupportedKm(errors: ErrorsInput, component: Component): number | null {
  const columns = errorColumns(errors);
  const needed = 'the supported length';
  const lengths = columns.numbers('baselineKm', needed);
  const days = columns.texts('day', needed);
  const marks = columns.texts('mark', needed);
  const farthestFirst = componentRows(columns, component).sort((i, j) => lengths[j]! - lengths[i]!);
  const [seenDays, seenMarks] = [new Set<string>(), new Set<string>()];
  for (const [k, i] of farthestFirst.entries()) {
    seenDays.add(days[i]!);
    seenMarks.add(marks[i]!);
    const enough =
      k + 1 >= FEWEST_OCCUPATIONS && seenDays.size >= FEWEST_DAYS && seenMarks.size >= FEWEST_MARKS;
    if (enough) return lengths[i]!;
  }
  return null;
}
