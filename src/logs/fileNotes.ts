import type { DelimitedHeader } from './header.js';
import { type Message, message, quoted } from './messages.js';
import type { CellFault, RowOutcome } from './rowPosition.js';

/** Different texts of the fix column that are remembered, and of them those that are told. */
const MOST_FIX_TEXTS = 1000;
const TOLD_FIX_TEXTS = 5;

/** What is told of a log once, however many rows it concerns. */
export class FileNotes {
  rows = 0;
  #headers = 0;
  #noFixColumn = false;
  readonly #faults = new Map<string, { first: CellFault; count: number }>();
  readonly #unknownFixes = new Map<string, number>();
  #firstUnknownFix = 0;
  #fixColumn = 'fix';

  constructor(readonly file: string) {}

  /** @param fixIsKnown the layout states the fix of all rows */
  see(header: DelimitedHeader, fixIsKnown: boolean): void {
    this.#headers += 1;
    if (header.readable && !header.positions.has('fix') && !fixIsKnown) this.#noFixColumn = true;
    this.#fixColumn = header.headers.get('fix') ?? this.#fixColumn;
  }

  #dateOnly = 0;

  add({ position, faults, unknownFix }: Extract<RowOutcome, { kind: 'position' }>): void {
    if (position.dateOnly !== '') this.#dateOnly += 1;
    for (const fault of faults) {
      const entry = this.#faults.get(fault.column);
      if (entry === undefined) this.#faults.set(fault.column, { first: fault, count: 1 });
      else entry.count += 1;
    }
    if (unknownFix === null) return;
    const texts = this.#unknownFixes;
    if (texts.size === 0) this.#firstUnknownFix = position.row;
    if (texts.has(unknownFix) || texts.size < MOST_FIX_TEXTS) {
      texts.set(unknownFix, (texts.get(unknownFix) ?? 0) + 1);
    }
  }

  messages(): Message[] {
    if (this.rows === 0) return [this.#empty()];
    return [
      ...(this.#noFixColumn ? [this.#withoutFixColumn()] : []),
      ...(this.#dateOnly > 0 ? [this.#withoutTimeOfDay()] : []),
      ...(this.#unknownFixes.size > 0 ? [this.#unknownFix()] : []),
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
      `The log gives a date and no time of day in ${rows(this.#dateOnly)}: each is taken as an occupation of its own, and hours are not known. Export the time where the controller can.`,
      { file: this.file },
    );
  }

  #unknownFix(): Message {
    const texts = [...this.#unknownFixes].sort(([, a], [, b]) => b - a);
    const list = texts
      .slice(0, TOLD_FIX_TEXTS)
      .map(([text, count]) => `${text === '' ? 'a blank cell' : quoted(text)} in ${rows(count)}`)
      .join(', ');
    const more = texts.length > TOLD_FIX_TEXTS ? ` and ${texts.length - TOLD_FIX_TEXTS} other texts` : '';
    return message(
      'warning',
      'unknown-fix',
      `Expected "fixed" or "float", came ${list}${more}: these count as not fixed. Say in fixValues of the layout what they mean.`,
      { file: this.file, row: this.#firstUnknownFix, column: this.#fixColumn },
    );
  }

  #unreadValue({ first, count }: { first: CellFault; count: number }): Message {
    return message(
      'warning',
      'unread-value',
      `Expected a number, came ${quoted(first.cell)}: ${rows(count)} ${count === 1 ? 'is' : 'are'} read without this value. Leave the cell blank where nothing is known.`,
      { file: this.file, row: first.row, column: first.column },
    );
  }
}

const rows = (count: number): string => (count === 1 ? '1 row' : `${count} rows`);
