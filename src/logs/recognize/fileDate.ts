import { parseIsoTime } from '../../time/index.js';

/** A date in the name of a file and a pattern for fromFileName that finds it. */
export interface FileDate {
  readonly text: string;
  /** YYYY-MM-DD. */
  readonly day: string;
  readonly pattern: string;
}

/** Only forms that begin with the year are unambiguous. */
const FORMS: readonly { readonly pattern: string; readonly day: (text: string) => string }[] = [
  { pattern: '(?<date>\\d{4}-\\d{2}-\\d{2})', day: (text) => text },
  {
    pattern: '(?<!\\d)(?<date>20\\d{6})(?!\\d)',
    day: (text) => `${text.slice(0, 4)}-${text.slice(4, 6)}-${text.slice(6)}`,
  },
];

/** The date in the last part of a path, or null when there is none or more than one. */
export function dateInName(fileName: string): FileDate | null {
  const name = fileName.split(/[\\/]/).at(-1)!;
  for (const { pattern, day } of FORMS) {
    const texts = [...name.matchAll(new RegExp(pattern, 'g'))].map(({ groups }) => groups!.date!);
    const [text] = texts;
    if (text === undefined) continue;
    const isDay = parseIsoTime(day(text)).kind === 'date';
    return isDay && new Set(texts).size === 1 ? { text, day: day(text), pattern } : null;
  }
  return null;
}
