import { quoted } from './messages.js';

/** Different texts that are remembered, and of them those that are told. */
const MOST_TEXTS = 1000;
const TOLD_TEXTS = 5;

/** Texts of a column of which nobody has said what they mean, with the number of their rows. */
export class UnknownWords {
  readonly #texts = new Map<string, number>();
  firstRow = 0;

  get any(): boolean {
    return this.#texts.size > 0;
  }

  add(text: string, row: number): void {
    if (this.#texts.size === 0) this.firstRow = row;
    if (!this.#texts.has(text) && this.#texts.size >= MOST_TEXTS) return;
    this.#texts.set(text, (this.#texts.get(text) ?? 0) + 1);
  }

  /** `"4" in 12 rows, a blank cell in 1 row and 3 other texts`, the most frequent first. */
  words(): string {
    const texts = [...this.#texts].sort(([, a], [, b]) => b - a);
    const list = texts
      .slice(0, TOLD_TEXTS)
      .map(([text, count]) => `${text === '' ? 'a blank cell' : quoted(text)} in ${rowsWords(count)}`)
      .join(', ');
    return texts.length > TOLD_TEXTS ? `${list} and ${texts.length - TOLD_TEXTS} other texts` : list;
  }
}

export const rowsWords = (count: number): string => (count === 1 ? '1 row' : `${count} rows`);
