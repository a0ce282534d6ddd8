import type { Control } from './control.js';
import { type Match, matchMark } from './control.js';
import type { Mark } from './marks.js';

/** How the texts of a log name marks. */
export interface NameRules {
  /** Its first group is the name of the mark; null takes the text as it is. */
  readonly pattern: RegExp | null;
  /** Other name → name of the mark. */
  readonly aliases: ReadonlyMap<string, string>;
}

/** The texts of a row in which a mark may be named, in the order in which they are asked. */
export interface RowNames {
  readonly mark: string;
  readonly pointNumber: string;
  readonly description: string;
}

/**
 * The mark that a row names: by its mark column, its point number or its description, each as it stands, by an alias,
 * or by the pattern. A row that names none comes back with the nearest known name.
 */
export function matchRowNames(control: Control, row: RowNames): Match<Mark> {
  const texts = [row.mark, row.pointNumber, row.description].filter((text) => text !== '');
  for (const text of texts) {
    const point = control.marks.get(text) ?? aliased(control, text);
    if (point !== undefined) return { kind: 'known', point };
  }
  const pattern = control.names?.pattern ?? null;
  const named = pattern === null ? [] : texts.flatMap((text) => readOut(pattern, text));
  for (const { name } of named) {
    const point = control.marks.get(name) ?? aliased(control, name);
    if (point !== undefined) return { kind: 'known', point };
  }
  // The text that was meant to name the mark is the one to tell of.
  const [first] = named;
  return first === undefined
    ? matchMark(control, texts[0] ?? '')
    : matchMark(control, first.name, first.text);
}

function readOut(pattern: RegExp, text: string): { readonly name: string; readonly text: string }[] {
  const name = pattern.exec(text)?.[1]?.trim();
  return name === undefined ? [] : [{ name, text }];
}

function aliased(control: Control, text: string): Mark | undefined {
  const name = control.names?.aliases.get(text);
  return name === undefined ? undefined : control.marks.get(name);
}
