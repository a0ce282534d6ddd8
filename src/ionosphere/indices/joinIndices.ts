import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import { counted, dayWords } from '../words.js';
import {
  type GeomagneticIndices,
  INDEX_WORDS,
  type IndexName,
  type IndexSeries,
  indexAt,
} from './indexSeries.js';

/** A column that is joined to occupations. */
export type JoinedIndexName = 'kp' | 'ap' | 'hp30' | 'hp60' | 'dst' | 'f107' | 'apDaily';
/** The index in each. */
const JOINED: Readonly<Record<JoinedIndexName, IndexName>> = {
  kp: 'kp',
  ap: 'ap',
  hp30: 'hp30',
  hp60: 'hp60',
  dst: 'dst',
  f107: 'f107Observed',
  apDaily: 'apDaily',
};
export const JOINED_INDEX_NAMES = Object.keys(JOINED) as readonly JoinedIndexName[];

/** Indices at the start of each occupation, in the order of the rows. */
export interface JoinedIndices {
  /** NaN where there is no value; `dst` in nT, `f107` is the observed F10.7 in solar flux units. */
  readonly columns: Readonly<Record<JoinedIndexName, Float64Array>>;
  /** How many occupations found no value, for each column. */
  readonly withoutValue: Readonly<Record<JoinedIndexName, number>>;
  readonly messages: readonly Message[];
}

/** No clock is farther from UTC than this. */
const WIDEST_ZONE_MS = 14 * 3_600_000;

/**
 * Looks up the indices of each occupation at its start. F10.7 and Ap are those of its UTC day.
 * @param occupations errors, or any table or records with a column `startMs` in UTC milliseconds
 * @throws InputError when the column is missing
 */
export function joinIndices(occupations: ErrorsInput, indices: GeomagneticIndices): JoinedIndices {
  const startMs = errorColumns(occupations).numbers('startMs', 'looking up indices');
  const columns = {} as Record<JoinedIndexName, Float64Array>;
  const withoutValue = {} as Record<JoinedIndexName, number>;
  const messages: Message[] = [];
  for (const column of JOINED_INDEX_NAMES) {
    const name = JOINED[column];
    const values = startMs.map((ms) => indexAt(indices, name, ms));
    columns[column] = values;
    withoutValue[column] = values.reduce((count, value) => count + (Number.isNaN(value) ? 1 : 0), 0);
    const series = indices.series[name];
    if (series !== undefined && withoutValue[column] > 0)
      messages.push(withoutNote(name, series, startMs, values, withoutValue[column]));
  }
  if (
    startMs.length > 0 &&
    JOINED_INDEX_NAMES.every((column) => indices.series[JOINED[column]] === undefined)
  )
    messages.push(
      message(
        'warning',
        'index-none-given',
        'Expected at least one index to look up, came none that was read. Give a file of Kp, Hp30, Dst or F10.7.',
      ),
    );
  return { columns, withoutValue, messages };
}

function withoutNote(
  name: IndexName,
  { startMs: starts, lengthMs }: IndexSeries,
  startMs: Float64Array,
  values: Float64Array,
  without: number,
): Message {
  const [from, to] = [starts[0]!, starts.at(-1)! + lengthMs];
  const outside = startMs.filter((ms) => ms < from || ms >= to);
  const lost = [...startMs.keys()].filter((i) => Number.isNaN(values[i]!)).map((i) => startMs[i]!);
  const all = without === startMs.length;
  return message(
    'warning',
    all && outside.length > 0 ? 'index-other-period' : 'index-no-value',
    `Expected ${INDEX_WORDS[name]} for ${counted(startMs.length, 'occupation')}, came values of ${periodWords(from, to - 1)}: ${all ? 'none' : without} of the occupations ${all ? 'has a value' : without === 1 ? 'has none' : 'have none'} (${lostWords(lost)}). ${remedy(outside, from, to)}`,
  );
}

const periodWords = (fromMs: number, toMs: number): string =>
  dayWords(fromMs) === dayWords(toMs) ? dayWords(fromMs) : `${dayWords(fromMs)} to ${dayWords(toMs)}`;

function lostWords(lostMs: readonly number[]): string {
  const known = lostMs.filter(Number.isFinite);
  if (known.length === 0) return 'without a time';
  const [from, to] = [known.reduce((a, b) => Math.min(a, b)), known.reduce((a, b) => Math.max(a, b))];
  return periodWords(from, to);
}

function remedy(outside: Float64Array, from: number, to: number): string {
  if (outside.length === 0) return 'The file lacks these intervals: complete it.';
  const near = outside.every((ms) => ms >= from - WIDEST_ZONE_MS && ms < to + WIDEST_ZONE_MS);
  return near
    ? 'They lie within hours of the ends of the file: check the time zone of the logs, or add the file of the neighbouring days.'
    : 'Give the file of the same years, and check the dates of the logs.';
}
