import { inputError, quoted } from './messages.js';
import { COLUMN_ROLES, type ColumnRole } from './roles.js';

/**
 * Values that a file name gives, by the named groups of a regular expression.
 * @throws InputError for an expression that is none, has no named groups, or names a group that is no role
 */
export function valuesFromFileName(
  pattern: string,
  file: string,
): Readonly<Partial<Record<ColumnRole, string>>> {
  let expression: RegExp;
  try {
    expression = new RegExp(pattern);
  } catch (error) {
    const fault = (error as Error).message.replace(/\.$/, '');
    throw inputError(
      'bad-pattern',
      `Expected a regular expression as fromFileName, came ${quoted(pattern)}: ${fault}. Correct it.`,
      { file },
    );
  }
  const groups = [...pattern.matchAll(/\(\?<([A-Za-z]\w*)>/g)].map(([, name]) => name!);
  const wrong = groups.find((name) => !(COLUMN_ROLES as readonly string[]).includes(name));
  if (groups.length === 0 || wrong !== undefined) {
    const came = wrong === undefined ? 'no named group' : `the group ${quoted(wrong)}`;
    throw inputError(
      'bad-pattern',
      `Expected groups named like roles in fromFileName, such as (?<date>…), came ${came}. Correct the pattern.`,
      { file },
    );
  }
  const name = file.split(/[\\/]/).at(-1)!;
  return { ...expression.exec(name)?.groups };
}
