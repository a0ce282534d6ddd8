/** Number of single-character insertions, deletions and changes between two texts (Levenshtein 1966). */
function editDistance(a: string, b: string): number {
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const current = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = previous[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      current.push(Math.min(change, previous[j]! + 1, current[j - 1]! + 1));
    }
    previous = current;
  }
  return previous[b.length]!;
}

const plain = (name: string): string => name.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');

/**
 * The known name that a wrong one was probably meant to be: equal but for case and punctuation, or at most a
 * third of its characters away (never more than two). Null when none is near.
 */
export function nearestName(name: string, known: Iterable<string>): string | null {
  const wanted = plain(name);
  let best: string | null = null;
  let bestDistance = Math.min(2, Math.floor(wanted.length / 3)) + 1;
  for (const candidate of known) {
    const distance = editDistance(wanted, plain(candidate));
    if (distance < bestDistance) [best, bestDistance] = [candidate, distance];
  }
  return best;
}

/** ` Did you mean "…"?` or nothing: to be put at the end of a message. */
export function suggestion(name: string, known: Iterable<string>): string {
  const near = nearestName(name, known);
  return near === null ? '' : ` Did you mean "${near}"?`;
}
