import { DecimalCounter } from '../decimalCounter.js';
import type { Message } from '../messages.js';
import { HEIGHTS, type LogResolution, MINUTES, stepMm } from '../resolution.js';
import {
  changedStation,
  coarseHeights,
  coarseMinutes,
  differingDate,
  faultySentences,
  longLines,
  noDate,
  noise,
  noRows,
  type Tally,
  unreadValue,
} from './noteMessages.js';
import type { GgaRow } from './readGga.js';
import type { FaultySentence, SentenceFault } from './sentence.js';

/** Different reference stations that are remembered. */
const MOST_STATIONS = 1000;

/** Counts what is told of an NMEA log once, however many sentences it concerns. */
export class NmeaNotes {
  readonly #faults = new Map<SentenceFault, Tally>();
  readonly #unread = new Map<string, Tally & { readonly text: string }>();
  /** Number of a reference station → its first row. */
  readonly #stations = new Map<string, number>();
  readonly #minutes = new DecimalCounter();
  readonly #heights = new DecimalCounter();
  #noise: Tally | null = null;
  #longLines: Tally | null = null;
  #dateless: Tally | null = null;

  constructor(readonly file: string) {}

  /** A line in which there is no sentence. */
  noise(row: number): void {
    this.#noise = counted(this.#noise, row);
  }

  /** A line too long to be read whole. */
  longLine(row: number): void {
    this.#longLines = counted(this.#longLines, row);
  }

  fault({ fault }: FaultySentence, row: number): void {
    this.#faults.set(fault, counted(this.#faults.get(fault), row));
  }

  /** A value that could not be read, of a sentence that is used without it. */
  unread(column: string, text: string, row: number): void {
    const before = this.#unread.get(column);
    this.#unread.set(column, { text: before?.text ?? text, ...counted(before, row) });
  }

  /** A row without a date. */
  dateless(row: number): void {
    this.#dateless = counted(this.#dateless, row);
  }

  add({ row, fix, station, minuteDecimals, heightDecimals }: GgaRow): void {
    if (minuteDecimals < 0) return;
    this.#minutes.add(minuteDecimals, row);
    this.#heights.add(heightDecimals, row);
    // Without corrections the number of the station is left over from before, or zero.
    if (fix === 'other' || station === '' || this.#stations.size >= MOST_STATIONS) return;
    if (!this.#stations.has(station)) this.#stations.set(station, row);
  }

  /** In what steps the positions are written; null before the first. */
  resolution(): LogResolution | null {
    const [minutes, heights] = [this.#minutes.resolution(), this.#heights.resolution()];
    if (minutes === null || heights === null) return null;
    return { horizontalStepMm: stepMm(minutes, MINUTES), verticalStepMm: stepMm(heights, HEIGHTS) };
  }

  /**
   * @param rowsRead GGA sentences, faulty ones included
   * @param firstStatedDifferenceMs see DateKeeper
   */
  messages(rowsRead: number, firstStatedDifferenceMs: number): Message[] {
    const { file } = this;
    const others = this.#faults.has('other-sentence');
    return [
      rowsRead === 0 ? noRows(file, this.#noise, others) : noise(file, this.#noise),
      longLines(file, this.#longLines),
      ...(['checksum', 'no-checksum', 'truncated'] as const).map((fault) =>
        faultySentences(file, fault, this.#faults.get(fault) ?? null),
      ),
      ...[...this.#unread].map(([column, unread]) => unreadValue(file, column, unread)),
      noDate(file, this.#dateless),
      differingDate(file, firstStatedDifferenceMs),
      changedStation(file, this.#stations),
      coarseMinutes(file, this.#minutes.resolution()),
      coarseHeights(file, this.#heights.resolution()),
    ].filter((message) => message !== null);
  }
}

/** One more; the tally is changed in place. */
function counted(tally: Tally | null | undefined, row: number): Tally {
  if (tally === null || tally === undefined) return { count: 1, firstRow: row };
  tally.count += 1;
  return tally;
}
