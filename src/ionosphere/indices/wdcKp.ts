import { kpOfThirds } from '../kp.js';
import { dateMismatch, dateMs, daysBetween, type IndexLayout, numberIn, unreadable } from './indexLine.js';
import { INDEX_LENGTH_MS } from './indexSeries.js';
import { apDailyDoubt, knownValue, kpDoubt, kpFault } from './kpValues.js';

/** Through Ap; Cp and C9 behind it repeat what ap says. */
const NEEDED_COLUMNS = 58;
/** First day of Bartels' solar rotation 1; a rotation is 27 days. */
const ROTATION_START_MS = Date.UTC(1832, 1, 8);
/** Kp begins in 1932: without a rotation number two digits of a year mean the hundred years from then on. */
const FIRST_YEAR = 1932;

/** The last digit tells the third: 27 is 3-, 30 is 3, 33 is 3+. */
const THIRDS: Readonly<Record<number, number>> = { 0: 0, 3: 1, 7: 2 };

/**
 * The fixed columns of the world data centres for Kp: yy 1-2, mm 3-4, dd 5-6, Bartels rotation 7-10, its day 11-12,
 * eight Kp of 2 columns 13-28, their sum 29-31, eight ap of 3 columns 32-55, Ap 56-58, Cp 59-61, C9 62. The file does
 * not say which values are final.
 */
export const wdcKp: IndexLayout = {
  words: 'the fixed columns of Kp and ap, one day a row',
  matches: (line) => line.length >= NEEDED_COLUMNS && /^[ \d]\d[ \d]\d[ \d]\d[ \d]{50}[ \d]{2}/.test(line),
  read: (line, add, doubt) => {
    if (line.trimEnd().length < NEEDED_COLUMNS)
      return unreadable(`expected 62 columns in the row, came ${line.trimEnd().length}`);
    const day = dayOf(line);
    if (typeof day !== 'number') return day;
    const codes = fixed(line, 12, 2);
    const ap = fixed(line, 31, 3);
    const apDaily = numberIn(line.slice(55, 58)) ?? Number.NaN;
    const kp = codes.map(kpOfCode);
    for (let k = 0; k < 8; k++) {
      if (codes[k] !== 99 && !Number.isNaN(codes[k]) && Number.isNaN(kp[k]))
        return unreadable(`expected a Kp such as 27, 30 or 33, came ${codes[k]}`);
      const fault = kpFault(kp[k]!, knownValue(ap[k]!));
      if (fault !== null) return fault;
    }
    const sum = numberIn(line.slice(28, 31));
    const known = kp.every((value) => !Number.isNaN(value));
    const kpSum = kp.reduce((a, b) => a + Math.round(b * 3), 0);
    if (sum !== null && known && codeOfThirds(kpSum) !== sum)
      doubt(`the eight Kp add up to ${codeOfThirds(kpSum)}, and the row holds ${sum}`);
    for (const text of [...kp.map((value, k) => kpDoubt(value, ap[k]!)), apDailyDoubt(ap, apDaily)])
      if (text !== null) doubt(text);
    for (let k = 0; k < 8; k++) {
      add('kp', day + k * INDEX_LENGTH_MS.kp, kp[k]!, 'not-stated');
      add('ap', day + k * INDEX_LENGTH_MS.ap, knownValue(ap[k]!), 'not-stated');
    }
    add('apDaily', day, knownValue(apDaily), 'not-stated');
    return null;
  },
};

/** Eight numbers of equal width; NaN for blanks. */
const fixed = (line: string, from: number, width: number): number[] =>
  Array.from(
    { length: 8 },
    (_, k) => numberIn(line.slice(from + k * width, from + (k + 1) * width)) ?? Number.NaN,
  );

/** NaN for a missing value and for what is no code of Kp. */
function kpOfCode(code: number): number {
  const third = THIRDS[code % 10];
  if (third === undefined || code > 90) return Number.NaN;
  // the code of 3- is 27: two thirds above 2
  return kpOfThirds(3 * Math.floor(code / 10) + third);
}

const codeOfThirds = (thirds: number): number => 10 * Math.floor(thirds / 3) + [0, 3, 7][thirds % 3]!;

/** The day of a row. The rotation number settles the century, and contradicts a date that was damaged. */
function dayOf(line: string): number | ReturnType<typeof unreadable> {
  const [year, month, day] = [0, 2, 4].map((at) => numberIn(line.slice(at, at + 2))) as [
    number | null,
    number | null,
    number | null,
  ];
  const rotation = numberIn(line.slice(6, 10));
  const dayOfRotation = numberIn(line.slice(10, 12));
  const date = line.slice(0, 6);
  if (year === null || month === null || day === null)
    return unreadable(`expected year, month and day of two digits each, came ${JSON.stringify(date)}`);
  const usual = dateMs(year + (year < FIRST_YEAR % 100 ? 2000 : 1900), month, day);
  // every year that is a leap year in one of these centuries is one in 2000 to 2099
  if (dateMs(2000 + year, month, day) === null || (usual === null && rotation === null))
    return unreadable(`expected a date of the calendar as yymmdd, came ${JSON.stringify(date)}`);
  if (rotation === null || dayOfRotation === null) return usual!;
  const count = 27 * (rotation - 1) + dayOfRotation - 1;
  for (const century of [1900, 2000, 2100]) {
    const ms = dateMs(century + year, month, day);
    if (ms !== null && daysBetween(ROTATION_START_MS, ms) === count) return ms;
  }
  return dateMismatch(
    `the date ${JSON.stringify(date)} is not day ${dayOfRotation} of the solar rotation ${rotation}`,
  );
}
