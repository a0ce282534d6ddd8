import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { STARTER_FILES } from '../../src/cli/starter.js';
import { REPOSITORY } from '../cli/ppmwise.js';

const read = (name: string): string => readFileSync(join(REPOSITORY, name), 'utf8');
const markdown = (folder: string): string[] =>
  readdirSync(join(REPOSITORY, folder))
    .filter((name) => name.endsWith('.md'))
    .map((name) => join(folder, name));

/** Every page that shows commands to a user or a contributor. */
const pages = new Map<string, string>([
  ...[
    'README.md',
    'DEVELOPERS.md',
    'datasets-demo/README.md',
    ...markdown('docs'),
    ...markdown('docs/reference'),
  ].map((name) => [name, read(name)] as const),
  ['README.md of a new study', STARTER_FILES['README.md']!],
]);

const SPAN = /`((?:npx|npm|node|sudo|ppmwise|\.ci)[ /][^`\n]*)`/g;
const BLOCK = /^ {4,}((?:npx|npm|node|sudo|ppmwise|cd) .*)$/gm;
const CONSOLE = /^\$ (.*)$/gm;
const commandsOf = (text: string): string[] =>
  [...text.matchAll(SPAN), ...text.matchAll(BLOCK), ...text.matchAll(CONSOLE)].map(([, command]) =>
    command!.replace(/ {2,}#.*| #.*/, '').trim(),
  );

/** Which test, or step of `.ci/run`, runs a command that is shown. */
const RUN_BY: readonly (readonly [RegExp, string])[] = [
  [/^npm ci( && npm (run demo|test))?$|^npm test$/, '.ci/run'],
  [/^npm run (build|lint|typecheck|demo|docs|hygiene|docs:reference)$/, '.ci/run'],
  [/^\.ci\/run$/, '.ci/run'],
  [/^npx tsc$/, 'DEVELOPERS.md'], // warned of
  [/^sudo apt-get install -y --no-install-recommends jupyter-notebook jupyter-nbconvert$/, '.ci/run'],
  [
    /^npm (pack|install)$|^cd my-study$|^npx --yes --package=\/path\/to\/ppmwise-[\d.]+\.tgz ppmwise new my-study$/,
    'test/docs/walkthrough.test.ts',
  ],
  [/^npx ppmwise (layout logs\/\*|check study\.yaml|run study\.yaml)$/, 'test/docs/walkthrough.test.ts'],
  [/^(npx )?ppmwise (new|demo)( DIR| try)?$|^npx ppmwise layout FILE$/, 'test/cli/commands.test.ts'],
  [/^ppmwise watch /, 'test/cli/watch.test.ts'],
  [/^npm run notebook$|^ppmwise notebook$/, 'test/notebook/jupyter.test.ts'],
  [
    /^npm run notebooks:run$|^node notebooks\/run-notebook\.cjs --in-place notebooks\/\*\.ipynb$/,
    'test/notebook/notebooks.test.ts',
  ],
  [/^npm run demo:make$/, 'test/campaign/demo.test.ts'],
  [/^npm run dev -- run datasets-demo\/study\.yaml$/, 'test/docs/commands.test.ts'],
  [/^npm install --package-lock-only --omit-lockfile-registry-resolved$/, 'package-lock.json'],
  // long, and asserted nowhere: their numbers depend on the machine
  [/^npm run (bench|bench:\w+|mutate)\b/, 'package.json'],
];

describe.each([...pages.keys()])('%s', (page) => {
  it('shows only commands that something runs', () => {
    for (const command of commandsOf(pages.get(page)!)) {
      const by = RUN_BY.find(([pattern]) => pattern.test(command));
      expect(by, `${command}: nothing runs it. Run it in a test and name that here.`).toBeDefined();
      expect(existsSync(join(REPOSITORY, by![1])), by![1]).toBe(true);
    }
  });
});

it('installs in .ci/run what the README tells to install', () => {
  const [, packages] = /apt-get install -y --no-install-recommends ([\w -]+)/.exec(read('README.md'))!;
  for (const name of packages!.split(' ')) expect(read('.ci/run')).toContain(name);
});

it('runs the sources without a build', () => {
  const { status, stdout } = spawnSync(
    process.execPath,
    [
      join(REPOSITORY, 'node_modules/tsx/dist/cli.mjs'),
      'src/cli/main.ts',
      'check',
      'datasets-demo/study.yaml',
    ],
    { cwd: REPOSITORY, encoding: 'utf8' },
  );
  expect(status).toBe(0);
  expect(stdout).toContain('Rows: 10\u202f450 read');
});
