import type { RowReason, SetAsideRow } from './reasons.js';

/** Rows of one reason: how many, and the first places. */
export interface ReasonCount {
  readonly count: number;
  /** Lines of the first five rows. */
  readonly firstRows: readonly number[];
}

/** The account of one file. `read = used + Σ setAside` always holds. */
export interface FileAccount {
  readonly file: string;
  readonly read: number;
  readonly used: number;
  readonly setAside: Readonly<Partial<Record<RowReason, ReasonCount>>>;
}

const FIRST_ROWS = 5;

/** Counts rows while they stream by; `accounts()` closes the books. */
export class RowAccount {
  readonly #files = new Map<string, { read: number; used: number; reasons: Map<RowReason, number[]> }>();

  /** Opens the account of a file, so that a file without rows is listed too. */
  open(file: string): void {
    this.#of(file);
  }

  read(file: string, rows: number): void {
    this.#of(file).read += rows;
  }

  used(file: string, rows: number): void {
    this.#of(file).used += rows;
  }

  setAside(row: SetAsideRow): void {
    const { reasons } = this.#of(row.file);
    const entry = reasons.get(row.reason);
    // The first element counts, the others are the lowest lines seen so far.
    if (entry === undefined) reasons.set(row.reason, [1, row.row]);
    else {
      entry[0]! += 1;
      insertLowest(entry, row.row);
    }
  }

  accounts(): FileAccount[] {
    return [...this.#files].map(([file, { read, used, reasons }]) => ({
      file,
      read,
      used,
      setAside: Object.fromEntries(
        [...reasons]
          .sort(([a], [b]) => (a < b ? -1 : 1))
          .map(([reason, [count, ...firstRows]]) => [reason, { count: count!, firstRows }]),
      ),
    }));
  }

  #of(file: string): { read: number; used: number; reasons: Map<RowReason, number[]> } {
    let entry = this.#files.get(file);
    if (entry === undefined) {
      entry = { read: 0, used: 0, reasons: new Map() };
      this.#files.set(file, entry);
    }
    return entry;
  }
}

function insertLowest(entry: number[], row: number): void {
  let at = entry.length;
  while (at > 1 && entry[at - 1]! > row) at--;
  if (at > FIRST_ROWS) return;
  entry.splice(at, 0, row);
  if (entry.length > FIRST_ROWS + 1) entry.pop();
}

/** The account of all files together. */
export interface TotalAccount {
  readonly read: number;
  readonly used: number;
  readonly setAside: Readonly<Partial<Record<RowReason, number>>>;
}

export function totalAccount(files: readonly FileAccount[]): TotalAccount {
  const setAside: Partial<Record<RowReason, number>> = {};
  for (const file of files) {
    for (const [reason, { count }] of Object.entries(file.setAside) as [RowReason, ReasonCount][]) {
      setAside[reason] = (setAside[reason] ?? 0) + count;
    }
  }
  return {
    read: files.reduce((total, { read }) => total + read, 0),
    used: files.reduce((total, { used }) => total + used, 0),
    setAside,
  };
}
