import { cellsOf, datedNumbers, isFault } from './gfzFields.js';
import { type IndexLayout, unreadable } from './indexLine.js';
import { INDEX_LENGTH_MS } from './indexSeries.js';
import { apDailyDoubt, knownValue, kpDoubt, kpFault } from './kpValues.js';

const FIELDS = 28;

/**
 * The daily file of GFZ Potsdam (`Kp_ap_Ap_SN_F107_…`, Matzka et al. 2021): YYYY MM DD days days_m Bsr dB Kp1…Kp8
 * ap1…ap8 Ap SN F10.7obs F10.7adj D, cut at blanks, since the printed column numbers are off near Ap. D: 0 Kp and SN
 * preliminary, 1 Kp definitive, 2 both definitive; it does not speak of F10.7.
 */
export const gfzDaily: IndexLayout = {
  words: 'the daily file of Kp, ap, Ap, SN and F10.7',
  matches: (line) => /^\s*\d{4}\s/.test(line) && cellsOf(line).length === FIELDS,
  read: (line, add, doubt) => {
    const read = datedNumbers(line, FIELDS, 3);
    if (isFault(read)) return read;
    const { dayMs, numbers } = read;
    const flag = numbers[27]!;
    if (![0, 1, 2].includes(flag)) return unreadable(`expected 0, 1 or 2 as D, came ${flag}`);
    const kp = numbers.slice(7, 15).map(knownValue);
    const ap = numbers.slice(15, 23).map(knownValue);
    for (let k = 0; k < 8; k++) {
      const fault = kpFault(kp[k]!, ap[k]!);
      if (fault !== null) return fault;
    }
    const apDaily = knownValue(numbers[23]!);
    const doubts = [...kp.map((value, k) => kpDoubt(value, ap[k]!)), apDailyDoubt(ap, apDaily)];
    for (const text of doubts) if (text !== null) doubt(text);
    const kpStatus = flag === 0 ? 'preliminary' : 'definitive';
    for (let k = 0; k < 8; k++) {
      const startMs = dayMs + k * INDEX_LENGTH_MS.kp;
      add('kp', startMs, kp[k]!, kpStatus);
      add('ap', startMs, ap[k]!, kpStatus);
    }
    add('apDaily', dayMs, apDaily, kpStatus);
    add('sunspotNumber', dayMs, knownValue(numbers[24]!), flag === 2 ? 'definitive' : 'preliminary');
    add('f107Observed', dayMs, knownValue(numbers[25]!), 'not-stated');
    add('f107Adjusted', dayMs, knownValue(numbers[26]!), 'not-stated');
    return null;
  },
};
