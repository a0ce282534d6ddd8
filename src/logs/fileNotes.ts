import type { DelimitedHeader } from './header.js';
import { type Message, message, quoted } from './messages.js';
import { CORRECTION_KINDS } from './position.js';
import type { CellFault, RowOutcome } from './rowPosition.js';
import { rowsWords, UnknownWords } from './unknownWords.js';

/** What is told of a log once, however many rows it concerns. */
export class FileNotes {
  rows = 0;
  #headers = 0;
  #noFixColumn = false;
  readonly #faults = new Map<string, { first: CellFault; count: number }>();
  readonly #unknownFixes = new UnknownWords();
  readonly #unknownCorrections = new UnknownWords();
  #fixColumn = 'fix';
  #correctionsColumn = 'corrections';

  constructor(readonly file: string) {}

  /** @param fixIsKnown the layout states the fix of all rows */
  see(header: DelimitedHeader, fixIsKnown: boolean): void {
    this.#headers += 1;
    if (header.readable && !header.positions.has('fix') && !fixIsKnown) this.#noFixColumn = true;
    this.#fixColumn = header.headers.get('fix') ?? this.#fixColumn;
    this.#correctionsColumn = header.headers.get('corrections') ?? this.#correctionsColumn;
  }

  #dateOnly = 0;

  add({ position, faults, unknownFix }: Extract<RowOutcome, { kind: 'position' }>): void {
    if (position.dateOnly !== '') this.#dateOnly += 1;
    for (const fault of faults) {
      const entry = this.#faults.get(fault.column);
      if (entry === undefined) this.#faults.set(fault.column, { first: fault, count: 1 });
      else entry.count += 1;
    }
    if (unknownFix !== null) this.#unknownFixes.add(unknownFix, position.row);
    // Words that are understood have become one of these.
    const corrections = position.extras?.corrections ?? '';
    if (corrections !== '' && !(CORRECTION_KINDS as readonly string[]).includes(corrections)) {
      this.#unknownCorrections.add(corrections, position.row);
    }
  }

  messages(): Message[] {
    if (this.rows === 0) return [this.#empty()];
    return [
      ...(this.#noFixColumn ? [this.#withoutFixColumn()] : []),
      ...(this.#dateOnly > 0 ? [this.#withoutTimeOfDay()] : []),
      ...(this.#unknownFixes.any ? [this.#unknownFix()] : []),
      ...(this.#unknownCorrections.any ? [this.#unknownCorrection()] : []),
      ...[...this.#faults.values()].map((fault) => this.#unreadValue(fault)),
    ];
  }

  #empty(): Message {
    const came = this.#headers === 0 ? 'an empty file' : 'a header alone';
    return message(
      'warning',
      'empty-log',
      `Expected a header and positions, came ${came}. Export it again.`,
      { file: this.file },
    );
  }

  #withoutFixColumn(): Message {
    return message(
      'info',
      'no-fix-column',
      'The log has no column "fix": every row counts as fixed. Export the state of the fix where the controller can.',
      { file: this.file },
    );
  }

  #withoutTimeOfDay(): Message {
    return message(
      'info',
      'no-time-of-day',
      `The log gives a date and no time of day in ${rowsWords(this.#dateOnly)}: each is taken as an occupation of its own, and hours are not known. Export the time where the controller can.`,
      { file: this.file },
    );
  }

  #unknownFix(): Message {
    return message(
      'warning',
      'unknown-fix',
      `Expected "fixed" or "float", came ${this.#unknownFixes.words()}: these count as not fixed. Say in fixValues of the layout what they mean.`,
      { file: this.file, row: this.#unknownFixes.firstRow, column: this.#fixColumn },
    );
  }

  #unknownCorrection(): Message {
    const words = this.#unknownCorrections;
    const expected = CORRECTION_KINDS.map(quoted).join(', ');
    return message(
      'warning',
      'unknown-corrections',
      `Expected one of ${expected} as corrections, came ${words.words()}: these count as not from a single base. Say in correctionValues of the layout what they mean.`,
      { file: this.file, row: words.firstRow, column: this.#correctionsColumn },
    );
  }

  #unreadValue({ first, count }: { first: CellFault; count: number }): Message {
    return message(
      'warning',
      'unread-value',
      `Expected a number, came ${quoted(first.cell)}: ${rowsWords(count)} ${count === 1 ? 'is' : 'are'} read without this value. Leave the cell blank where nothing is known.`,
      { file: this.file, row: first.row, column: first.column },
    );
  }
}
