/** Delimiters by the names used in a layout. */
export const DELIMITERS: Readonly<Record<string, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  pipe: '|',
  blanks: ' ',
};

/**
 * The cells of one line, trimmed, with the quoting of RFC 4180: a cell in double quotes may hold the delimiter, and
 * a quote twice stands for one. A quote inside an unquoted cell (`5" rod`) is a character like others.
 * @returns null when a quote opens and does not close, or text follows a closing quote
 */
export function splitCells(line: string, delimiter: string): string[] | null {
  if (delimiter === ' ') return splitAtBlanks(line);
  if (!line.includes('"')) return line.split(delimiter).map((cell) => cell.trim());
  const cells: string[] = [];
  let at = 0;
  for (;;) {
    const quoted = quotedCell(line, skipBlanks(line, at, delimiter));
    if (quoted === null) return null;
    let end = quoted.end;
    if (end < 0) {
      end = line.indexOf(delimiter, at);
      if (end < 0) end = line.length;
      cells.push(line.slice(at, end).trim());
    } else {
      cells.push(quoted.text.trim());
      end = skipBlanks(line, end, delimiter);
    }
    if (end === line.length) return cells;
    if (!line.startsWith(delimiter, end)) return null;
    at = end + delimiter.length;
  }
}

/** A blank as delimiter means runs of blanks and tabs, none of them at the ends of the line. */
function splitAtBlanks(line: string): string[] | null {
  if (!line.includes('"')) return line.trim().split(/[ \t]+/);
  const cells: string[] = [];
  for (let at = 0; ; ) {
    while (at < line.length && isBlank(line[at]!)) at++;
    if (at >= line.length) return cells;
    const quoted = quotedCell(line, at);
    if (quoted === null) return null;
    if (quoted.end >= 0) {
      if (quoted.end < line.length && !isBlank(line[quoted.end]!)) return null;
      cells.push(quoted.text.trim());
      at = quoted.end;
    } else {
      const end = line.slice(at).search(/[ \t]/);
      cells.push(line.slice(at, end < 0 ? line.length : at + end));
      at = end < 0 ? line.length : at + end;
    }
  }
}

const isBlank = (character: string): boolean => character === ' ' || character === '\t';

/** The quoted text that begins at `at` and where it ends; end −1 when none begins there, null when it does not close. */
function quotedCell(line: string, at: number): { text: string; end: number } | null {
  if (line[at] !== '"') return { text: '', end: -1 };
  let text = '';
  for (let from = at + 1; ; ) {
    const quote = line.indexOf('"', from);
    if (quote < 0) return null;
    text += line.slice(from, quote);
    if (line[quote + 1] !== '"') return { text, end: quote + 1 };
    text += '"';
    from = quote + 2;
  }
}

/** The first place from `at` on that is no blank; a delimiter may be a blank itself and is not passed over. */
function skipBlanks(line: string, at: number, delimiter: string): number {
  let next = at;
  while ((line[next] === ' ' || line[next] === '\t') && !line.startsWith(delimiter, next)) next++;
  return next;
}
