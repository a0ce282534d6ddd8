import { createHash } from 'node:crypto';

/**
 * Gives an SVG its accessible name and description instead of those that vega writes on every mark, and ids that stay
 * apart when several charts stand in one page.
 * @param svg as vega draws it
 */
export function finishSvg(svg: string, title: string, description: string): string {
  const bare = withoutForbidden(svg).replace(/<[^>]*>/g, (tag) =>
    tag.replace(/ (?:role="graphics-[a-z]+"|aria-[a-z]+="[^"]*")/g, ''),
  );
  const words = withoutForbidden(`<title>${escapeXml(title)}</title><desc>${escapeXml(description)}</desc>`);
  return uniqueIds(
    bare.replace(/<svg ([^>]*)>/, (_, attributes: string) => `<svg role="img" ${attributes}>${words}`),
  );
}

const escapeXml = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');

/** Without the control characters that XML 1.0 forbids: a name of a mark may hold them. */
function withoutForbidden(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  return text.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, '\ufffd');
}

/** Renames ids in order of appearance, with a prefix from the content; only inside tags, never in texts. */
function uniqueIds(svg: string): string {
  const ids = new Map<string, string>();
  const rename = (id: string): string => {
    const known = ids.get(id) ?? String(ids.size + 1);
    ids.set(id, known);
    return known;
  };
  const numbered = svg.replace(/<[^>]*>/g, (tag) =>
    tag
      .replace(/ id="([^"]+)"/, (_, id: string) => ` id="@${rename(id)}"`)
      .replace(/url\(#([^)]+)\)/g, (_, id: string) => `url(#@${rename(id)})`),
  );
  const prefix = `c${createHash('sha256').update(numbered).digest('hex').slice(0, 8)}-`;
  return numbered.replace(/<[^>]*>/g, (tag) =>
    tag.replace(/ id="@/, ` id="${prefix}`).replaceAll('url(#@', `url(#${prefix}`),
  );
}
