import type { TimeKind } from './formatFields.js';
import { parseIsoTime } from './isoTime.js';
import { type SampleFormat, sampleFormats } from './sampleFormats.js';
import { compileTimeFormat } from './timeFormat.js';
import { isYearRead } from './yearsRead.js';

/** A format that reads all samples; the object is a TimeLayout as well. */
export interface TimeGuess {
  /** As of compileTimeFormat, or `iso`. */
  readonly format: string;
  readonly kind: TimeKind;
  /** Given when the samples themselves end in Z, UTC or GMT. */
  readonly zone?: 'UTC';
  /** Given when the samples themselves name GPS time. */
  readonly scale?: 'gps';
  /** What the samples leave open, one sentence part each; empty when nothing is. */
  readonly ambiguous: readonly string[];
}

interface Reading {
  readonly kind: TimeKind;
  readonly wallMs: number;
  readonly hasOffset: boolean;
}

interface Candidate extends SampleFormat {
  readonly kind: TimeKind;
  readonly readings: readonly Reading[];
}

const WORD_FORMATS: readonly SampleFormat[] = [
  { format: 'iso', letters: 'yMdHmsS' },
  { format: 'day-of-year', letters: 'yDHmsS' },
  { format: 'excel', letters: '' },
];

function readerOf(format: string): (text: string) => Reading | null {
  if (format !== 'iso') {
    const read = compileTimeFormat(format);
    return (text) => {
      const time = read(text);
      return time && { ...time, hasOffset: false };
    };
  }
  return (text) => {
    const time = parseIsoTime(text);
    if (time.kind === 'invalid') return null;
    if (time.kind === 'instant') return { kind: 'date-time', wallMs: time.utcMs, hasOffset: true };
    return { kind: time.kind === 'date' ? 'date' : 'date-time', wallMs: time.wallMs, hasOffset: false };
  };
}

/** A time of day without colons looks like a number; 12.5 is none. */
const PARTED_TIME = /^HH[^:m]/;
const TWO_DIGITS = /^\d{1,2}\D\d\d(?!\d)/;

/** The candidate with what it reads, or null when it fails a sample or leads to years that no log comes from. */
function tryFormat(candidate: SampleFormat, samples: readonly string[]): Candidate | null {
  const read = readerOf(candidate.format);
  const readings: Reading[] = [];
  for (const sample of samples) {
    const reading = read(sample);
    if (!reading || (reading.kind !== 'time-of-day' && !isYearRead(reading.wallMs))) return null;
    readings.push(reading);
  }
  if (PARTED_TIME.test(candidate.format) && !samples.every((sample) => TWO_DIGITS.test(sample))) return null;
  const kinds = new Set(readings.map(({ kind }) => kind));
  const kind = kinds.has('date-time') ? 'date-time' : readings[0]!.kind;
  return { ...candidate, kind, readings };
}

const dateOrder = (letters: string): string => letters.replaceAll(/[^yMdD]/g, '');

/** Place in the list, best first: the plainer a format, the less likely it fits by chance. */
function rank({ format, letters, kind }: Candidate): number {
  if (format === 'iso') return 0;
  if (format === 'day-of-year') return 8;
  if (format === 'excel') return 12;
  if (kind === 'time-of-day') return format.includes(':') ? 1 : format.startsWith('HHmm') ? 11 : 29;
  const order = ['yMd', 'dMy', 'Mdy', 'yD'].indexOf(dateOrder(letters));
  if (format.includes('yyyy')) return order === 3 ? 28 : 2 + order;
  // years 80 to 99 are the only ones that 19 fits; of short years the day comes first more often
  return (format.includes("'19'") ? 15 : 20) + [2, 0, 1, 4][order]!;
}

/** What the samples leave open if a candidate is meant. */
function openQuestions(guess: Candidate, all: readonly Candidate[], namesZone: boolean): string[] {
  const { format, letters, kind, readings } = guess;
  const notes: string[] = [];
  const list = (found: readonly Candidate[]): string => found.map((other) => other.format).join(', ');
  const order = dateOrder(letters);
  const isReordered = (other: Candidate): boolean =>
    other.kind === kind && [...dateOrder(other.letters)].sort().join() === [...order].sort().join();
  const others = all.filter((other) => other !== guess);
  const reordered = others.filter((other) => isReordered(other) && dateOrder(other.letters) !== order);
  if (reordered.length > 0)
    notes.push(`the samples do not decide the order of day, month and year: also read by ${list(reordered)}`);
  const rest = others.filter((other) => !reordered.includes(other));
  if (rest.length > 0) notes.push(`also read by ${list(rest)}`);
  const century = /'(\d\d)'yy/.exec(format)?.[1];
  if (century) notes.push(`the year has two digits: century ${century} is a guess`);
  const hours = readings.map(({ wallMs }) => Math.floor(wallMs / 3_600_000) % 24);
  if (/HH[^m]/.test(format) && !format.includes("'T'") && hours.every((h) => h >= 1 && h <= 12))
    notes.push('no hour is 0 or past 12 and none has AM or PM: the 24-hour clock is a guess');
  if (kind === 'date-time' && !namesZone && readings.some(({ hasOffset }) => !hasOffset))
    notes.push(
      readings.some(({ hasOffset }) => hasOffset)
        ? 'some samples have no zone: it must be named'
        : 'no zone: it must be named',
    );
  if (format === 'excel')
    notes.push('serial numbers that count from 1904 look the same and would be read four years early');
  return notes;
}

/** Zone or scale named by the text of the samples. */
function namedClock(format: string): Pick<TimeGuess, 'zone' | 'scale'> {
  if (/'(?:z|utc|gmt)'/i.test(format)) return { zone: 'UTC' };
  return /'gpst?'/i.test(format) ? { scale: 'gps' } : {};
}

/**
 * All formats that read every sample (blank ones apart) as a time of the years 1980 to 2099, best first, with what
 * the samples leave open. Formats that read the same times in the same order of day and month are given once. No
 * samples, or none that fit, give an empty list.
 */
export function guessTimeFormats(samples: readonly string[]): TimeGuess[] {
  const texts = [...new Set(samples.map((sample) => sample.trim()))].filter((text) => text !== '');
  if (texts.length === 0) return [];
  // a fraction or a leading digit may be missing in some samples, so both ends are looked at
  const byLength = [...texts].sort((a, b) => b.length - a.length || (a < b ? -1 : 1));
  const looks = new Map(
    [byLength[0]!, byLength.at(-1)!].flatMap(sampleFormats).map((found) => [found.format, found]),
  );
  const found = [...WORD_FORMATS, ...looks.values()]
    .map((candidate) => tryFormat(candidate, texts))
    .filter((candidate) => candidate !== null)
    .sort((a, b) => rank(a) - rank(b) || (a.format < b.format ? -1 : 1));
  const seen = new Set<string>();
  const distinct = found.filter(({ letters, kind, readings }) => {
    const key = [kind, dateOrder(letters), ...readings.map(({ wallMs }) => wallMs)].join();
    return !seen.has(key) && seen.add(key);
  });
  return distinct.map((guess) => {
    const clock = namedClock(guess.format);
    const namesClock = clock.zone !== undefined || clock.scale !== undefined;
    return {
      format: guess.format,
      kind: guess.kind,
      ...clock,
      ambiguous: openQuestions(guess, distinct, namesClock),
    };
  });
}
