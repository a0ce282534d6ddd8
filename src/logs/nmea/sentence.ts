/** The sentences of NMEA 0183 that say something about a position. */
export type SentenceType = 'GGA' | 'GST' | 'RMC' | 'ZDA' | 'GSA';

/**
 * What is wrong with a sentence. `checksum`: it does not hold; `no-checksum`: whole but for the checksum, so nothing
 * says that it is undamaged; `truncated`: a part is missing; `other-sentence`: of a type that is not read here.
 */
export type SentenceFault = 'checksum' | 'no-checksum' | 'truncated' | 'other-sentence';

/** An undamaged sentence; `fields[0]` is the address (`GPGGA`), `fields[1]` the first field after it. */
export interface Sentence {
  readonly kind: 'sentence';
  readonly type: SentenceType;
  readonly fields: readonly string[];
}

/** A sentence that is not read. */
export interface FaultySentence {
  readonly kind: 'fault';
  readonly fault: SentenceFault;
  /** Null for other sentences. */
  readonly type: SentenceType | null;
  /** What is to be said to the user, as part of a sentence. */
  readonly detail: string;
}

const DOLLAR = '$';
const STAR = 42;
const COMMA = 44;
const LETTER_P = 80;

/** Commas of a whole sentence; later versions of the standard append fields. */
const COMMAS: Readonly<Record<SentenceType, number>> = { GGA: 14, GST: 8, RMC: 11, ZDA: 6, GSA: 17 };

const NOTHING: readonly (Sentence | FaultySentence)[] = [];
const OTHER: FaultySentence = { kind: 'fault', fault: 'other-sentence', type: null, detail: '' };

/**
 * The sentences in a line of text, in their order, wherever in the line they stand: each goes from `$` to `*` and two
 * hexadecimal digits, and what stands between sentences is passed over. A sentence ends at the latest where the next
 * `$` or the end of the line is. Any talker is understood (`GP`, `GN`, `GL`, …) but `P`, which marks sentences with
 * a maker's own fields.
 */
export function findSentences(line: string): readonly (Sentence | FaultySentence)[] {
  let start = line.indexOf(DOLLAR);
  if (start < 0) return NOTHING;
  const found: (Sentence | FaultySentence)[] = [];
  while (start >= 0) {
    const next = line.indexOf(DOLLAR, start + 1);
    const end = next < 0 ? line.length : next;
    const type = typeAt(line, start);
    if (type !== null) found.push(readSentence(line, start, end, type));
    else if (isAddress(line, start)) found.push(OTHER);
    start = next;
  }
  return found;
}

const twoHex = (value: number): string => value.toString(16).toUpperCase().padStart(2, '0');

function readSentence(
  line: string,
  start: number,
  end: number,
  type: SentenceType,
): Sentence | FaultySentence {
  let xor = 0;
  let bits = 0;
  let star = start + 1;
  for (; star < end; star++) {
    const code = line.charCodeAt(star);
    if (code === STAR) break;
    xor ^= code;
    bits |= code;
  }
  if (star === end && countCommas(line, start, end) >= COMMAS[type])
    return fault(type, 'no-checksum', NO_CHECKSUM);
  if (star + 2 >= end) return fault(type, 'truncated', TRUNCATED);
  if (bits > 127) return fault(type, 'checksum', NOT_PLAIN);
  const stated = 16 * hexDigit(line.charCodeAt(star + 1)) + hexDigit(line.charCodeAt(star + 2));
  if (stated !== xor) {
    const text = JSON.stringify(line.slice(star + 1, star + 3));
    return fault(
      type,
      'checksum',
      `expected the checksum ${text} that the sentence states, came characters with "${twoHex(xor)}"`,
    );
  }
  // Exchanged characters do not change the checksum: the address may be damaged nevertheless.
  if (line.charCodeAt(start + 6) !== COMMA) return fault(type, 'truncated', TRUNCATED);
  return { kind: 'sentence', type, fields: line.slice(start + 1, star).split(',') };
}

const fault = (type: SentenceType, kind: SentenceFault, detail: string): FaultySentence => ({
  kind: 'fault',
  fault: kind,
  type,
  detail,
});

const NOT_PLAIN = 'expected a sentence of plain characters, came other bytes in it';
const NO_CHECKSUM =
  'expected a sentence that ends with its checksum, came one without, which may be damaged unseen';
const TRUNCATED = 'expected a whole sentence from $ to its checksum, came a part of one';

/** The type of the sentence whose `$` stands at `start`; null for all that is no `$xxGGA`, `$xxGST`, …. */
function typeAt(line: string, start: number): SentenceType | null {
  const talker = line.charCodeAt(start + 1);
  if (talker === LETTER_P || !isUpper(talker) || !isUpperOrDigit(line.charCodeAt(start + 2))) return null;
  const at = start + 3;
  switch (line.charCodeAt(at)) {
    case 71: // G
      if (line.startsWith('GGA', at)) return 'GGA';
      if (line.startsWith('GST', at)) return 'GST';
      return line.startsWith('GSA', at) ? 'GSA' : null;
    case 82: // R
      return line.startsWith('RMC', at) ? 'RMC' : null;
    case 90: // Z
      return line.startsWith('ZDA', at) ? 'ZDA' : null;
    default:
      return null;
  }
}

/** Whether letters and a comma follow, as in every sentence: else `$` is noise. */
function isAddress(line: string, start: number): boolean {
  let at = start + 1;
  while (isUpperOrDigit(line.charCodeAt(at))) at++;
  return at - start > 3 && isUpper(line.charCodeAt(start + 1)) && line.charCodeAt(at) === COMMA;
}

const isUpper = (code: number): boolean => code >= 65 && code <= 90;

const isUpperOrDigit = (code: number): boolean => isUpper(code) || (code >= 48 && code <= 57);

/** The value of a hexadecimal digit in either case; NaN for other characters. */
function hexDigit(code: number): number {
  if (code >= 48 && code <= 57) return code - 48;
  if (code >= 65 && code <= 70) return code - 55;
  return code >= 97 && code <= 102 ? code - 87 : Number.NaN;
}

function countCommas(line: string, start: number, end: number): number {
  let count = 0;
  for (let at = start; at < end; at++) if (line.charCodeAt(at) === COMMA) count++;
  return count;
}
