import { type Message, message } from './messages.js';
import type { RowReason, SetAsideRow } from './reasons.js';

/** Set-aside rows of these reasons speak for themselves in the account; the others get a message. */
const TOLD: ReadonlySet<RowReason> = new Set(['unreadable', 'unknown-mark', 'unknown-base', 'conflicting']);

const REMEDIES: Partial<Record<RowReason, string>> = {
  unreadable: 'Correct the rows or export them again.',
  'unknown-mark': 'Add the mark to the marks file or correct the name.',
  'unknown-base': 'Add the base to the bases file or correct the name.',
  conflicting:
    'One rover cannot be at two places: both are set aside. Look for a wrong mark name or a joined file.',
};

/** One message for all rows of a file that were set aside for the same reason, column and finding. */
export class RowMessages {
  readonly #groups = new Map<string, { first: SetAsideRow; count: number }>();

  add(row: SetAsideRow): void {
    if (!TOLD.has(row.reason)) return;
    // Unreadable values differ from row to row: the first one stands for all of its column.
    const finding = row.reason === 'unreadable' ? (row.column ?? row.detail) : row.detail;
    const key = [row.file, row.reason, finding].join('\u0000');
    const group = this.#groups.get(key);
    if (group === undefined) this.#groups.set(key, { first: row, count: 1 });
    else {
      group.count += 1;
      if (row.row < group.first.row) group.first = row;
    }
  }

  messages(): Message[] {
    return [...this.#groups.values()].map(({ first, count }) => {
      const rows = count === 1 ? '1 row is' : `${count} rows are`;
      return message(
        'warning',
        first.reason,
        `${rows} set aside as ${first.reason}: ${first.detail}. ${REMEDIES[first.reason]}`,
        { file: first.file, row: first.row, ...(first.column === null ? {} : { column: first.column }) },
      );
    });
  }
}
