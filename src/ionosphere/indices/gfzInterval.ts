import { cellsOf, datedNumbers, isFault } from './gfzFields.js';
import { type IndexLayout, unreadable } from './indexLine.js';
import { INDEX_LENGTH_MS, type IndexName } from './indexSeries.js';
import { knownValue, kpDoubt, kpFault } from './kpValues.js';

const FIELDS = 10;
const HOUR_MS = 3_600_000;

/** The files by interval differ in the length of their intervals alone: the pair of indices, and its name. */
const PAIRS: readonly { readonly index: IndexName; readonly amplitude: IndexName; readonly words: string }[] =
  [
    { index: 'kp', amplitude: 'ap', words: 'the 3-hour file of Kp and ap' },
    { index: 'hp30', amplitude: 'ap30', words: 'the half-hour file of Hp30 and ap30' },
    { index: 'hp60', amplitude: 'ap60', words: 'the hourly file of Hp60 and ap60' },
  ];

/** Whether start and middle, in hours, are those of an interval of this index. */
const holds = (index: IndexName, startHour: number, middleHour: number): boolean =>
  Math.abs(2 * (middleHour - startHour) * HOUR_MS - INDEX_LENGTH_MS[index]) < 1000;

/**
 * The files of GFZ Potsdam with one interval a row (`Kp_ap_…`, `Hp30_ap30_…`, `Hp60_ap60_…`): YYYY MM DD hh.h hh._m
 * days days_m index amplitude D (Matzka et al. 2021; Yamazaki et al. 2022). hh.h is the start and hh._m the middle, so
 * that each row shows the length of its interval. D is the status of Kp; for the open-ended Hp it is always 0 and says
 * nothing.
 */
export const gfzIntervals: readonly IndexLayout[] = PAIRS.map(({ index, amplitude, words }) => ({
  words,
  matches: (line) => {
    const cells = cellsOf(line);
    return (
      cells.length === FIELDS && /^\d{4}$/.test(cells[0]!) && holds(index, Number(cells[3]), Number(cells[4]))
    );
  },
  read: (line, add, doubt) => {
    const read = datedNumbers(line, FIELDS, 5);
    if (isFault(read)) return read;
    const { dayMs, numbers } = read;
    if (!holds(index, numbers[3]!, numbers[4]!))
      return unreadable(
        `expected the middle of an interval of ${words.slice(4)}, came ${numbers[4]} after ${numbers[3]}`,
      );
    const startMs = Math.round(dayMs + numbers[3]! * HOUR_MS);
    const steps = (startMs - dayMs) / INDEX_LENGTH_MS[index];
    if (!Number.isInteger(steps) || steps < 0 || numbers[3]! >= 24)
      return unreadable(
        `expected the hour at which an interval of ${words.slice(4)} begins, came ${numbers[3]}`,
      );
    const known = index === 'kp' ? knownValue : (v: number): number => (v < 0 ? Number.NaN : v);
    const [value, size] = [known(numbers[7]!), known(numbers[8]!)];
    const flag = numbers[9]!;
    if (index === 'kp') {
      const fault = kpFault(value, size);
      if (fault !== null) return fault;
      const text = kpDoubt(value, size);
      if (text !== null) doubt(text);
    }
    const kpStatus = flag >= 1 ? 'definitive' : 'preliminary';
    const status = index === 'kp' ? kpStatus : 'not-stated';
    add(index, startMs, value, status);
    add(amplitude, startMs, size, status);
    return null;
  },
}));
