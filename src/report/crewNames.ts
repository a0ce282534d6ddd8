/** A sentence in which crews stand by number, where it calls them crews. */
export function maskedText(sentence: string, crews: readonly string[]): string {
  const numbered = crews.map((name, k) => ({ name, number: k + 1 }));
  // Longer names first: one may begin as another.
  return numbered
    .sort((a, b) => b.name.length - a.name.length)
    .reduce((text, { name, number }) => {
      const literal = name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
      return text.replace(
        new RegExp(`\\b([Cc]rew),? "?${literal}"?(?![\\p{L}\\p{N}])`, 'gu'),
        `$1 ${number}`,
      );
    }, sentence);
}
