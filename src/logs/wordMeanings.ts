/** Texts of a column as the study understands them: in any case, without blanks around. */
export const plainWord = (text: string): string => text.trim().toLowerCase();

/** The meaning of each text: what is understood by itself, and what the layout says beside it. */
export function wordMeanings<Meaning extends string>(
  understood: readonly Meaning[],
  stated: Readonly<Record<string, Meaning>> = {},
): ReadonlyMap<string, Meaning> {
  return new Map([
    ...understood.map((word): [string, Meaning] => [word, word]),
    ...Object.entries(stated).map(([text, meaning]): [string, Meaning] => [plainWord(text), meaning]),
  ]);
}
