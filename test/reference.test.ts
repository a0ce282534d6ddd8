import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { referencePages } from '../docs/reference/pages.js';
import { RESULT_WORDS } from '../docs/reference/words.js';
import { resultsJsonSchema, studyJsonSchema } from '../src/study/index.js';
import { REPOSITORY } from './cli/ppmwise.js';

const pages = referencePages();

describe.each(Object.keys(pages))('docs/reference/%s', (name) => {
  it('is as the schema makes it: else run npm run docs:reference', () => {
    expect(readFileSync(join(REPOSITORY, 'docs/reference', name), 'utf8')).toBe(pages[name]);
  });
  it('says what each key means', () => {
    const rows = pages[name]!.split('\n').filter((line) => line.startsWith('| `'));
    for (const row of rows) expect(row.split(' | ').at(-1), row).toMatch(/\S.*\. \|$/);
  });
});

/** Every name of a key in a JSON Schema, however deep. */
function names(node: unknown): string[] {
  if (node === null || typeof node !== 'object') return [];
  return Object.entries(node).flatMap(([key, value]) => [
    ...(key === 'properties' ? Object.keys(value as object) : []),
    ...names(value),
  ]);
}

it('leaves out no key', () => {
  const listed = (name: string): Set<string> =>
    new Set([...pages[name]!.matchAll(/^\| `([^`]+)`/gm)].map(([, path]) => path!.split('.').at(-1)!));
  const interval = ['estimate', 'low', 'high'];
  for (const name of names(studyJsonSchema())) expect(listed('study-file.md'), name).toContain(name);
  for (const name of names(resultsJsonSchema()).filter((key) => !interval.includes(key)))
    expect(listed('results.md'), name).toContain(name);
});

it('explains no name that the results do not have', () => {
  const known = new Set(names(resultsJsonSchema()));
  for (const word of Object.keys(RESULT_WORDS)) expect(known, word).toContain(word.split('.').at(-1));
});
