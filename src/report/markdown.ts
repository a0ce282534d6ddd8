/** Characters of our pages that stand as entities. */
const ENTITIES: Readonly<Record<string, string>> = {
  '&amp;': '&',
  '&lt;': '<',
  '&gt;': '>',
  '&quot;': '"',
  '&#39;': "'",
  '&nbsp;': '\u00a0',
};

/** Private characters that stand for fences, bold text and blank lines while a page is turned. */
const OWN_SIGNS = /[\ue001-\ue003]/g;

/** What Markdown would take for its own marks, or for HTML. */
const SPECIAL = /[\\`*_{}[\]<>|~]/g;

/**
 * One of our pages as Markdown: the same words, numbers and tables, without pictures.
 * @param page as the functions of this folder write it; other HTML is not understood
 */
export function markdownOf(page: string): string {
  const body = (/<main>([\s\S]*)<\/main>/.exec(page)?.[1] ?? '').replace(OWN_SIGNS, '\ufffd');
  const blocks = body
    .replace(/<nav[\s\S]*?<\/nav>/g, '')
    .replace(/<figure><img [^>]*alt="([^"]*)"[^>]*><\/figure>/g, (_, alt: string) => `<p>${alt}</p>`)
    .replace(/<table[^>]*>([\s\S]*?)<\/table>/g, (_, table: string) => tableText(table))
    .replace(/<h([12])[^>]*>([\s\S]*?)<\/h\1>/g, (_, level: string, words: string) =>
      block(`${'#'.repeat(Number(level))} ${inline(words)}`),
    )
    .replace(/<ol>([\s\S]*?)<\/ol>/g, (_, items: string) => listText(items, '1.'))
    .replace(/<ul[^>]*>([\s\S]*?)<\/ul>/g, (_, items: string) => listText(items, '-'))
    .replace(/<dt>([\s\S]*?)<\/dt>\s*<dd>([\s\S]*?)<\/dd>/g, (_, term: string, words: string) =>
      block(`**${inline(term)}**: ${inline(words)}`),
    )
    .replace(/<p[^>]*>([\s\S]*?)<\/p>/g, (_, words: string) => block(inline(words)));
  // What is left are frames around blocks, and blanks between them.
  return `${[...blocks.matchAll(/\ue001([^\ue001]*)\ue001/g)].map(([, text]) => text).join('\n\n')}\n`;
}

/** Fences off a finished block, with a character that is taken off names beforehand. */
const block = (text: string): string => `\ue001${text}\ue001`;

function tableText(table: string): string {
  const caption = inline(/<caption>([\s\S]*?)<\/caption>/.exec(table)?.[1] ?? '');
  const rows = [...table.matchAll(/<tr>([\s\S]*?)<\/tr>/g)].map(([, row]) =>
    [...row!.matchAll(/<(t[hd])([^>]*)>([\s\S]*?)<\/\1>/g)].map(([, , attributes, cell]) => ({
      text: inline(cell!),
      number: attributes!.includes('number'),
    })),
  );
  const line = (cells: readonly string[]): string => `| ${cells.join(' | ')} |`;
  const [head, ...lines] = rows as [(typeof rows)[number], ...typeof rows];
  return (
    block(`**${caption}**`) +
    block(
      [
        line(head.map(({ text }) => text)),
        line(head.map(({ number }) => (number ? '---:' : '---'))),
        ...lines.map((row) => line(row.map(({ text }) => text))),
      ].join('\n'),
    )
  );
}

const listText = (items: string, mark: string): string =>
  block(
    [...items.matchAll(/<li[^>]*>([\s\S]*?)<\/li>/g)]
      .map(([, item]) => `${mark} ${inline(item!)}`)
      .join('\n'),
  );

function inline(words: string): string {
  return words
    .replace(/<strong>([\s\S]*?)<\/strong>/g, '\ue002$1\ue002 ')
    .replace(/<span class="blank"><\/span>/g, '\ue003')
    .replace(/<[^>]*>/g, '')
    .replace(/&(?:amp|lt|gt|quot|nbsp|#39);/g, (entity) => ENTITIES[entity]!)
    .replace(SPECIAL, (character) => `\\${character}`)
    .replace(/\ue002 (?=[,.;:])/g, '\ue002')
    .replaceAll('\ue002', '**')
    .replaceAll('\ue003', '\\_\\_\\_\\_\\_\\_\\_\\_')
    .replace(/[^\S\u00a0\u202f]+/g, ' ')
    .trim();
}
