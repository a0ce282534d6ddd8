/** Text that is HTML already. Only {@link html} and {@link trusted} make it. */
export class Html {
  constructor(readonly text: string) {}
  toString(): string {
    return this.text;
  }
}

type Part = Html | string | number | null | undefined | readonly (Html | string | null)[];

const ESCAPES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

const CHARACTERS = new Map(Object.entries(ESCAPES).map(([character, entity]) => [entity, character]));

export const escapeHtml = (text: string): string =>
  withoutControls(text).replace(/[&<>"']/g, (character) => ESCAPES[character]!);

/** Without the control characters that HTML forbids: a name in a log may hold them. */
function withoutControls(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  return text.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f]/g, '\ufffd');
}

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

/** What a reader sees of HTML made here: without tags, on one line. */
export function plainText(page: Html): string {
  const text = page.text.replace(/<[^>]*>/g, '').replace(/\s*\n\s*/g, ' ');
  return text.replace(/&(?:amp|lt|gt|quot|#39);/g, (entity) => CHARACTERS.get(entity)!).trim();
}

/** A date, kept on one line. */
export const date = (day: string): Html => html`<span class="date">${day}</span>`;
