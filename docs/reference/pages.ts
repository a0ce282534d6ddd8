import { resultsJsonSchema, studyJsonSchema } from '../../src/study/index.js';
import { typeComments } from './typeComments.js';
import { RESULT_WORDS } from './words.js';

/** What is read of a JSON Schema (2020-12). */
interface Schema {
  readonly type?: string | readonly string[];
  readonly description?: string;
  readonly properties?: Readonly<Record<string, Schema>>;
  readonly required?: readonly string[];
  readonly items?: Schema;
  /** Entries of a list of fixed length. */
  readonly prefixItems?: readonly Schema[];
  readonly anyOf?: readonly Schema[];
  readonly oneOf?: readonly Schema[];
  readonly enum?: readonly unknown[];
  readonly const?: unknown;
  readonly default?: unknown;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly exclusiveMinimum?: number;
  readonly exclusiveMaximum?: number;
  readonly additionalProperties?: Schema | boolean;
  readonly propertyNames?: Schema;
}

interface Key {
  readonly path: string;
  readonly schema: Schema;
  readonly required: boolean;
  /** Where the same keys were listed before; null where they follow. */
  readonly sameAs: string | null;
}

const MADE = 'This page is made from the schema by `npm run docs:reference`; a test holds it to it.';

/** The reference pages, by file name. */
export function referencePages(): Readonly<Record<string, string>> {
  return { 'study-file.md': studyPage(), 'results.md': resultsPage() };
}

function studyPage(): string {
  const rows = keysOf(studyJsonSchema() as Schema).map((key) =>
    row([
      code(key.path),
      kindOf(key.schema),
      key.required ? 'required' : key.schema.default === undefined ? '' : code(yaml(key.schema.default)),
      meaningOf(key, (path) => missing(path)),
    ]),
  );
  return page('Reference of the study file', [
    `${MADE} [The study file](../study-file.md) explains what belongs together, and \`study.schema.json\` in a folder of \`npx ppmwise new\` lets editors complete and check the keys.`,
    '`a.b` is key `b` inside `a`; `a[]` is each entry of a list. A key that is not required may be left out.',
    table(['key', 'value', 'default', 'meaning'], rows),
  ]);
}

function resultsPage(): string {
  const comments = typeComments();
  const words = (path: string): string =>
    comments.get(path) ?? RESULT_WORDS[path] ?? RESULT_WORDS[lastName(path)] ?? missing(path);
  const keys = keysOf(resultsJsonSchema() as Schema);
  const rows = keys.map((key) => row([code(key.path), kindOf(key.schema), meaningOf(key, words)]));
  return page('Reference of results.json', [
    `${MADE} Every key is always there; a value that cannot be given is null, with a reason beside it or a message. Lengths of baselines are km, errors mm, a ppm mm per km; all is metric whatever the pages show.`,
    '*interval* is an object `{estimate, low, high}`. `a.b` is key `b` inside `a`; `a[]` is each entry of a list, `a.*` the value under each name. Where the same keys come again, the first place is named.',
    table(['key', 'value', 'meaning'], rows),
  ]);
}

/** Every key, in the order of the schema, each object before what is in it. */
export function keysOf(schema: Schema): Key[] {
  const first = new Map<string, string>();
  const inside = (node: Schema, path: string): Key[] => {
    const shapes = alternatives(node).flatMap((one) => insideOf(one, path));
    return shapes.flatMap(([shape, at]) => {
      const required = new Set(shape.required);
      return Object.entries(shape.properties ?? {}).flatMap(([name, inner]) => {
        const own = at === '' ? name : `${at}.${name}`;
        const content = JSON.stringify(shapesIn(inner).map(({ properties }) => properties ?? {}));
        const large = shapesIn(inner).some(({ properties }) => Object.keys(properties ?? {}).length > 2);
        const sameAs = large && !isInterval(inner) ? (first.get(content) ?? null) : null;
        if (large && sameAs === null && !isInterval(inner)) first.set(content, own);
        const key: Key = { path: own, schema: inner, required: required.has(name), sameAs };
        return [key, ...(sameAs === null && !isInterval(inner) ? inside(inner, own) : [])];
      });
    });
  };
  return unique(inside(schema, ''));
}

/** Alternatives of a key may share inner keys; those that tell them apart (`kind`) are listed together. */
function unique(keys: readonly Key[]): Key[] {
  const seen = new Map<string, Key>();
  for (const key of keys) {
    const before = seen.get(key.path);
    seen.set(key.path, before === undefined ? key : { ...before, schema: either(before.schema, key.schema) });
  }
  return [...seen.values()];
}

function either(a: Schema, b: Schema): Schema {
  if (a.const === undefined || b.const === undefined) return a;
  return {
    enum: [a.const, b.const],
    description: `${a.const}: ${a.description} ${b.const}: ${b.description}`,
  };
}

