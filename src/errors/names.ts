/** Names numbered in the order in which they are met. */
export class Names {
  readonly list: string[] = [];
  readonly #indices = new Map<string, number>();
  #last = '';
  #lastIndex = -1;

  index(name: string): number {
    // Most rows name what the row before names.
    if (name === this.#last && this.#lastIndex >= 0) return this.#lastIndex;
    let index = this.#indices.get(name);
    if (index === undefined) {
      index = this.list.length;
      this.list.push(name);
      this.#indices.set(name, index);
    }
    [this.#last, this.#lastIndex] = [name, index];
    return index;
  }

  /** Place of each name in alphabetical order, by index. */
  ranks(): Int32Array {
    const ranks = new Int32Array(this.list.length);
    [...this.list].sort().forEach((name, rank) => {
      ranks[this.#indices.get(name)!] = rank;
    });
    return ranks;
  }
}

/** Answers for names that come again: a log names the same mark in thousands of rows. */
export function remembered<Answer>(answer: (name: string) => Answer): (name: string) => Answer {
  const answers = new Map<string, Answer>();
  return (name) => {
    const known = answers.get(name);
    if (known !== undefined) return known;
    const found = answer(name);
    answers.set(name, found);
    return found;
  };
}
