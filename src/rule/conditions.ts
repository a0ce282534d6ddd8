import { type ErrorColumns, type ErrorsInput, errorColumns } from '../errors/index.js';
import type { Component } from '../fit/index.js';
import { componentRows } from './componentRows.js';
import type { RuleConditions, SeenRange } from './rule.js';

/** What is known of a study beside its errors and belongs to the conditions of its rules. */
export interface Surroundings {
  /** Every visit, with or without a fix. */
  readonly visits?: readonly { readonly fixedRows: number }[] | undefined;
  /** Solar radio flux F10.7 by day, solar flux units. */
  readonly f107?: ReadonlyMap<string, number> | undefined;
  /** Stated standard deviation of the base's coordinates in this component, mm per axis. */
  readonly baseSigmaMm?: number | undefined;
  /** What the error of an assumed base coordinate adds to every baseline, mm per km, the same on all positions. */
  readonly basePpm?: number | undefined;
}

/** Where, when and how the errors of a component were measured. */
export function conditionsOf(
  errors: ErrorsInput,
  component: Component,
  { visits = [], f107, baseSigmaMm, basePpm }: Surroundings = {},
  heightDifferenceM: number | null = null,
): RuleConditions {
  const columns = errorColumns(errors);
  const rows = componentRows(columns, component);
  const distinct = (name: string): string[] => distinctTexts(columns, name, rows);
  const days = distinct('day');
  const given = (name: string): string[] =>
    columns.has(name) ? distinct(name).filter((text) => text !== '') : [];
  const range = (name: string): SeenRange | null =>
    columns.has(name) ? seenRange(pick(columns.numbers(name, NEEDED), rows)) : null;
  return {
    occupations: rows.length,
    days: days.length,
    from: days[0] ?? '',
    to: days.at(-1) ?? '',
    marks: distinct('mark'),
    bases: distinct('base'),
    epochs: range('epochs'),
    solarHours: range('solarHour'),
    supports: given('support'),
    tiltDeg: range('tiltDeg'),
    skies: given('sky'),
    visitsWithFix:
      visits.length === 0 ? null : visits.filter(({ fixedRows }) => fixedRows > 0).length / visits.length,
    f107: seenRange(days.map((day) => f107?.get(day) ?? Number.NaN)),
    baseSigmaMm: baseSigmaMm ?? null,
    basePpm: basePpm ?? null,
    heightDifferenceM,
    reviewBy: reviewBy(days.at(-1) ?? ''),
  };
}

const NEEDED = 'the conditions of a rule';

function distinctTexts(columns: ErrorColumns, name: string, rows: readonly number[]): string[] {
  const texts = columns.texts(name, NEEDED);
  return [...new Set(rows.map((i) => texts[i]!))].sort();
}

/** Null when no value is known. */
function seenRange(values: readonly number[]): SeenRange | null {
  const known = values.filter((value) => !Number.isNaN(value));
  if (known.length === 0) return null;
  return {
    from: known.reduce((a, b) => Math.min(a, b)),
    to: known.reduce((a, b) => Math.max(a, b)),
  };
}

/** The same date a year later, 28 February for a leap day; null for a text that is no date. */
export function reviewBy(lastDay: string): string | null {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(lastDay);
  if (parts === null) return null;
  const [, year, month, day] = parts as unknown as [string, string, string, string];
  const next = String(Number(year) + 1).padStart(4, '0');
  return `${next}-${month}-${month === '02' && day === '29' ? '28' : day}`;
}

const pick = (values: Float64Array, rows: readonly number[]): number[] => rows.map((i) => values[i]!);
