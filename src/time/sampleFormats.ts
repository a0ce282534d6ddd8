import { monthOfName } from './monthNames.js';

/** A format that may have been meant by a sample, and its tokens' letters in order of writing (`dMyHms`). */
export interface SampleFormat {
  readonly format: string;
  readonly letters: string;
}

const DATES = ['yMd', 'dMy', 'Mdy', 'yD'];
const TIMES = ['Hm', 'Hms', 'HmsS', 'hma', 'hmsa', 'hmsSa'];
const TIMES_OF_DATES = ['H', 'ha', ...TIMES];
/** Every usual order of tokens. */
const ORDERS = [
  ...DATES,
  ...TIMES,
  ...DATES.flatMap((date) => TIMES_OF_DATES.flatMap((time) => [date + time, time + date])),
];

/** How many digits each token takes when numbers stand without separator. */
const FIXED: Readonly<Record<string, string>> = {
  y: 'yyyy',
  M: 'MM',
  d: 'dd',
  D: 'DDD',
  H: 'HH',
  m: 'mm',
  s: 'ss',
};
/** Numbers usually written without separators, by letters; `Y` is a year of two digits. */
const PACKED = ['yMd', 'dMy', 'Mdy', 'yD', 'YMd', 'dMY', 'MdY'];
const PACKED_TIMES = ['', 'H', 'Hm', 'Hms'];

/** Words that may stand in a time and mean nothing, or a scale. */
const LITERAL_WORD = /^(?:t|z|utc|gmt|gps|gpst|h|m|min|s)$/i;
const PIECES = /\d+|[ap]\.?m\b\.?|[a-z]+|\s+|./gisu;

interface Option {
  readonly letters: string;
  readonly text: string;
}

/** Two-digit years of each century that a log may come from; the rarer first, as only its years 80 to 99 are plausible. */
const CENTURIES = ["'19'yy", "'20'yy"];

/** What a run of digits without separators may hold. */
function packedOptions(length: number): readonly Option[] {
  const options: Option[] = [];
  for (const date of ['', ...PACKED])
    for (const time of PACKED_TIMES) {
      const letters = date + time;
      if (letters.length < 2) continue;
      for (const century of letters.includes('Y') ? CENTURIES : ['']) {
        const text = [...letters].map((letter) => FIXED[letter] ?? century).join('');
        const rest = length - text.replaceAll(/'\d\d'/g, '').length;
        const plain = letters.replace('Y', 'y');
        if (rest === 0) options.push({ letters: plain, text });
        else if (rest === 3 && time === 'Hms') options.push({ letters: `${plain}S`, text: `${text}SSS` });
      }
    }
  // a time of day that was treated as a number has lost its leading 0
  if (length === 5) options.push({ letters: 'Hms', text: 'Hmmss' });
  return options;
}

function digitOptions(length: number): readonly Option[] {
  const options: Option[] = [...packedOptions(length), { letters: 'S', text: 'SSS' }];
  if (length === 4) options.push({ letters: 'y', text: 'yyyy' });
  if (length <= 3) options.push({ letters: 'D', text: 'DDD' });
  if (length > 2) return options;
  if (length === 2) for (const century of CENTURIES) options.push({ letters: 'y', text: century });
  for (const text of ['MM', 'dd', 'HH', 'hh', 'mm', 'ss']) options.push({ letters: text[0]!, text });
  return options;
}

function pieceOptions(piece: string): readonly Option[] {
  if (/^\d/.test(piece)) return digitOptions(piece.length);
  if (/^[ap]\.?m/i.test(piece) && piece.length <= 4) return [{ letters: 'a', text: 'a' }];
  if (/^[a-z]/i.test(piece)) {
    if (monthOfName(piece) > 0) return [{ letters: 'M', text: 'MMM' }];
    return LITERAL_WORD.test(piece) ? [{ letters: '', text: `'${piece}'` }] : [];
  }
  if (piece.trim() === '') return [{ letters: '', text: ' ' }];
  return piece === "'" ? [] : [{ letters: '', text: piece }];
}

const DATE_TOKENS = /'\d\d'yy|yyyy|MM|dd|DDD/g;
const TIME_TOKENS = /HH|hh|mm|ss/g;

/** What stands between neighbouring tokens of a kind. */
function separators(format: string, tokens: RegExp): readonly string[] {
  const places = [...format.matchAll(tokens)].map(({ 0: text, index }) => ({
    index,
    end: index + text.length,
  }));
  return places.slice(1).map(({ index }, i) => format.slice(places[i]!.end, index));
}

/** Whether the marks between numbers are such as people use: alike in a date, alike in a time, a point before parts. */
function isUsual(format: string): boolean {
  const ofDate = separators(format, DATE_TOKENS);
  const ofTime = separators(format, TIME_TOKENS);
  // 2025-03-01 is no hour 01 of day 3
  const hourAfterDay = /yyyy([^D]+)DDD(?:HH|hh|([^Hh]+)[Hh]{2})/.exec(format);
  if (hourAfterDay && hourAfterDay[1] === hourAfterDay[2]) return false;
  if (!format.includes('MMM') && new Set(ofDate).size > 1) return false;
  // no date of a short year has colons or a day of the year
  if (format.includes("'yy") && (ofDate.includes(':') || format.includes('DDD'))) return false;
  if (new Set(ofTime).size > 1 && !ofTime.every((text) => /'(?:h|m|min)'/i.test(text))) return false;
  // two quoted texts side by side would mean something else
  return !format.includes("''") && (!format.includes('SSS') || /ss[.,:]?SSS/.test(format));
}

/** All usual formats that the look of a sample allows; whether they read it is still to be seen. */
export function sampleFormats(sample: string): readonly SampleFormat[] {
  let found: readonly SampleFormat[] = [{ format: '', letters: '' }];
  for (const piece of sample.match(PIECES) ?? []) {
    if (found.length === 0) break;
    const options = pieceOptions(piece);
    found = found.flatMap(({ format, letters }) =>
      options
        .map((option) => ({ format: format + option.text, letters: letters + option.letters }))
        .filter((next) => ORDERS.some((order) => order.startsWith(next.letters))),
    );
  }
  return found.filter(({ format, letters }) => ORDERS.includes(letters) && isUsual(format));
}
