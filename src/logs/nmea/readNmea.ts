import { parseIsoTime } from '../../time/index.js';
import type { CoordinateChanges } from '../coordinateChanges.js';
import { LONGEST_LINE, readLines } from '../lines.js';
import { NO_EXTRAS, type Position, type PositionExtras } from '../position.js';
import type { LogBatch } from '../readLogs.js';
import type { RowReason, SetAsideRow } from '../reasons.js';
import { type Epoch, EpochJoiner } from './epochs.js';
import { covariate, type TellUnread, timeOfDayMs } from './fields.js';
import { NmeaNotes } from './notes.js';
import { readDate } from './readDate.js';
import { readGga } from './readGga.js';
import { findSentences, type Sentence } from './sentence.js';

/** A log of NMEA 0183 sentences. */
export interface NmeaLog {
  readonly path: string;
  /** Name in messages and accounts. */
  readonly file: string;
  /** UTC date on which the file begins, YYYY-MM-DD, for rows that no RMC or ZDA dates; null when not known. */
  readonly date: string | null;
  /** How places and heights become those that the study compares; default none. */
  readonly changes?: CoordinateChanges | undefined;
  /** Rows that may wait for a date stated further down; what exceeds them is read as if none came. Default 100 000. */
  readonly mostHeld?: number;
}

const MOST_HELD = 100_000;

/**
 * Positions of a log of NMEA 0183 sentences, as a stream in the order of rows. A row is a GGA sentence and its number
 * the line in which it stands; texts that NMEA has no place for (mark, base, setup, rover, crew) are empty. Heights are
 * ellipsoidal. Damaged sentences, and those without a checksum, are set aside as unreadable. Memory does not depend on
 * the length of the file.
 * @throws RangeError when `date` is no date
 */
export async function* readNmea(log: NmeaLog): AsyncGenerator<LogBatch> {
  const reader = new NmeaReader(log);
  for await (const { firstLine, lines } of readLines(log.path)) {
    for (let i = 0; i < lines.length; i++) reader.take(lines[i]!, firstLine + i);
    yield reader.batch();
  }
  yield reader.end();
}

class NmeaReader {
  readonly #file: string;
  readonly #notes: NmeaNotes;
  readonly #joiner: EpochJoiner;
  readonly #changes: CoordinateChanges;
  #rowsRead = 0;
  #positions: Position[] = [];
  #setAside: SetAsideRow[] = [];
  #extras: PositionExtras | null = null;

  constructor({ file, date, changes = {}, mostHeld = MOST_HELD }: NmeaLog) {
    this.#file = file;
    this.#changes = changes;
    this.#notes = new NmeaNotes(file);
    const fileDateMs = date === null ? Number.NaN : midnightMs(date);
    this.#joiner = new EpochJoiner({ fileDateMs, mostHeld }, (epoch, dayMs) => this.#emit(epoch, dayMs));
  }

  take(line: string, row: number): void {
    const found = findSentences(line);
    if (found.length === 0 && line.trim() !== '') this.#notes.noise(row);
    if (line.length > LONGEST_LINE) this.#notes.longLine(row);
    for (const sentence of found) {
      if (sentence.kind === 'sentence') this.#join(sentence, row);
      else {
        this.#notes.fault(sentence, row);
        if (sentence.type === 'GGA') {
          const column = sentence.fault === 'checksum' ? 'checksum' : null;
          this.#refuse(row, 'unreadable', column, sentence.detail);
        }
      }
    }
  }