const alternatives = (node: Schema): readonly Schema[] => node.anyOf ?? node.oneOf ?? [node];

/** The objects in which a schema goes on, with their paths: itself, the entries of a list, the values under free names. */
function insideOf(one: Schema, path: string): (readonly [Schema, string])[] {
  const named = typeof one.additionalProperties === 'object' ? one.additionalProperties : undefined;
  if (named?.properties !== undefined) return [[named, `${path}.*`]];
  if (one.items === undefined) return [[one, path]];
  return alternatives(one.items).map((item) => [item, `${path}[]`] as const);
}

/** The objects that a key may hold, in a list or not. */
const shapesIn = (node: Schema): readonly Schema[] =>
  alternatives(node).flatMap((one) => (one.items === undefined ? [one] : alternatives(one.items)));

const isInterval = (node: Schema): boolean =>
  alternatives(node).some(({ properties }) => Object.keys(properties ?? {}).join() === 'estimate,low,high');

function meaningOf({ path, schema, sameAs }: Key, words: (path: string) => string): string {
  const told = schema.description ?? alternatives(schema).find(({ description }) => description)?.description;
  const same = sameAs === null ? '' : ` Keys as of \`${sameAs}\`.`;
  return `${told ?? words(path)}${same}`;
}

function missing(path: string): never {
  throw new Error(
    `Nothing says what "${path}" means. Describe it in its schema, comment it in its type, or add its name to docs/reference/words.ts.`,
  );
}

const lastName = (path: string): string => path.split('.').at(-1)!;

/** What a value looks like, in words. */
function kindOf(schema: Schema): string {
  if (isInterval(schema))
    return alternatives(schema).some(({ type }) => type === 'null') ? 'interval or null' : 'interval';
  return [...new Set(alternatives(schema).map(kindOfOne))].join(' or ');
}

function kindOfOne(schema: Schema): string {
  if (schema.enum !== undefined) return schema.enum.map((value) => code(String(value))).join(', ');
  if (schema.const !== undefined) return code(String(schema.const));
  if (schema.anyOf !== undefined || schema.oneOf !== undefined) return kindOf(schema);
  if (schema.prefixItems !== undefined)
    return `list of ${schema.prefixItems.length} ${plural(kindOf(schema.prefixItems[0]!))}`;
  if (schema.items !== undefined) return `list of ${plural(kindOf(schema.items))}`;
  const { type } = schema;
  if (typeof type === 'object') return type.map((one) => kindOfOne({ ...schema, type: one })).join(' or ');
  if (type === 'object') return schema.properties === undefined ? namesAndValues(schema) : 'object';
  if (type === 'number') return `number${bounds(schema)}`;
  if (type === 'integer') return `whole number${bounds(schema)}`;
  return type === undefined ? 'any' : (SIMPLE_KINDS[type] ?? type);
}

function namesAndValues({ propertyNames, additionalProperties }: Schema): string {
  const names = propertyNames?.enum ?? [];
  const value = typeof additionalProperties === 'object' ? kindOf(additionalProperties) : 'any';
  // the roles of columns are listed in a page of their own
  const which =
    names.length > 0 && names.length < 15
      ? `for some of ${names.map((name) => code(String(name))).join(', ')}`
      : 'for each name';
  return `${value} ${which}`;
}

const SIMPLE_KINDS: Readonly<Record<string, string>> = { string: 'text', boolean: '`true`, `false`' };

const plural = (kind: string): string =>
  /^(text|number|object|interval|whole number)$/.test(kind) ? `${kind}s` : kind;

function bounds({ minimum, maximum, exclusiveMinimum, exclusiveMaximum }: Schema): string {
  const named = (value: number | undefined): value is number => value !== undefined && Math.abs(value) < 1e15;
  const parts = [
    named(minimum) ? `from ${minimum}` : named(exclusiveMinimum) ? `above ${exclusiveMinimum}` : '',
    named(maximum) ? `to ${maximum}` : named(exclusiveMaximum) ? `below ${exclusiveMaximum}` : '',
  ].filter((part) => part !== '');
  return parts.length === 0 ? '' : ` ${parts.join(', ')}`;
}

/** A default as it would be written in the study file. */
const yaml = (value: unknown): string =>
  typeof value === 'object'
    ? JSON.stringify(value).replaceAll('"', '').replaceAll(':', ': ').replaceAll(',', ', ')
    : String(value);

const code = (text: string): string => `\`${text}\``;
const row = (cells: readonly string[]): string =>
  `| ${cells.map((cell) => cell.replaceAll('|', '\\|')).join(' | ')} |`;
const table = (head: readonly string[], rows: readonly string[]): string =>
  [row(head), `|${head.map(() => '---').join('|')}|`, ...rows].join('\n');
const page = (title: string, parts: readonly string[]): string => `# ${title}\n\n${parts.join('\n\n')}\n`;
