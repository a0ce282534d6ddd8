/**
 * Number of single-character insertions, deletions, changes and swaps of neighbours between two texts (optimal string
 * alignment: Damerau 1964, Levenshtein 1966).
 */
function editDistance(a: string, b: string): number {
  let beforePrevious: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const current = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = previous[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      const swap = swapped ? beforePrevious[j - 2]! + 1 : Number.POSITIVE_INFINITY;
      current.push(Math.min(change, swap, previous[j]! + 1, current[j - 1]! + 1));
    }
    [beforePrevious, previous] = [previous, current];
  }
  return previous[b.length]!;
}

/** A name without what people write differently: case, punctuation, zeros before a number. */
const plain = (name: string): string =>
  name
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]/gu, '')
    .replace(/(?<!\d)0+(?=\d)/g, '');

/**
 * The known name that a wrong one was probably meant to be: equal but for case, punctuation and leading zeros, or at most a
 * third of its characters away (never more than two). Null when none is near.
 */
export function nearestName(name: string, known: Iterable<string>): string | null {
  const wanted = plain(name);
  let best: string | null = null;
  let bestDistance = Math.min(2, Math.floor(wanted.length / 3)) + 1;
  for (const candidate of known) {
    const other = plain(candidate);
    // Texts that differ in length by more cannot be nearer; this also spares the long way through a very long text.
    if (Math.abs(other.length - wanted.length) >= bestDistance) continue;
    const distance = editDistance(wanted, other);
    if (distance < bestDistance) [best, bestDistance] = [candidate, distance];
  }
  return best;
}

/** ` Did you mean "…"?` or nothing: to be put at the end of a message. */
export function suggestion(name: string, known: Iterable<string>): string {
  const near = nearestName(name, known);
  return near === null ? '' : ` Did you mean "${near}"?`;
}
