/** Text that is HTML already. Only {@link html} and {@link trusted} make it. */
export class Html {
  constructor(readonly text: string) {}
  toString(): string {
    return this.text;
  }
}

type Part = Html | string | number | null | undefined | readonly (Html | string)[];

const ESCAPES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

export const escapeHtml = (text: string): string =>
  text.replace(/[&<>"']/g, (character) => ESCAPES[character]!);

/** Tagged template in which every inserted text is escaped, whatever log or study file it comes from. */
export function html(strings: TemplateStringsArray, ...parts: readonly Part[]): Html {
  return new Html(strings.reduce((page, text, k) => page + insert(parts[k - 1]) + text));
}

function insert(part: Part): string {
  if (part === null || part === undefined) return '';
  if (part instanceof Html) return part.text;
  if (Array.isArray(part)) return part.map(insert).join('');
  return escapeHtml(String(part));
}

/** HTML made by this project itself, such as a style sheet. */
export const trusted = (text: string): Html => new Html(text);

/** A date, kept on one line. */
export const date = (day: string): Html => html`<span class="date">${day}</span>`;
