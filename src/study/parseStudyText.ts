import { type Document, isMap, isNode, isScalar, LineCounter, parseDocument } from 'yaml';
import type { z } from 'zod';
import { InputError, type Message, message, suggestion } from '../logs/index.js';
import { type StudySettings, studySchema } from './settings.js';

type Issue = z.core.$ZodIssue;
type Path = readonly PropertyKey[];

/**
 * Text of a study file → settings.
 * @throws InputError with one message for every mistake: line, key, what was expected, what came
 */
export function parseStudyText(text: string, file: string): StudySettings {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, prettyErrors: false });
  if (document.errors.length > 0) {
    throw new InputError(
      document.errors.map(({ message: fault, pos }) =>
        message('error', 'broken-yaml', `The file is not valid YAML: ${sentence(fault)} Correct the line.`, {
          file,
          row: lines.linePos(pos[0]).line,
        }),
      ),
    );
  }
  const value: unknown = document.toJS();
  const result = studySchema.safeParse(value ?? {});
  if (result.success) return result.data;
  const places = { document, lines, file, value };
  throw new InputError(result.error.issues.flatMap((issue) => issueMessages(issue, places)));
}

interface Places {
  readonly document: Document;
  readonly lines: LineCounter;
  readonly file: string;
  readonly value: unknown;
}

function issueMessages(issue: Issue, places: Places): Message[] {
  if (issue.code === 'unrecognized_keys') return issue.keys.map((key) => unknownKey(key, issue.path, places));
  if (issue.code === 'invalid_union') {
    const branch = nearestBranch(issue.errors);
    if (branch !== null)
      return branch.flatMap((inner) =>
        issueMessages({ ...inner, path: [...issue.path, ...inner.path] }, places),
      );
  }
  const came = valueAt(places.value, issue.path);
  const expected = expectation(issue);
  const text =
    came === undefined
      ? `Expected ${expected}, the key is missing. Add it.`
      : `Expected ${expected}, came ${shown(came)}. Correct it.`;
  return [at('bad-setting', text, issue.path, places)];
}

/** Of the alternatives of a union the one that came closest: the fault lies deepest, or there are fewest. */
function nearestBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] | null {
  const nested = branches.filter((issues) =>
    issues.some(({ path, code }) => path.length > 0 || code === 'unrecognized_keys'),
  );
  return nested.length === 1 ? nested[0]! : null;
}

function expectation(issue: Issue): string {
  const or = (values: readonly unknown[]): string =>
    values.map((value) => JSON.stringify(value)).join(' or ');
  switch (issue.code) {
    case 'invalid_type':
      return `${/^[aeiou]/.test(issue.expected) ? 'an' : 'a'} ${issue.expected}`;
    case 'invalid_value':
      return or(issue.values);
    case 'invalid_format':
      return issue.message;
    case 'too_small':
      return issue.origin === 'array' || issue.origin === 'string'
        ? 'at least one entry'
        : `a number ${issue.inclusive ? 'of at least' : 'above'} ${issue.minimum}`;
    case 'too_big':
      return `a number ${issue.inclusive ? 'of at most' : 'below'} ${issue.maximum}`;
    case 'invalid_union':
      return [...new Set(issue.errors.flat().map(expectation))].join(' or ');
    default:
      return issue.message;
  }
}

function unknownKey(key: string, path: Path, places: Places): Message {
  const known = knownKeys(path);
  const allowed = known.length === 0 ? '' : ` Known here: ${known.join(', ')}.`;
  const text = `The key "${key}" is not known.${suggestion(key, known) || allowed} Correct or remove it.`;
  return at('unknown-key', text, [...path, key], places);
}

/** Keys that the schema allows at a path. */
function knownKeys(path: Path): string[] {
  let schema: unknown = studySchema;
  for (const step of path) {
    const { def } = unwrapped(schema);
    schema = typeof step === 'number' ? def.element : def.shape?.[String(step)];
  }
  return Object.keys(unwrapped(schema).def.shape ?? {});
}

/** What is looked at of a schema's inside. */
interface Definition {
  readonly element?: unknown;
  readonly shape?: Record<string, unknown>;
  readonly innerType?: unknown;
  readonly options?: unknown;
}

/** The object schema inside optional, default, described and union wrappers. */
function unwrapped(schema: unknown): { def: Definition } {
  let current = schema as { def?: Definition } | undefined;
  while (current?.def !== undefined) {
    const { innerType, options } = current.def;
    if (innerType !== undefined) current = innerType as typeof current;
    else if (Array.isArray(options))
      current = options.find((option) => 'shape' in (option as { def: object }).def);
    else return { def: current.def };
  }
  return { def: {} };
}

function at(code: string, text: string, path: Path, { document, lines, file }: Places): Message {
  const offset = offsetOf(document, path);
  const name = path.reduce<string>(
    (joined, step) =>
      typeof step === 'number'
        ? `${joined}[${step}]`
        : joined === ''
          ? String(step)
          : `${joined}.${String(step)}`,
    '',
  );
  return message('error', code, text, {
    file,
    ...(offset === null ? {} : { row: lines.linePos(offset).line }),
    ...(name === '' ? {} : { column: name }),
  });
}

/** Where the key at a path stands, or the nearest thing above it that exists. */
function offsetOf(document: Document, path: Path): number | null {
  for (let depth = path.length; depth > 0; depth--) {
    const parent = depth === 1 ? document.contents : document.getIn(path.slice(0, depth - 1), true);
    const step = path[depth - 1];
    if (isMap(parent)) {
      const pair = parent.items.find(({ key }) => isScalar(key) && key.value === step);
      if (pair !== undefined && isNode(pair.key) && pair.key.range) return pair.key.range[0];
    }
    const node = document.getIn(path.slice(0, depth), true);
    if (isNode(node) && node.range) return node.range[0];
  }
  return null;
}

const valueAt = (value: unknown, path: Path): unknown =>
  path.reduce<unknown>(
    (inner, step) => (inner as Record<PropertyKey, unknown> | null | undefined)?.[step],
    value,
  );

function shown(value: unknown): string {
  const text = JSON.stringify(value);
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}

const sentence = (fault: string): string => `${fault.trim().replace(/[.:]$/, '')}.`;
