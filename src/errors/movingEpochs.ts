import { RECORD } from './epochRecord.js';
import type { Verdict } from './judgeEpochs.js';

/** A step between epochs is motion when it is longer than scatter makes it and faster than a rod is tilted. */
const STEP_M = 0.05;
const SPEED_M_PER_S = 0.15;
/** Epochs farther apart say nothing of motion between them. */
const LONGEST_STEP_MS = 5_000;

/**
 * Marks the used epochs of a rover in motion: those with a moving step before and after. A single jump is no motion but
 * a wrong fix found out, and stays. At the ends of a run two moving steps in a row count.
 * @param records,order,verdicts of one key, in time order; verdicts are changed in place
 */
export function markMoving(records: Float64Array, order: Int32Array, verdicts: Verdict[]): void {
  const used: number[] = [];
  for (let k = 0; k < order.length; k++) if (verdicts[k] === 'used') used.push(k);
  if (used.length < 3) return;
  // steps[i] is the step from used[i] to used[i + 1]: moving, still, or too far apart to say.
  const steps = used.slice(1).map((k, i) => stepKind(records, order[used[i]!]!, order[k]!));
  const moving = (i: number): boolean => steps[i] === 'moving';
  const apart = (i: number): boolean => i < 0 || i >= steps.length || steps[i] === 'apart';
  used.forEach((k, i) => {
    const [before, after] = [i - 1, i];
    const inside = moving(before) && moving(after);
    const atStart = apart(before) && moving(after) && moving(after + 1);
    const atEnd = apart(after) && moving(before) && moving(before - 1);
    if (inside || atStart || atEnd) verdicts[k] = 'moving';
  });
}

function stepKind(records: Float64Array, from: number, to: number): 'moving' | 'still' | 'apart' {
  const ms = records[to + RECORD.utcMs]! - records[from + RECORD.utcMs]!;
  if (ms > LONGEST_STEP_MS || ms <= 0) return 'apart';
  const step = Math.hypot(
    records[to + RECORD.eastM]! - records[from + RECORD.eastM]!,
    records[to + RECORD.northM]! - records[from + RECORD.northM]!,
  );
  return step > STEP_M && (step * 1000) / ms > SPEED_M_PER_S ? 'moving' : 'still';
}
