/** Numbers with more decimals are all fine enough. */
const MOST_DECIMALS = 12;
/** Where trailing zeros are dropped every tenth number has fewer decimals than it was rounded to. */
const SHARE_OF_DROPPED_ZEROS = 0.15;

/** To how many decimals the numbers of a file are rounded, and in how many of them. */
export interface Resolution {
  readonly decimals: number;
  /** Numbers with so many decimals or fewer, and all numbers. */
  readonly count: number;
  readonly total: number;
  /** First row with so many decimals or fewer. */
  readonly firstRow: number;
}

/** Finds to how many decimals the numbers of a file are rounded, as they stream by. */
export class DecimalCounter {
  readonly #counts = new Array<number>(MOST_DECIMALS + 1).fill(0);
  readonly #firstRows = new Array<number>(MOST_DECIMALS + 1).fill(Number.POSITIVE_INFINITY);

  add(decimals: number, row: number): void {
    const index = Math.min(decimals, MOST_DECIMALS);
    this.#counts[index]! += 1;
    if (this.#counts[index] === 1) this.#firstRows[index] = row;
  }

  /** The coarsest rounding that more than a few numbers share; null before the first number. */
  resolution(): Resolution | null {
    const total = this.#counts.reduce((sum, count) => sum + count, 0);
    if (total === 0) return null;
    let count = 0;
    let decimals = -1;
    while (count <= SHARE_OF_DROPPED_ZEROS * total) count += this.#counts[++decimals]!;
    return { decimals, count, total, firstRow: Math.min(...this.#firstRows.slice(0, decimals + 1)) };
  }
}
