import type { z } from 'zod';
import { type Message, message, quoted, suggestion } from '../logs/index.js';
import { knownKeys } from './knownKeys.js';
import type { Path, PlaceOf } from './places.js';

type Issue = z.core.$ZodIssue;

/** What the schema found wrong with `value`, in sentences. */
export function issueMessages(issue: Issue, value: unknown, placeOf: PlaceOf): Message[] {
  const { path } = issue;
  if (issue.code === 'unrecognized_keys')
    return issue.keys.map((key) => unknownKey(key, path, value, placeOf));
  // The key itself is wrong: its path ends with it.
  if (issue.code === 'invalid_key')
    return [unknownKey(String(path.at(-1)), path.slice(0, -1), value, placeOf)];
  if (issue.code === 'invalid_union') {
    const branch = nearestBranch(issue.errors);
    if (branch !== null) {
      return branch.flatMap((inner) =>
        issueMessages({ ...inner, path: [...path, ...inner.path] }, value, placeOf),
      );
    }
  }
  const came = valueAt(value, path);
  const expected = [...new Set(expectations(issue))].join(' or ');
  const text =
    came === undefined
      ? `Expected ${expected}, the key is missing. Add it.`
      : `Expected ${expected}, came ${shown(came)}. Correct it.`;
  return [message('error', 'bad-setting', text, placeOf(path))];
}

/** Of the alternatives of a union the only one whose fault lies deeper than "something else was expected". */
function nearestBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] | null {
  const nested = branches.filter((issues) =>
    issues.some(({ path, code }) => path.length > 0 || code === 'unrecognized_keys'),
  );
  return nested.length === 1 ? nested[0]! : null;
}

const TYPE_WORDS: Readonly<Record<string, string>> = {
  string: 'a text',
  number: 'a number',
  int: 'a whole number',
  array: 'a list',
  object: 'keys with values',
  record: 'keys with values',
};

function expectations(issue: Issue): string[] {
  switch (issue.code) {
    case 'invalid_type':
      return [TYPE_WORDS[issue.expected] ?? issue.expected];
    case 'invalid_value':
      return issue.values.map((value) => JSON.stringify(String(value)));
    case 'too_small':
      return [
        issue.origin === 'array' || issue.origin === 'string'
          ? 'at least one entry'
          : `a number ${issue.inclusive ? 'of at least' : 'above'} ${issue.minimum}`,
      ];
    case 'too_big':
      return [`a number ${issue.inclusive ? 'of at most' : 'below'} ${issue.maximum}`];
    case 'invalid_union':
      // A union told apart by one key names the values of that key.
      if ('options' in issue)
        return (issue.options as unknown[]).map((value) => JSON.stringify(String(value)));
      return issue.errors.flat().flatMap(expectations);
    default:
      return [issue.message];
  }
}

function unknownKey(key: string, path: Path, value: unknown, placeOf: PlaceOf): Message {
  const cut = cutNumber(key, valueAt(value, path));
  if (cut !== null) return message('error', 'unknown-key', cut, placeOf([...path, key]));
  const known = knownKeys(path, value);
  const allowed = known.length === 0 ? '' : ` Known here: ${known.join(', ')}.`;
  const text = `The key ${quoted(key)} is not known.${suggestion(key, known) || allowed} Correct or remove it.`;
  return message('error', 'unknown-key', text, placeOf([...path, key]));
}

/** What to say of a decimal comma between braces, which parts `30,0` into the number 30 and a key 0; null otherwise. */
function cutNumber(key: string, around: unknown): string | null {
  const entries = Object.entries(around as Record<string, unknown>);
  const isCut = /^\d+$/.test(key) && entries.some(([name, value]) => name === key && value === null);
  const numbers = entries.filter(([, value]) => typeof value === 'number' && Number.isInteger(value));
  if (!isCut || numbers.length === 0) return null;
  // Digits of a key lose their zeros in front, so that only of a plain 0 the whole number is known.
  const [only] = numbers.length === 1 && key === '0' ? numbers : [];
  const remedy = only === undefined ? 'such as 30.5' : `here ${only[0]}: ${only[1]}.0`;
  return `Expected numbers with a decimal point, came the key ${quoted(key)} without a value: a decimal comma ends a number here. Write a point, ${remedy}.`;
}

const valueAt = (value: unknown, path: Path): unknown =>
  path.reduce<unknown>(
    (inner, step) => (inner as Record<PropertyKey, unknown> | null | undefined)?.[step],
    value,
  );

/** A value as it was written, more or less. */
function shown(value: unknown): string {
  if (value === null) return 'nothing';
  if (typeof value === 'string') return quoted(value);
  const text = typeof value === 'object' ? JSON.stringify(value) : String(value);
  // .nan and .inf are how YAML writes numbers that are none.
  if (text === 'NaN' || text.endsWith('Infinity')) return 'a number without a value';
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}
