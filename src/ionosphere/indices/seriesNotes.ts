import { type Message, message } from '../../logs/index.js';
import { counted, instantWords } from '../words.js';
import { INDEX_STATUSES, INDEX_WORDS, type IndexName, type IndexSeries } from './indexSeries.js';
import type { BuiltSeries, Conflict } from './seriesBuilder.js';

/** Of these the others follow: a gap in Kp is one in ap too, and is told once. */
const TOLD: readonly IndexName[] = ['kp', 'hp30', 'hp60', 'dst', 'f107Observed', 'sunspotNumber'];

/** What the user must know of series: intervals that no row holds or that are missing, values that may change. */
export function seriesNotes({ series, conflicts }: BuiltSeries, file: string): Message[] {
  const told = TOLD.flatMap((name) => (series[name] === undefined ? [] : [[name, series[name]] as const]));
  return [
    ...conflictNotes(conflicts, file),
    ...told.flatMap(([name, one]) => [
      ...gapNotes(name, one, file),
      ...missingNotes(name, one, file),
      ...statusNotes(name, one, file),
    ]),
  ];
}

/** Dst from 3 hours, daily files from 2 days on: what lies between the rows. */
function gapNotes(name: IndexName, { startMs, lengthMs }: IndexSeries, file: string): Message[] {
  let missing = 0;
  let gaps = 0;
  let first = Number.NaN;
  for (let i = 1; i < startMs.length; i++) {
    const step = startMs[i]! - startMs[i - 1]!;
    if (step <= lengthMs) continue;
    if (gaps === 0) first = startMs[i - 1]! + lengthMs;
    gaps += 1;
    missing += step / lengthMs - 1;
  }
  if (gaps === 0) return [];
  const where = gaps === 1 ? `one gap, from` : `${gaps} gaps, the first from`;
  return [
    message(
      'warning',
      'index-gap',
      `Expected ${INDEX_WORDS[name]} without a gap, came a file that lacks ${counted(Math.round(missing), 'interval')} in ${where} ${instantWords(first)} on. What falls there has no value: complete the file if it matters.`,
      { file },
    ),
  ];
}

function missingNotes(name: IndexName, { startMs, values }: IndexSeries, file: string): Message[] {
  const first = values.findIndex(Number.isNaN);
  if (first < 0) return [];
  const count = values.reduce((total, value) => total + (Number.isNaN(value) ? 1 : 0), 0);
  return [
    message(
      'info',
      'index-missing-values',
      `Of ${counted(values.length, 'interval')} ${count} are marked as missing in ${INDEX_WORDS[name]}, the first at ${instantWords(startMs[first]!)}. What falls there has no value; get the file again when they are known.`,
      { file },
    ),
  ];
}

function statusNotes(name: IndexName, { startMs, values, status }: IndexSeries, file: string): Message[] {
  const definitive = INDEX_STATUSES.indexOf('definitive');
  const isOpen = (i: number): boolean =>
    status[i]! > 0 && status[i]! < definitive && !Number.isNaN(values[i]!);
  const open = [...startMs.keys()].filter(isOpen);
  if (open.length === 0) return [];
  const [from, to] = [startMs[open[0]!]!, startMs[open.at(-1)!]!];
  return [
    message(
      'info',
      'index-preliminary',
      `Of ${counted(values.length, 'value')} of ${INDEX_WORDS[name]} ${open.length} are not final, from ${instantWords(from)} to ${instantWords(to)}. They may still change: get the file again later and repeat the study before resting much on them.`,
      { file },
    ),
  ];
}

function conflictNotes(conflicts: readonly Conflict[], file: string): Message[] {
  if (conflicts.length === 0) return [];
  const [{ name, startMs, kept, dropped }] = conflicts as [Conflict];
  return [
    message(
      'warning',
      'index-repeated',
      `Expected one value an interval, came two that differ for ${counted(conflicts.length, 'interval')}, the first ${INDEX_WORDS[name]} at ${instantWords(startMs)}: ${kept} is kept, ${dropped} is not. The more final value is kept, else the last one; remove the rows that are out of date.`,
      { file },
    ),
  ];
}
