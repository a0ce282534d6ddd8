import type { Resolution } from '../decimalCounter.js';
import { LONGEST_LINE } from '../lines.js';
import { type Message, message, quoted } from '../messages.js';
import { coarseColumn, HEIGHTS, MINUTES } from '../resolution.js';
import type { SentenceFault } from './sentence.js';

/** How often something came, and the line where it came first. */
export interface Tally {
  count: number;
  readonly firstRow: number;
}

const lines = (count: number): string => (count === 1 ? '1 line' : `${count} lines`);
const areSentences = (count: number): string => (count === 1 ? '1 sentence is' : `${count} sentences are`);

/** A log without any GGA sentence. */
export function noRows(file: string, noiseTally: Tally | null, hasOthers: boolean): Message {
  const others = hasOthers ? 'other sentences' : 'none';
  const came = noiseTally === null ? others : `${others} and ${lines(noiseTally.count)} of other content`;
  const text = `Expected GGA sentences, came ${came}. Record GGA with RMC and GST as NMEA 0183 text.`;
  return message('warning', 'empty-log', text, { file });
}

/** Lines that hold no sentence; null when there are none. */
export function noise(file: string, tally: Tally | null): Message | null {
  if (tally === null) return null;
  const text = `Expected NMEA 0183 sentences, came ${lines(tally.count)} of other content: passed over. Nothing is wrong where the receiver records more than sentences.`;
  return message('info', 'noise', text, { file, row: tally.firstRow });
}

/** Lines that are too long to be read whole; null when there are none. */
export function longLines(file: string, tally: Tally | null): Message | null {
  if (tally === null) return null;
  const text = `Expected lines of at most ${LONGEST_LINE} characters, came ${lines(tally.count)} with more: what stands beyond is not read. End each sentence with a line break.`;
  return message('warning', 'long-line', text, { file, row: tally.firstRow });
}

const FAULTS = {
  checksum: {
    code: 'wrong-checksum',
    expected: 'sentences whose checksum holds, came others',
    remedy: 'Copy or export the log again when there are many.',
  },
  'no-checksum': {
    code: 'no-checksum',
    expected: 'sentences with a checksum, came some without, which may be damaged unseen',
    remedy: 'Switch the checksum on and export again.',
  },
  truncated: {
    code: 'truncated-sentence',
    expected: 'whole sentences, came parts',
    remedy: 'Look for a line to the recorder that was too slow when there are many.',
  },
} as const;

/** Sentences of the types read here that are damaged; null when there are none. */
export function faultySentences(
  file: string,
  fault: Exclude<SentenceFault, 'other-sentence'>,
  tally: Tally | null,
): Message | null {
  if (tally === null) return null;
  const { code, expected, remedy } = FAULTS[fault];
  const text = `Expected ${expected}: ${areSentences(tally.count)} not read. ${remedy}`;
  return message('warning', code, text, { file, row: tally.firstRow });
}

/** A field of undamaged sentences that could not be understood. */
export function unreadValue(
  file: string,
  column: string,
  { text: came, count, firstRow }: Tally & { readonly text: string },
): Message {
  const text = `Expected a value as NMEA 0183 writes it, came ${quoted(came)}: ${areSentences(count)} read without it. Export the log again when there are many.`;
  return message('warning', 'unread-value', text, { file, row: firstRow, column });
}

/** Rows without a date; null when there are none. */
export function noDate(file: string, tally: Tally | null): Message | null {
  if (tally === null) return null;
  const have = tally.count === 1 ? '1 row has' : `${tally.count} rows have`;
  const text = `Expected a date for every row from valid RMC or ZDA sentences, came a time of day alone: ${have} no date. State the date in the constants of the layout or in the file name.`;
  return message('warning', 'no-date', text, { file, row: tally.firstRow });
}

const DAY_MS = 86_400_000;

/** The sentences and the layout or file name disagree by more than the day by which local and UTC dates may differ. */
export function differingDate(file: string, differenceMs: number): Message | null {
  const days = Math.round(differenceMs / DAY_MS);
  if (Number.isNaN(days) || Math.abs(days) <= 1) return null;
  const text = `Expected the date of the layout or the file name, came one ${Math.abs(days)} days ${days > 0 ? 'later' : 'earlier'} in the sentences: the sentences are believed. Correct the one that is wrong.`;
  return message('warning', 'date-differs', text, { file });
}

const TOLD_STATIONS = 5;

/** More than one reference station; null for one or none. */
export function changedStation(file: string, firstRows: ReadonlyMap<string, number>): Message | null {
  const stations = [...firstRows];
  if (stations.length < 2) return null;
  const told = stations.slice(0, TOLD_STATIONS).map(([name, row]) => `${quoted(name)} from row ${row}`);
  const more = stations.length > TOLD_STATIONS ? ` and ${stations.length - TOLD_STATIONS} more` : '';
  const text = `Expected corrections of one reference station, came the numbers ${told.join(', ')}${more}. Check which bases these are, and split the log where the base changes.`;
  return message('warning', 'station-changed', text, { file, row: stations[1]![1] });
}

/** Coordinates rounded to more than a millimetre; null when they are finer. */
export const coarseMinutes = (file: string, resolution: Resolution | null): Message | null =>
  coarseColumn(file, resolution, MINUTES);

/** Heights rounded to more than a millimetre; null when they are finer. */
export const coarseHeights = (file: string, resolution: Resolution | null): Message | null =>
  coarseColumn(file, resolution, HEIGHTS);
