import { DateKeeper, type DateKeeperOptions } from './dates.js';
import type { GgaRow } from './readGga.js';

/** All that sentences say of one time of day. Numbers that they do not give are NaN. */
export interface Epoch {
  readonly timeOfDayMs: number;
  readonly statedMs: number;
  readonly rows: readonly GgaRow[];
  /** From GSA. */
  readonly pdop: number;
  /** From GST: root mean square of the standard deviations of latitude and longitude, and that of the height. */
  readonly horizontalSigmaM: number;
  readonly verticalSigmaM: number;
}

interface OpenEpoch extends Epoch {
  statedMs: number;
  readonly rows: GgaRow[];
  pdop: number;
  horizontalSigmaM: number;
  verticalSigmaM: number;
  /** Whether another sentence came after the last GGA. */
  followed: boolean;
}

/** Epochs to which a late sentence can still be joined. */
const OPEN_EPOCHS = 3;
/** After more time the same time of day is that of another day. */
const LATEST_MS = 60_000;
/** Rows of one epoch, so that a clock that stands still does not fill the memory. */
const MOST_ROWS = 100;

/**
 * Joins sentences of the same time of day, in whatever order they stand in their block, and finds the date of each
 * epoch. When two sentences of a type give the same value, the first holds. GSA has no time of day: it belongs to the
 * block in which it stands, that is to the sentences before it; in a file that begins with GSA it leads the block and
 * belongs to the sentences after it.
 */
export class EpochJoiner {
  readonly #keeper: DateKeeper<Epoch>;
  readonly #open: OpenEpoch[] = [];
  #gsaLeads = false;
  #leadingPdop = Number.NaN;

  /** @param emit takes each epoch with rows, in their order, and midnight of its date (UTC milliseconds) or NaN */
  constructor(options: DateKeeperOptions, emit: (epoch: Epoch, dayMs: number) => void) {
    this.#keeper = new DateKeeper(options, emit);
  }

  gga(row: GgaRow): void {
    // A block that is followed comes a second time: the file was joined twice, or it is the same time of another day.
    this.#find(row.timeOfDayMs, (epoch) => !epoch.followed && epoch.rows.length < MOST_ROWS).rows.push(row);
  }

  gst(timeOfDayMs: number, horizontalSigmaM: number, verticalSigmaM: number): void {
    const epoch = this.#timed(timeOfDayMs);
    if (Number.isNaN(epoch.horizontalSigmaM)) epoch.horizontalSigmaM = horizontalSigmaM;
    if (Number.isNaN(epoch.verticalSigmaM)) epoch.verticalSigmaM = verticalSigmaM;
  }

  /** A date, from RMC or ZDA: its midnight, UTC milliseconds. */
  date(timeOfDayMs: number, dateMs: number): void {
    const epoch = this.#timed(timeOfDayMs);
    if (Number.isNaN(epoch.statedMs)) epoch.statedMs = dateMs;
    else if (epoch.statedMs !== dateMs) this.#begin(timeOfDayMs).statedMs = dateMs;
  }

  gsa(pdop: number): void {
    const epoch = this.#open.at(-1);
    if (epoch === undefined) this.#gsaLeads = true;
    if (epoch === undefined || this.#gsaLeads) {
      if (Number.isNaN(this.#leadingPdop)) this.#leadingPdop = pdop;
      return;
    }
    epoch.followed = epoch.rows.length > 0;
    if (Number.isNaN(epoch.pdop)) epoch.pdop = pdop;
  }

  /** Gives out all that still waits. */
  end(): void {
    for (const epoch of this.#open.splice(0)) this.#keeper.add(epoch);
    this.#keeper.end();
  }

  /** See DateKeeper. */
  get firstStatedDifferenceMs(): number {
    return this.#keeper.firstStatedDifferenceMs;
  }

  /** The epoch of a sentence other than GGA. */
  #timed(timeOfDayMs: number): OpenEpoch {
    const epoch = this.#find(timeOfDayMs, () => true);
    epoch.followed = epoch.rows.length > 0;
    return epoch;
  }

  /** The last epoch of this time of day if it can be joined, else a new one. */
  #find(timeOfDayMs: number, canJoin: (epoch: OpenEpoch) => boolean): OpenEpoch {
    const latestMs = this.#open.at(-1)?.timeOfDayMs ?? Number.NaN;
    const epoch =
      Math.abs(latestMs - timeOfDayMs) <= LATEST_MS
        ? this.#open.findLast((open) => open.timeOfDayMs === timeOfDayMs)
        : undefined;
    if (epoch === undefined || !canJoin(epoch)) return this.#begin(timeOfDayMs);
    if (!Number.isNaN(this.#leadingPdop)) {
      // GSA between two sentences of one time does not lead the block: the file began within a block.
      this.#gsaLeads = false;
      if (Number.isNaN(epoch.pdop)) epoch.pdop = this.#leadingPdop;
      this.#leadingPdop = Number.NaN;
    }
    return epoch;
  }

  #begin(timeOfDayMs: number): OpenEpoch {
    if (this.#open.length === OPEN_EPOCHS) this.#keeper.add(this.#open.shift()!);
    const epoch: OpenEpoch = {
      timeOfDayMs,
      statedMs: Number.NaN,
      rows: [],
      pdop: this.#leadingPdop,
      horizontalSigmaM: Number.NaN,
      verticalSigmaM: Number.NaN,
      followed: false,
    };
    this.#leadingPdop = Number.NaN;
    this.#open.push(epoch);
    return epoch;
  }
}
