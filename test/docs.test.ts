import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readStudy, runStudy, summaryText } from '../src/index.js';
import { ROW_REASONS } from '../src/logs/index.js';
import { studyJsonSchema } from '../src/study/index.js';
import { REPOSITORY } from './cli/ppmwise.js';

const read = (name: string): string => readFileSync(join(REPOSITORY, name), 'utf8');
const pages = [
  'README.md',
  'DEVELOPERS.md',
  'CHANGELOG.md',
  'datasets-demo/README.md',
  ...readdirSync(join(REPOSITORY, 'docs'))
    .filter((n) => n.endsWith('.md'))
    .map((n) => `docs/${n}`),
];

describe.each(pages)('%s', (page) => {
  it('links to files that exist', () => {
    for (const [, target] of read(page).matchAll(/\]\((?!https?:)([^)#]+)[^)]*\)/g)) {
      expect(existsSync(join(REPOSITORY, dirname(page), target!)), target).toBe(true);
    }
  });
  it('names only scripts that exist', () => {
    const { scripts } = JSON.parse(read('package.json'));
    for (const [, name] of read(page).matchAll(/npm run ([\w:]+)/g))
      expect(Object.keys(scripts), name).toContain(name);
  });
});

describe('README', () => {
  it('states the job first and then the two commands', () => {
    const text = read('README.md');
    expect(text.indexOf('maximum baseline')).toBeLessThan(text.indexOf('npm ci && npm run demo'));
    expect(text.indexOf('npm ci && npm run demo')).toBeLessThan(text.indexOf('npm ci && npm test'));
  });
  it('shows a program that runs', async () => {
    const [, program] = /```ts\n([\s\S]*?)```/.exec(read('README.md'))!;
    const printed: string[] = [];
    const body = program!
      .replace(/^import .*$/m, '')
      .replace("'datasets-demo/", `'${REPOSITORY}/datasets-demo/`);
    const AsyncFunction = Object.getPrototypeOf(async () => {}).constructor;
    const names = ['readStudy', 'runStudy', 'summaryText'];
    await new AsyncFunction(...names, 'console', body)(readStudy, runStudy, summaryText, {
      log: (line: string) => printed.push(line),
    });
    expect(printed.join('\n')).toMatch(/Up to [\d.]+\u00a0km from the base/);
  });
});

/** Every key of a JSON Schema, however deep. */
function nestedKeys(node: unknown): string[] {
  if (node === null || typeof node !== 'object') return [];
  return Object.entries(node).flatMap(([key, value]) => [
    ...(key === 'properties' ? Object.keys(value as object) : []),
    ...nestedKeys(value),
  ]);
}

describe("the contributor's guide", () => {
  it('names only sources that exist', () => {
    for (const [, name] of read('DEVELOPERS.md').matchAll(/`((?:[\w-]+\/)*[\w-]+\.ts)`/g)) {
      const found = readdirSync(join(REPOSITORY, 'src'), { recursive: true, encoding: 'utf8' });
      const tests = readdirSync(join(REPOSITORY, 'test'), { recursive: true, encoding: 'utf8' }).map(
        (file) => `test/${file}`,
      );
      const known = [...found.map((file) => `src/${file}`), ...tests];
      expect(
        known.some((file) => file.endsWith(`/${name}`) || file === name),
        name,
      ).toBe(true);
    }
  });
});

describe('the study file page', () => {
  it('lists every key of the schema and every reason in use', () => {
    const page = read('docs/study-file.md');
    const { properties } = studyJsonSchema() as { properties: object };
    for (const key of [...Object.keys(properties), ...nestedKeys(properties)])
      expect(page, key).toContain(key);
    for (const reason of ROW_REASONS.filter((name) => !['moving', 'not-single-base'].includes(name)))
      expect(page).toContain(`\`${reason}\``);
  });
});
