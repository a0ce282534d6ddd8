/** Something at a time of day whose date is to be found. */
export interface TimedEpoch {
  readonly timeOfDayMs: number;
  /** Midnight of the date that it states itself, UTC milliseconds; NaN when it states none. */
  readonly statedMs: number;
  /** Rows that wait for the date; an epoch without rows only tells the date. */
  readonly rows: readonly unknown[];
}

export interface DateKeeperOptions {
  /** Midnight of the day on which the file begins, for epochs that no stated date reaches; NaN when not known. */
  readonly fileDateMs: number;
  /** Rows that may wait for a date. */
  readonly mostHeld: number;
}

const DAY_MS = 86_400_000;
const HALF_DAY_MS = DAY_MS / 2;
/** Late sentences, and clocks that learn their leap seconds, step back by less. */
const SMALL_STEP_MS = 60_000;

interface Held<E> {
  readonly epoch: E;
  readonly dayMs: number;
  readonly sinceStartMs: number;
}

/**
 * Finds the date of epochs that come in the order of the file. A stated date holds from there on, and is carried over
 * midnight: a time of day that falls by more than twelve hours belongs to the next day. It also holds for the epochs
 * before it, which wait for it in bounded number. A fall of one minute to twelve hours breaks this link: the log goes on
 * at another, unknown time, and only a date stated later, or the file's own date, can tell which.
 */
export class DateKeeper<E extends TimedEpoch> {
  readonly #options: DateKeeperOptions;
  readonly #emit: (epoch: E, dayMs: number) => void;
  /** Day of the last epoch; while no date is known it counts from the first epoch since the break. */
  #dayMs = 0;
  #known = false;
  #sinceStartMs = 0;
  #lastMs = Number.NaN;
  #held: Held<E>[] = [];
  #heldRows = 0;
  #firstStatedDifferenceMs = Number.NaN;

  /** @param emit takes each epoch with rows, in their order, and midnight of its date or NaN */
  constructor(options: DateKeeperOptions, emit: (epoch: E, dayMs: number) => void) {
    this.#options = options;
    this.#emit = emit;
  }

  add(epoch: E): void {
    const { timeOfDayMs, statedMs, rows } = epoch;
    const dated = !Number.isNaN(statedMs);
    if (rows.length === 0 && !dated) return;
    const step = timeOfDayMs - this.#lastMs;
    this.#lastMs = timeOfDayMs;
    if (step < -HALF_DAY_MS) {
      this.#dayMs += DAY_MS;
      this.#sinceStartMs += DAY_MS;
    } else if (step < -SMALL_STEP_MS) this.#break();
    if (dated) this.#state(statedMs);
    if (rows.length === 0) return;
    if (this.#known) {
      this.#emit(epoch, this.#dayMs);
      return;
    }
    this.#held.push({ epoch, dayMs: this.#dayMs, sinceStartMs: this.#sinceStartMs });
    this.#heldRows += rows.length;
    if (this.#heldRows > this.#options.mostHeld) this.#release(Number.NaN);
  }

  /** Gives out the epochs that still wait. */
  end(): void {
    this.#release(Number.NaN);
  }

  /** First stated date minus the date that the file's own gives there; NaN when there are not both. */
  get firstStatedDifferenceMs(): number {
    return this.#firstStatedDifferenceMs;
  }

  #state(statedMs: number): void {
    if (Number.isNaN(this.#firstStatedDifferenceMs)) {
      this.#firstStatedDifferenceMs = statedMs - this.#options.fileDateMs - this.#sinceStartMs;
    }
    this.#release(statedMs - this.#dayMs);
    this.#known = true;
    this.#dayMs = statedMs;
  }

  #break(): void {
    this.#release(Number.NaN);
    this.#known = false;
    this.#dayMs = 0;
  }

  /** @param shiftMs from the days counted to days of the calendar; NaN when no stated date reaches them */
  #release(shiftMs: number): void {
    for (const { epoch, dayMs, sinceStartMs } of this.#held) {
      this.#emit(epoch, Number.isNaN(shiftMs) ? this.#options.fileDateMs + sinceStartMs : dayMs + shiftMs);
    }
    this.#held = [];
    this.#heldRows = 0;
  }
}