  /** What was found since the last batch. Rows that wait for their date are part of a later one. */
  batch(): LogBatch {
    const [positions, setAside] = [this.#positions, this.#setAside];
    this.#positions = [];
    this.#setAside = [];
    const rowsRead = positions.length + setAside.length;
    this.#rowsRead += rowsRead;
    return { file: this.#file, rowsRead, positions, setAside, messages: [] };
  }

  end(): LogBatch {
    this.#joiner.end();
    const batch = this.batch();
    return {
      ...batch,
      resolution: this.#notes.resolution(),
      messages: this.#notes.messages(this.#rowsRead, this.#joiner.firstStatedDifferenceMs),
    };
  }

  #join({ type, fields }: Sentence, row: number): void {
    const tell: TellUnread = (column, text) => this.#notes.unread(column, text, row);
    if (type === 'GGA') {
      const outcome = readGga(fields, row, tell, this.#changes);
      if (outcome.kind === 'row') this.#joiner.gga(outcome);
      else this.#refuse(row, outcome.reason, outcome.column, outcome.detail);
      return;
    }
    if (type === 'GSA') {
      this.#joiner.gsa(covariate(fields[15], 'pdop', tell));
      return;
    }
    const time = fields[1] ?? '';
    const timeMs = timeOfDayMs(time);
    if (Number.isNaN(timeMs)) {
      // Blank before the first satellite is seen.
      if (time !== '') tell('time', time);
      return;
    }
    if (type === 'GST') {
      const { horizontalM, verticalM } = readGst(fields, tell);
      this.#joiner.gst(timeMs, horizontalM, verticalM);
      return;
    }
    const dateMs = readDate(type, fields, tell);
    if (!Number.isNaN(dateMs)) this.#joiner.date(timeMs, dateMs);
  }

  #emit({ timeOfDayMs, rows, pdop, horizontalSigmaM, verticalSigmaM }: Epoch, dayMs: number): void {
    const file = this.#file;
    for (const gga of rows) {
      const { row, fix, latitudeDeg, longitudeDeg, heightM, satellites, ageSeconds, station } = gga;
      this.#notes.add(gga);
      if (Number.isNaN(dayMs)) {
        this.#notes.dateless(row);
        this.#refuse(row, 'outside-study', 'date', NO_DATE);
        continue;
      }
      // Written out: this runs for every row, and spreading objects takes longer than all the rest.
      this.#positions.push({
        file,
        row,
        utcMs: dayMs + timeOfDayMs,
        dateOnly: '',
        mark: '',
        pointNumber: '',
        description: '',
        base: '',
        setup: '',
        rover: '',
        crew: '',
        fix,
        epochs: 1,
        latitudeDeg,
        longitudeDeg,
        heightM,
        satellites,
        pdop,
        ageSeconds,
        horizontalSigmaM,
        verticalSigmaM,
        extras: this.#extrasOf(fix === 'other' ? '' : station),
      });
    }
  }

  /** Rows of one station share one value: it changes seldom. Without corrections its number is left over from before. */
  #extrasOf(station: string): PositionExtras | null {
    if (station === '') return null;
    if (this.#extras?.station !== station) this.#extras = { ...NO_EXTRAS, station };
    return this.#extras;
  }

  #refuse(row: number, reason: RowReason, column: string | null, detail: string): void {
    this.#setAside.push({ file: this.#file, row, reason, column, detail });
  }
}

const NO_DATE =
  'expected a date from RMC, ZDA, the layout or the file name, came none; state the date in the constants of the layout or in the file name';

/** The standard deviations in a GST sentence: root mean square of latitude and longitude, and that of the height. */
function readGst(fields: readonly string[], tell: TellUnread): { horizontalM: number; verticalM: number } {
  const latitudeM = covariate(fields[6], 'horizontalSigma', tell);
  const longitudeM = covariate(fields[7], 'horizontalSigma', tell);
  return {
    horizontalM: Math.sqrt((latitudeM * latitudeM + longitudeM * longitudeM) / 2),
    verticalM: covariate(fields[8], 'verticalSigma', tell),
  };
}

function midnightMs(text: string): number {
  const time = parseIsoTime(text);
  if (time.kind !== 'date') throw new RangeError(`date: expected YYYY-MM-DD, received ${text}`);
  return time.wallMs;
}
