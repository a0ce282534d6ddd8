import { CAME_MOVING, LEFT_MOVING, RECORD } from './epochRecord.js';
import type { Verdict } from './judgeEpochs.js';

/** Motion is longer than scatter makes it and faster than a rod is tilted. */
const STEP_M = 0.05;
const SPEED_M_PER_S = 0.15;
/** Epochs farther apart say nothing of motion between them. */
export const LONGEST_STEP_MS = 5_000;
/** Motion is judged over this time where epochs come faster: from one to the next of them scatter is as long as a step. */
const SPAN_MS = 1_000;

/** Whether a way of so many metres in so many milliseconds is that of a rover in motion. */
export const isMotion = (metres: number, ms: number): boolean =>
  metres > STEP_M && metres * 1000 > SPEED_M_PER_S * ms;

/** Whether the log shows the rover to come and go on moving; only where the rows around a mark were watched. */
export const isPassing = (records: Float64Array, offset: number): boolean =>
  records[offset + RECORD.motion] === CAME_MOVING + LEFT_MOVING;

/**
 * Marks the used epochs of a rover in motion: those to which it comes moving and from which it goes on moving, away from
 * where it came. A jump, or one there and back, is no motion but a wrong fix found out, and stays. At the ends of a run
 * two moving steps in a row count, or one, where the log shows how the rover came or went on.
 * @param records,order,verdicts of one key, in time order; verdicts are changed in place
 */
export function markMoving(records: Float64Array, order: Int32Array, verdicts: Verdict[]): void {
  const used: number[] = [];
  for (let k = 0; k < order.length; k++) if (verdicts[k] === 'used') used.push(k);
  const way = new Way(
    records,
    used.map((k) => order[k]!),
  );
  const inside = used.map((_, i) => way.goesOn(i));
  const moving = used.map((_, i) => inside[i]! || way.turns(i, inside) || way.beginsOrEnds(i));
  // Near where the rover stops or starts the way within the span is short, but its steps are still those of motion.
  for (let i = 1; i < used.length; i++) moving[i] ||= moving[i - 1]! && way.steps(i);
  for (let i = used.length - 2; i >= 0; i--) moving[i] ||= moving[i + 1]! && way.steps(i);
  used.forEach((k, i) => {
    if (moving[i]) verdicts[k] = 'moving';
  });
}

/** The way of a rover over its used epochs. */
class Way {
  constructor(
    readonly records: Float64Array,
    readonly offsets: readonly number[],
  ) {}

  /** Whether the rover comes moving, goes on moving, and gets on. */
  goesOn(i: number): boolean {
    const from = this.#back(i);
    if (!this.#moves(from, i)) return false;
    const to = this.#ahead(i);
    if (!this.#moves(i, to)) return false;
    return this.#metres(from, to) > Math.max(this.#metres(from, i), this.#metres(i, to));
  }

  /** Whether it comes and goes moving and turns between: told from a jump there and back by the epochs beside. */
  turns(i: number, inside: readonly boolean[]): boolean {
    if (inside[i - 1] !== true && inside[i + 1] !== true) return false;
    return this.#moves(this.#back(i), i) && this.#moves(i, this.#ahead(i));
  }

  /** Whether the epoch is the first or last of a run of a rover in motion. */
  beginsOrEnds(i: number): boolean {
    const [first, last] = [this.#apart(i - 1, i), this.#apart(i, i + 1)];
    const [came, left] = [this.#log(i, CAME_MOVING), this.#log(i, LEFT_MOVING)];
    if (first && last) return isPassing(this.records, this.offsets[i]!);
    if (first) return this.#moves(i, this.#ahead(i)) && (came || this.#movesTwice(i, i + 1, i + 2));
    return last && this.#moves(this.#back(i), i) && (left || this.#movesTwice(i - 2, i - 1, i));
  }

  /** Whether the steps before and after are both those of motion. */
  steps(i: number): boolean {
    return this.#moves(i - 1, i) && this.#moves(i, i + 1);
  }

  #movesTwice(a: number, b: number, c: number): boolean {
    return this.#moves(a, b) && this.#moves(b, c) && this.#metres(a, c) > this.#metres(a, b);
  }

  /** The first epoch of the span before one, at least its neighbour; the epoch itself where it has none. */
  #back(i: number): number {
    let from = i;
    while (!this.#apart(from - 1, from) && (from === i || this.#ms(from - 1, i) <= SPAN_MS)) from--;
    return from;
  }

  /** The last epoch of the span after one, likewise. */
  #ahead(i: number): number {
    let to = i;
    while (!this.#apart(to, to + 1) && (to === i || this.#ms(i, to + 1) <= SPAN_MS)) to++;
    return to;
  }

  #apart(a: number, b: number): boolean {
    return a < 0 || b >= this.offsets.length || this.#ms(a, b) > LONGEST_STEP_MS;
  }

  #moves(a: number, b: number): boolean {
    return a !== b && !this.#apart(a, b) && isMotion(this.#metres(a, b), this.#ms(a, b));
  }

  #log(i: number, flag: number): boolean {
    return (this.records[this.offsets[i]! + RECORD.motion]! & flag) !== 0;
  }

  #ms(a: number, b: number): number {
    const { records, offsets } = this;
    return records[offsets[b]! + RECORD.utcMs]! - records[offsets[a]! + RECORD.utcMs]!;
  }

  #metres(a: number, b: number): number {
    const { records, offsets } = this;
    const [p, q] = [offsets[a]!, offsets[b]!];
    return Math.hypot(
      records[q + RECORD.eastM]! - records[p + RECORD.eastM]!,
      records[q + RECORD.northM]! - records[p + RECORD.northM]!,
    );
  }
}
