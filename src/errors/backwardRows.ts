import { type Message, message, type Position } from '../logs/index.js';

/** Notices rows of a rover that go back in time within a file; they are sorted later on, and this is told. */
export class BackwardRows {
  /** File and rover → time of the latest row so far. */
  readonly #latest = new Map<string, number>();
  readonly #found = new Map<string, { firstRow: number; count: number }>();
  #key = '';
  #last: Position | null = null;
  #lastMs = Number.NEGATIVE_INFINITY;

  see(position: Position): void {
    const { file, rover, utcMs, row } = position;
    if (Number.isNaN(utcMs)) return;
    if (this.#last === null || this.#last.rover !== rover || this.#last.file !== file) {
      if (this.#last !== null) this.#latest.set(this.#key, this.#lastMs);
      this.#key = `${file}\u0000${rover}`;
      this.#lastMs = this.#latest.get(this.#key) ?? Number.NEGATIVE_INFINITY;
    }
    this.#last = position;
    if (utcMs >= this.#lastMs) {
      this.#lastMs = utcMs;
      return;
    }
    const found = this.#found.get(file);
    if (found === undefined) this.#found.set(file, { firstRow: row, count: 1 });
    else found.count += 1;
  }

  messages(): Message[] {
    const byFile = [...this.#found].sort(([a], [b]) => (a < b ? -1 : 1));
    return byFile.map(([file, { firstRow, count }]) =>
      message(
        'info',
        'back-in-time',
        `Expected rows in the order of time, came ${count === 1 ? '1 row that goes' : `${count} rows that go`} back: they are sorted. Look whether files were joined on purpose.`,
        { file, row: firstRow },
      ),
    );
  }
}
