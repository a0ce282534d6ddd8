/**
 * Writes sentences so that crews stand by number, where they are called crews.
 * @param names of files, marks and other things, which stay as they are where they hold more than the words for a crew:
 *   "logs/crew B.csv" is a file and no crew
 */
export function crewMask(
  crews: readonly string[],
  names: readonly string[] = [],
): (sentence: string) => string {
  const numbers = new Map(crews.map((name, k) => [name, k + 1]));
  const called = crews.filter((name) => name !== '');
  if (called.length === 0) return (sentence) => sentence;
  const words = `\\b(?<word>[Cc]rew),? "?(?<crew>${anyOf(called)})"?(?![\\p{L}\\p{N}])`;
  const [within, alone] = [new RegExp(words, 'u'), new RegExp(`^${words}$`, 'u')];
  const kept = names.filter((name) => within.test(name) && !alone.test(name));
  const pattern = new RegExp(kept.length === 0 ? words : `${anyOf(kept)}|${words}`, 'gu');
  return (sentence) =>
    sentence.replace(pattern, (...found) => {
      const { word, crew } = found.at(-1) as { readonly word?: string; readonly crew?: string };
      return crew === undefined ? (found[0] as string) : `${word} ${numbers.get(crew)}`;
    });
}

/** Longer names first: one may begin as another. */
const anyOf = (names: readonly string[]): string =>
  [...names]
    .sort((a, b) => b.length - a.length)
    .map((name) => name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&'))
    .join('|');
