/** Texts that are looked at. */
const MOST_TEXTS = 400;
/** Fewest texts, as a share, that must have the form. */
const MOST_OF_THEM = 0.8;

/**
 * The pattern under marks.names that reads the mark out of texts such as `CHK A3`: a word that begins most of them and a
 * name with a digit behind it; null when they have no such form, or begin with different words.
 */
export function namePattern(texts: readonly string[]): string | null {
  const sample = texts.slice(0, MOST_TEXTS);
  const counts = new Map<string, number>();
  for (const text of sample) {
    const word = /^(\p{L}+)\s+\S*\d\S*$/u.exec(text)?.[1];
    if (word !== undefined) counts.set(word, (counts.get(word) ?? 0) + 1);
  }
  const [most] = [...counts].sort(([, a], [, b]) => b - a);
  if (most === undefined || most[1] < MOST_OF_THEM * sample.length) return null;
  return `^${most[0]}\\s+(\\S+)$`;
}

/** What to write into the study file so that this pattern is used, for sentences. */
export const patternWords = (pattern: string): string =>
  `"marks: {file: marks.csv, names: {pattern: '${pattern}'}}" in the study file`;
