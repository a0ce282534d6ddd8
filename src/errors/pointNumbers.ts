import { type Message, message, type Position } from '../logs/index.js';

/** A step in point numbers longer than this is another job, not deleted shots. */
const LONGEST_GAP = 20;
/** Told only when the numbers otherwise run on: at least so many steps by one. */
const FEWEST_STEPS = 20;
const STEPS_PER_GAP = 5;

interface Run {
  last: number;
  steps: number;
  gaps: number;
  missing: number;
  firstRow: number;
}

/**
 * Notices gaps in the point numbers of a log: shots deleted in the field, often the bad ones, are missing from every
 * statistic. Numbers at the end of a text count (`CHK 1023`).
 */
export class PointNumbers {
  readonly #runs = new Map<string, Run>();

  see({ file, rover, row, pointNumber }: Position): void {
    if (pointNumber === '') return;
    const digits = /(\d{1,9})\D*$/.exec(pointNumber);
    if (digits === null) return;
    const number = Number(digits[1]);
    const key = `${file}\u0000${rover}`;
    const run = this.#runs.get(key);
    if (run === undefined) {
      this.#runs.set(key, { last: number, steps: 0, gaps: 0, missing: 0, firstRow: 0 });
      return;
    }
    const step = number - run.last;
    run.last = number;
    if (step === 1) run.steps += 1;
    if (step < 2 || step > LONGEST_GAP) return;
    run.gaps += 1;
    run.missing += step - 1;
    run.firstRow ||= row;
  }

  messages(): Message[] {
    const found = [...this.#runs].filter(
      ([, { steps, gaps }]) => gaps > 0 && steps >= FEWEST_STEPS && steps >= STEPS_PER_GAP * gaps,
    );
    return found
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, { gaps, missing, firstRow }]) =>
        message(
          'info',
          'point-number-gaps',
          `Expected point numbers that run on, came ${gaps === 1 ? 'one gap' : `${gaps} gaps`} with ${missing === 1 ? '1 number' : `${missing} numbers`} missing. If shots were deleted in the field, the errors look smaller than they are: keep both shots and note why one is bad.`,
          { file: key.split('\u0000', 1)[0]!, row: firstRow },
        ),
      );
  }
}
