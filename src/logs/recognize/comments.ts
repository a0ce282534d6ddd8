import type { HeadLine } from './headText.js';

const MARKS = ['#', '%', '!', '//', ';'] as const;

/** The mark that begins comment lines, or null when there are none; `;` only where it is no delimiter as well. */
export function findComment(lines: readonly HeadLine[]): string | null {
  let best: string | null = null;
  let most = 0;
  for (const mark of MARKS) {
    const marked = lines.filter(({ text }) => text.startsWith(mark));
    const others = lines.filter(({ text }) => !text.startsWith(mark));
    if (mark === ';' && others.some(({ text }) => text.includes(';'))) continue;
    if (marked.length > most && others.length > 0) [best, most] = [mark, marked.length];
  }
  return best;
}
