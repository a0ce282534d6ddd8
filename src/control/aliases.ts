import { InputError, type Message, message, quoted, readDelimitedTable } from '../logs/index.js';
import type { Marks } from './marks.js';

/**
 * Reads other names of marks: columns `alias` and `mark`.
 * @returns alias → name of the mark
 * @throws InputError with every faulty row named
 */
export async function readAliases(
  path: string,
  file: string,
  marks: Marks,
): Promise<ReadonlyMap<string, string>> {
  const { header, rows } = await readDelimitedTable(path, file, { required: ['alias', 'mark'] });
  const errors: Message[] = [];
  const aliases = new Map<string, string>();
  for (const { row, cells, fault } of rows) {
    const report = (code: string, text: string): void => {
      errors.push(message('error', code, text, { file, row }));
    };
    if (cells === null) {
      report('unreadable', `The row cannot be read: ${fault}. Correct it.`);
      continue;
    }
    const [alias, mark] = (['alias', 'mark'] as const).map((role) => cells[header.positions.get(role)!]!) as [
      string,
      string,
    ];
    const before = aliases.get(alias);
    if (alias === '') report('no-name', 'Expected another name of a mark, came a blank cell. Fill it in.');
    else if (!marks.has(mark))
      report('unknown-mark', `Expected a mark of the marks file, came ${quoted(mark)}. Correct the name.`);
    else if (before !== undefined && before !== mark)
      report(
        'repeated-name',
        `${quoted(alias)} is already another name of ${quoted(before)}. Keep one of the two.`,
      );
    else aliases.set(alias, mark);
  }
  if (errors.length > 0) throw new InputError(errors);
  return aliases;
}
