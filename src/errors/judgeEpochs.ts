import type { RowReason } from '../logs/index.js';
import { FIXED, NO_POSITION, RECORD, RECORD_WIDTH } from './epochRecord.js';

/** What becomes of an epoch: `used` in an occupation, or the reason why not. */
export type Verdict = 'used' | Extract<RowReason, 'not-fixed' | 'no-position' | 'duplicate' | 'conflicting'>;

/**
 * Offsets of the records of one key in time order; rows at the same time stand in the order of file and row, so that
 * the order in which logs were read does not matter.
 */
export function timeOrder(records: Float64Array): Int32Array {
  const count = records.length / RECORD_WIDTH;
  const order = Int32Array.from({ length: count }, (_, k) => k * RECORD_WIDTH);
  const compare = (a: number, b: number): number =>
    records[a + RECORD.utcMs]! - records[b + RECORD.utcMs]! ||
    records[a + RECORD.file]! - records[b + RECORD.file]! ||
    records[a + RECORD.row]! - records[b + RECORD.row]!;
  for (let k = 1; k < count; k++) {
    if (compare(order[k - 1]!, order[k]!) > 0) return order.sort(compare);
  }
  return order;
}

/** A tenth of a millimetre: two rows that agree within it are the same position written twice. */
const SAME_POSITION_M = 1e-4;

/**
 * Judges the records of one key, in time order. Of fixed rows at the same time with the same coordinates the first is
 * used and the others are duplicates; with other coordinates all of them are conflicting.
 */
export function judgeEpochs(records: Float64Array, order: Int32Array): Verdict[] {
  const verdicts = Array.from(order, (offset): Verdict => {
    const state = records[offset + RECORD.state];
    return state === FIXED ? 'used' : state === NO_POSITION ? 'no-position' : 'not-fixed';
  });
  const timeAt = (k: number): number => records[order[k]! + RECORD.utcMs]!;
  for (let start = 0; start < order.length; ) {
    let end = start + 1;
    while (end < order.length && timeAt(end) === timeAt(start)) end++;
    if (end - start > 1) judgeSameTime(records, order, verdicts, start, end);
    start = end;
  }
  return verdicts;
}

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
  const same = fixed.every((k) =>
    [RECORD.eastM, RECORD.northM, RECORD.upM].every(
      (field) => Math.abs(records[order[k]! + field]! - records[order[first]! + field]!) <= SAME_POSITION_M,
    ),
  );
  for (const k of fixed) if (!same || k !== first) verdicts[k] = same ? 'duplicate' : 'conflicting';
}
