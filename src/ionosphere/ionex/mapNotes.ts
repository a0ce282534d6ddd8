import { type Message, message } from '../../logs/index.js';
import { counted, instantWords } from '../words.js';
import type { IonexHeader } from './header.js';
import type { MapBlock } from './mapBlock.js';

/**
 * What does not fit together in a file that could be read.
 * @param tec its maps of TEC, one an epoch, in order of time
 */
export function mapNotes(
  header: IonexHeader,
  blocks: readonly MapBlock[],
  tec: readonly MapBlock[],
  file: string,
): Message[] {
  return [
    ...countNote(header, blocks, tec, file),
    ...gapNote(header, tec, file),
    ...repeatedNote(blocks, tec, file),
    ...exponentNote(header, blocks, file),
    ...unmatchedNote(blocks, tec, file),
    ...missingNote(tec, file),
  ];
}

function countNote(
  { mapCount, firstMs, lastMs }: IonexHeader,
  blocks: readonly MapBlock[],
  tec: readonly MapBlock[],
  file: string,
): Message[] {
  const [first, last] = [tec[0]!.epochMs, tec.at(-1)!.epochMs];
  const count = blocks.filter(({ kind }) => kind === 'TEC').length;
  const early = firstMs !== null && first !== firstMs;
  const late = lastMs !== null && last !== lastMs;
  if ((mapCount === null || count === mapCount) && !early && !late) return [];
  const announced = [
    ...(mapCount === null ? [] : [counted(mapCount, 'map')]),
    ...(firstMs === null ? [] : [`from ${instantWords(firstMs)}`]),
    ...(lastMs === null ? [] : [`to ${instantWords(lastMs)}`]),
  ].join(' ');
  return [
    message(
      'warning',
      'map-count',
      `Expected ${announced} as the header says, came ${counted(count, 'map')} of TEC from ${instantWords(first)} to ${instantWords(last)}. Times outside them have no TEC: get the file again if it should hold more.`,
      { file },
    ),
  ];
}

function gapNote({ intervalSeconds }: IonexHeader, tec: readonly MapBlock[], file: string): Message[] {
  if (intervalSeconds <= 0) return [];
  const at = tec.findIndex(
    ({ epochMs }, i) => i > 0 && epochMs - tec[i - 1]!.epochMs > 1000 * intervalSeconds,
  );
  if (at < 0) return [];
  return [
    message(
      'warning',
      'map-gap',
      `Expected a map every ${intervalSeconds} s, came none between ${instantWords(tec[at - 1]!.epochMs)} and ${instantWords(tec[at]!.epochMs)}. Values there are interpolated over the gap: get the file again for better ones.`,
      { file, row: tec[at]!.line },
    ),
  ];
}

function repeatedNote(blocks: readonly MapBlock[], tec: readonly MapBlock[], file: string): Message[] {
  const repeated = blocks.filter(({ kind }) => kind === 'TEC').find((block) => !tec.includes(block));
  if (repeated === undefined) return [];
  return [
    message(
      'warning',
      'map-repeated',
      `Expected one map of TEC an epoch, came two for ${instantWords(repeated.epochMs)}. The last one is used; get the file again.`,
      { file, row: repeated.line },
    ),
  ];
}

/** The format lets an exponent hold from where it stands; files exist in which it was meant for one map. */
function exponentNote(header: IonexHeader, blocks: readonly MapBlock[], file: string): Message[] {
  const at = blocks.findIndex(
    ({ exponent, statesExponent }) => !statesExponent && exponent !== header.exponent,
  );
  if (at < 0) return [];
  const { exponent, line } = blocks[at]!;
  return [
    message(
      'warning',
      'map-exponent',
      `Expected values in units of 10^${header.exponent} as the header says, came an exponent of ${exponent} in an earlier map, which holds from there on. If TEC is ten times too large or too small from this map on, correct the file.`,
      { file, row: line },
    ),
  ];
}

function unmatchedNote(blocks: readonly MapBlock[], tec: readonly MapBlock[], file: string): Message[] {
  const epochs = new Set(tec.map(({ epochMs }) => epochMs));
  const lost = blocks.filter(({ kind, epochMs }) => kind !== 'TEC' && !epochs.has(epochMs));
  if (lost.length === 0) return [];
  return [
    message(
      'warning',
      'map-unmatched',
      `Expected maps of errors and heights at the epochs of the maps of TEC, came ${lost.length} at others, the first for ${instantWords(lost[0]!.epochMs)}. They are left out; get the file again.`,
      { file, row: lost[0]!.line },
    ),
  ];
}

function missingNote(tec: readonly MapBlock[], file: string): Message[] {
  const missing = tec.reduce((total, map) => total + map.missing, 0);
  if (missing === 0) return [];
  const all = tec.length * tec[0]!.values.length;
  return [
    message(
      'info',
      'map-missing-values',
      `Of ${all} values ${missing} are marked as missing. Places beside them have no TEC; another file may hold it.`,
      { file, row: tec.find((map) => map.missing > 0)!.line },
    ),
  ];
}
