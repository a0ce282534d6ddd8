const LONGEST_SHOWN = 60;

/** A text as it came, in quotes, cut when it is long. */
export function quoted(text: string): string {
  return text.length > LONGEST_SHOWN
    ? `${JSON.stringify(text.slice(0, LONGEST_SHOWN))}…`
    : JSON.stringify(text);
}
