import { dateMs, type IndexLayout, numberIn, unreadable } from './indexLine.js';
import { INDEX_LENGTH_MS, type IndexStatus } from './indexSeries.js';

const COLUMNS = 120;
/** Through the 24th hour; the daily mean behind it repeats them. */
const NEEDED_COLUMNS = 116;
const MISSING = 9999;
/** Dst begins in 1957: the century of a row that does not state it. */
const FIRST_YEAR = 57;

const STATUSES: Readonly<Record<string, IndexStatus>> = {
  0: 'preliminary',
  1: 'provisional',
  2: 'definitive',
};

/**
 * The fixed columns of the World Data Center for Geomagnetism, Kyoto, for hourly Dst: `DST` 1-3, yy 4-5, mm 6-7, `*` 8,
 * dd 9-10, `RR` or blanks 11-12, `X` 13, version 14 (0 quick look, 1 provisional, 2 final), century 15-16, base value
 * 17-20 in 100 nT, 24 hourly values of 4 columns in nT 21-116, their mean 117-120; 9999 is missing.
 */
export const wdcDst: IndexLayout = {
  words: 'the fixed columns of Dst, one day a row',
  matches: (line) => line.startsWith('DST') && line.length >= NEEDED_COLUMNS,
  read: (line, add, doubt) => {
    if (line.length < NEEDED_COLUMNS)
      return unreadable(`expected ${COLUMNS} columns in the row, came ${line.length}`);
    if (!line.startsWith('DST'))
      return unreadable(`expected DST in columns 1 to 3, came ${JSON.stringify(line.slice(0, 3))}`);
    const date = `${line.slice(3, 7)} ${line.slice(8, 10)}`;
    const [yy, month, day] = [line.slice(3, 5), line.slice(5, 7), line.slice(8, 10)].map(numberIn);
    if (yy == null || month == null || day == null)
      return unreadable(`expected year, month and day of two digits each, came ${JSON.stringify(date)}`);
    const century = numberIn(line.slice(14, 16)) ?? (yy < FIRST_YEAR ? 20 : 19);
    const dayMs = dateMs(100 * century + yy, month, day);
    if (dayMs === null)
      return unreadable(`expected a date of the calendar, came ${JSON.stringify(`${century}${date}`)}`);
    const baseCell = line.slice(16, 20);
    const base = baseCell.trim() === '' ? 0 : numberIn(baseCell);
    if (base === null) return unreadable(`expected a base value in 100 nT, came ${JSON.stringify(baseCell)}`);
    const values: number[] = [];
    for (let hour = 0; hour < 24; hour++) {
      const cell = line.slice(20 + 4 * hour, 24 + 4 * hour);
      const value = cell.trim() === '' ? MISSING : numberIn(cell);
      if (value === null) return unreadable(`expected a value of Dst in nT, came ${JSON.stringify(cell)}`);
      values.push(value === MISSING ? Number.NaN : 100 * base + value);
    }
    const mean = values.reduce((a, b) => a + b, 0) / 24;
    const stated = numberIn(line.slice(116, 120));
    if (stated !== null && stated !== MISSING && Math.abs(mean - (100 * base + stated)) > 1)
      doubt(
        `the mean of the 24 values is ${mean.toFixed(1)} nT, and the row holds ${100 * base + stated} nT`,
      );
    const status = STATUSES[line[13]!] ?? 'not-stated';
    values.forEach((value, hour) => {
      add('dst', dayMs + hour * INDEX_LENGTH_MS.dst, value, status);
    });
    return null;
  },
};
