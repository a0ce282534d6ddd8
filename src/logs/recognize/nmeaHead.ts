import type { NmeaLayout } from '../layout.js';
import { findSentences } from '../nmea/sentence.js';
import { dateInName } from './fileDate.js';
import type { HeadText } from './headText.js';
import type { Doubt } from './recognition.js';

/** What the sentences in a head show. */
export interface NmeaHead {
  /** `nmea`: sentences with right checksums; `damaged`: GGA sentences, none of them right. */
  readonly kind: 'nmea' | 'damaged' | 'none';
  readonly dated: boolean;
}

/** Rows of a log of NMEA 0183 are GGA sentences; what stands before the first one may be noise of the line. */
export function nmeaHead({ lines }: HeadText): NmeaHead {
  let [right, wrong, dated, plain] = [0, 0, false, 0];
  for (const { text } of lines) {
    const found = findSentences(text);
    if (found.length === 0 && right > 0 && text.trim() !== '') plain += 1;
    for (const sentence of found) {
      if (sentence.kind === 'sentence') {
        if (sentence.type === 'GGA') right += 1;
        if ((sentence.type === 'RMC' && sentence.fields[9] !== '') || sentence.type === 'ZDA') dated = true;
      } else if (sentence.type === 'GGA') wrong += 1;
    }
  }
  // A table may hold a sentence among its cells, but not in most of its lines beside values of its own.
  if (right > 0 && right >= plain) return { kind: 'nmea', dated };
  return { kind: right === 0 && wrong > 0 && 2 * wrong >= lines.length / 4 ? 'damaged' : 'none', dated };
}

/** Layout of a log of NMEA 0183, and what its sentences leave open. */
export function nmeaLayout(head: NmeaHead, fileName: string): { layout: NmeaLayout; doubts: Doubt[] } {
  const doubts: Doubt[] = [];
  const date = head.dated ? null : dateInName(fileName);
  const fromName = date !== null && date.text === date.day;
  if (!head.dated) {
    doubts.push({
      code: fromName ? 'date-from-file-name' : 'no-date',
      question: fromName
        ? `Is "${date.text}" in the name of the file the date of its first row?`
        : 'On which day (UTC) does the file begin?',
      because: 'No RMC or ZDA sentence states a date.',
      key: fromName ? 'layout.fromFileName' : 'layout.constants.date',
      choices: date === null ? [] : [fromName ? date.pattern : date.day],
      decisive: !fromName,
    });
  }
  doubts.push({
    code: 'no-mark',
    question: 'On which marks were the rows measured?',
    because:
      'Sentences name no mark; beside a constant, nearestMarkM or markTimes of the log may say to which mark a row belongs.',
    key: 'layout.constants.mark',
    choices: [],
    decisive: false,
  });
  return { layout: { kind: 'nmea', ...(fromName ? { fromFileName: date.pattern } : {}) }, doubts };
}
