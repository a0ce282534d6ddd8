import { InputError, type Message, message, quoted, readDelimitedTable } from '../logs/index.js';
import { timeReader } from '../time/index.js';
import type { Marks } from './marks.js';

/** When a rover stood on a mark. */
export interface MarkInterval {
  readonly mark: string;
  /** Empty when it holds for every rover. */
  readonly rover: string;
  readonly fromMs: number;
  readonly toMs: number;
}

/** Intervals of one log, in the order of their start. */
export type MarkTimes = readonly MarkInterval[];

/**
 * Reads a list of stays: columns `mark`, `start` (or `from`), `end` (or `to`), and `rover` where there are several.
 * @param timeZone of times without an offset
 * @throws InputError with every faulty row named
 */
export async function readMarkTimes(
  path: string,
  file: string,
  marks: Marks,
  timeZone: string | null,
): Promise<MarkTimes> {
  const { header, rows } = await readDelimitedTable(path, file, { required: ['mark', 'start', 'end'] });
  const read = timeReader({}, timeZone);
  const errors: Message[] = [];
  const intervals: MarkInterval[] = [];
  for (const { row, cells, fault } of rows) {
    const report = (code: string, text: string): void => {
      errors.push(message('error', code, text, { file, row }));
    };
    if (cells === null) {
      report('unreadable', `The row cannot be read: ${fault}. Correct it.`);
      continue;
    }
    const text = (role: 'mark' | 'start' | 'end' | 'rover'): string =>
      cells[header.positions.get(role) ?? -1] ?? '';
    const [from, to] = [read(text('start')), read(text('end'))];
    const mark = text('mark');
    if (!marks.has(mark))
      report('unknown-mark', `Expected a mark of the marks file, came ${quoted(mark)}. Correct the name.`);
    else if (from.kind !== 'instant' || to.kind !== 'instant') {
      const wrong = from.kind === 'instant' ? to : from;
      const detail = wrong.kind === 'invalid' ? wrong.detail : 'expected a time of day, came a date alone';
      report('bad-time', `The stay has no times: ${detail}. Correct the row.`);
    } else if (from.utcMs > to.utcMs) {
      report(
        'bad-time',
        `Expected an end after the start, came ${quoted(text('start'))} to ${quoted(text('end'))}. Correct the row.`,
      );
    } else intervals.push({ mark, rover: text('rover'), fromMs: from.utcMs, toMs: to.utcMs });
  }
  if (errors.length > 0) throw new InputError(errors);
  return intervals.sort((a, b) => a.fromMs - b.fromMs);
}

/** The mark on which a rover stood at a moment, or null. */
export function markAt(times: MarkTimes, utcMs: number, rover: string): string | null {
  // The last stay that began before the moment, by bisection; overlapping stays are looked at backwards from there.
  let [low, high] = [0, times.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]!.fromMs <= utcMs) low = middle + 1;
    else high = middle;
  }
  for (let k = low - 1; k >= 0; k--) {
    const { mark, rover: only, toMs } = times[k]!;
    if (utcMs <= toMs && (only === '' || only === rover)) return mark;
  }
  return null;
}
