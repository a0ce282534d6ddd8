import type { RowReason } from '../logs/index.js';
import { FIXED, MEASURED, NO_POSITION, RECORD, RECORD_WIDTH } from './epochRecord.js';

/** What becomes of an epoch: `used` in an occupation, or the reason why not. */
export type Verdict =
  | 'used'
  | Extract<RowReason, 'not-fixed' | 'no-position' | 'duplicate' | 'conflicting' | 'moving'>;

/** Place of each name in alphabetical order: names are numbered as they are met, which depends on what is read first. */
export interface NameRanks {
  readonly file: ArrayLike<number>;
  readonly crew: ArrayLike<number>;
  readonly support: ArrayLike<number>;
}

/** What tells rows of the same time apart, before the place where they stand. */
const TOLD_APART_BY = [RECORD.state, ...MEASURED] as const;

/**
 * Offsets of the records of one key in time order. Rows of the same time stand in the order of what they say, and only
 * rows that say the same in that of file name and row: the order in which logs were read or cut does not matter.
 */
export function timeOrder(records: Float64Array, ranks: NameRanks): Int32Array {
  const count = records.length / RECORD_WIDTH;
  const order = Int32Array.from({ length: count }, (_, k) => k * RECORD_WIDTH);
  const rank = (names: ArrayLike<number>, at: number): number => names[records[at]!]!;
  const compare = (a: number, b: number): number => {
    const time = records[a + RECORD.utcMs]! - records[b + RECORD.utcMs]!;
    if (time !== 0) return time;
    for (const field of TOLD_APART_BY) {
      const difference = compareNumbers(records[a + field]!, records[b + field]!);
      if (difference !== 0) return difference;
    }
    return (
      rank(ranks.crew, a + RECORD.crew) - rank(ranks.crew, b + RECORD.crew) ||
      rank(ranks.support, a + RECORD.support) - rank(ranks.support, b + RECORD.support) ||
      rank(ranks.file, a + RECORD.file) - rank(ranks.file, b + RECORD.file) ||
      records[a + RECORD.row]! - records[b + RECORD.row]!
    );
  };
  for (let k = 1; k < count; k++) {
    if (compare(order[k - 1]!, order[k]!) > 0) return order.sort(compare);
  }
  return order;
}

/** Ascending, NaN last. */
function compareNumbers(a: number, b: number): number {
  if (Number.isNaN(a) || Number.isNaN(b)) return Number(Number.isNaN(a)) - Number(Number.isNaN(b));
  return a - b;
}

/** A tenth of a millimetre: two rows that agree within it are the same position written twice. */
const SAME_POSITION_M = 1e-4;

/**
 * Judges the records of one key, in time order. Of fixed rows at the same time with the same coordinates the first is
 * used and the others are duplicates; with other coordinates all of them are conflicting.
 */
export function judgeEpochs(records: Float64Array, order: Int32Array): Verdict[] {
  const verdicts = byState(records, order);
  const timeAt = (k: number): number => records[order[k]! + RECORD.utcMs]!;
  for (let start = 0; start < order.length; ) {
    let end = start + 1;
    while (end < order.length && timeAt(end) === timeAt(start)) end++;
    if (end - start > 1) judgeSameTime(records, order, verdicts, start, end);
    start = end;
  }
  return verdicts;
}

/**
 * Judges records that have a date and no time of day, in the order of {@link timeOrder}: equal coordinates on one day
 * are one position written twice, different ones are different shots.
 */
export function judgeDatedRows(records: Float64Array, order: Int32Array): Verdict[] {
  const verdicts = byState(records, order);
  let last = -1;
  order.forEach((offset, k) => {
    if (verdicts[k] !== 'used') return;
    if (last >= 0 && samePosition(records, offset, last)) verdicts[k] = 'duplicate';
    else last = offset;
  });
  return verdicts;
}

function byState(records: Float64Array, order: Int32Array): Verdict[] {
  return Array.from(order, (offset): Verdict => {
    const state = records[offset + RECORD.state];
    return state === FIXED ? 'used' : state === NO_POSITION ? 'no-position' : 'not-fixed';
  });
}

const samePosition = (records: Float64Array, a: number, b: number): boolean =>
  [RECORD.eastM, RECORD.northM, RECORD.upM].every(
    (field) => Math.abs(records[a + field]! - records[b + field]!) <= SAME_POSITION_M,
  );

function judgeSameTime(
  records: Float64Array,
  order: Int32Array,
  verdicts: Verdict[],
  start: number,
  end: number,
): void {
  const fixed: number[] = [];
  for (let k = start; k < end; k++) if (verdicts[k] === 'used') fixed.push(k);
  const [first] = fixed;
  if (first === undefined) return;
  const same = fixed.every((k) => samePosition(records, order[k]!, order[first]!));
  for (const k of fixed) if (!same || k !== first) verdicts[k] = same ? 'duplicate' : 'conflicting';
}
