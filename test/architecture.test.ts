import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

/** The folders of src, each one knowing only those before it. */
const FOLDERS = [
  'stats',
  'geodesy',
  'time',
  'logs',
  'control',
  'errors',
  'split',
  'fit',
  'ionosphere',
  'days',
  'rule',
  'campaign',
  'study',
  'charts',
  'report',
  'notebook',
  'cli',
];
/** Folders that touch files; of charts only the one that finds fonts does. */
const FILE_FOLDERS = ['logs', 'control', 'study', 'cli'];
const MOST_LINES = 250;

const src = fileURLToPath(new URL('../src', import.meta.url));

interface Source {
  readonly name: string;
  readonly folder: string;
  readonly text: string;
  /** The text without comments, so that words in prose are no code. */
  readonly code: string;
}

const sources: readonly Source[] = readdirSync(src, { recursive: true, encoding: 'utf8' })
  .map((name) => name.split(sep).join('/'))
  .filter((name) => name.endsWith('.ts') && name !== 'index.ts')
  .map((name) => {
    const text = readFileSync(join(src, name), 'utf8');
    const code = text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/(^|\s)\/\/.*$/gm, '$1');
    return { name, folder: name.split('/')[0]!, text, code };
  });

/** What a file imports, types too; `static` is false for import(). */
function imports({ code }: Source): { readonly from: string; readonly static: boolean }[] {
  const found = (pattern: RegExp, isStatic: boolean) =>
    [...code.matchAll(pattern)].map((match) => ({ from: match[1]!, static: isStatic }));
  return [
    ...found(/^\s*(?:import|export)\b[^;'"]*?\bfrom\s*['"]([^'"]+)['"]/gm, true),
    ...found(/^\s*import\s*['"]([^'"]+)['"]/gm, true),
    ...found(/\bimport\(\s*['"]([^'"]+)['"]\s*\)/g, false),
  ];
}

/** `file: what` for everything that breaks a rule, so that a failure names its place. */
const offenders = (broken: (source: Source) => readonly string[]): string[] =>
  sources.flatMap((source) => broken(source).map((what) => `${source.name}: ${what}`));

describe('the folders of src', () => {
  it('are the known ones, and this test sees their imports', () => {
    for (const { name, folder } of sources) expect(FOLDERS, name).toContain(folder);
    const run = sources.find(({ name }) => name === 'study/run.ts')!;
    expect(imports(run).map(({ from }) => from)).toEqual(
      expect.arrayContaining(['../control/index.js', '../errors/index.js', './study.js']),
    );
  });

  it('import only from folders before their own', () => {
    const broken = offenders((source) =>
      imports(source).flatMap(({ from }) => {
        if (!from.startsWith('.')) return [];
        const target = relative(src, resolve(join(src, dirname(source.name)), from)).split(sep);
        const folder = target[0]!;
        if (folder === '..' || folder === source.folder) return [];
        return FOLDERS.indexOf(folder) < FOLDERS.indexOf(source.folder) ? [] : [from];
      }),
    );
    expect(broken).toEqual([]);
  });

  it('load the drawing libraries only when something is drawn', () => {
    const broken = offenders((source) =>
      imports(source)
        .filter((each) => each.static && /^(vega|@resvg)/.test(each.from))
        .filter(({ from }) => !new RegExp(`^\\s*import type [^;]*from '${from}'`, 'm').test(source.code))
        .map(({ from }) => from),
    );
    expect(broken).toEqual([]);
  });

  it('touch files only where they read logs, control and studies, or write results', () => {
    const broken = offenders((source) =>
      imports(source)
        .map(({ from }) => from)
        .filter((from) => /^(node:)?fs(\/promises)?$/.test(from))
        .filter(() => !FILE_FOLDERS.includes(source.folder) && source.name !== 'charts/fonts.ts'),
    );
    expect(broken).toEqual([]);
  });

  it('read no clock and draw no chance of their own', () => {
    const broken = offenders(
      ({ code }) =>
        code.match(/Date\.now\(|new Date\(\s*\)|\bDate\(\s*\)|performance\.now|Math\.random/g) ?? [],
    );
    expect(broken).toEqual([]);
  });

  it('hold short files', () => {
    const broken = offenders(({ name, text }) => {
      const lines = text.split('\n').length - 1;
      // a table that a recipe writes
      if (name === 'geodesy/crs/epsgTable.ts') return [];
      return lines > MOST_LINES ? [`${lines} lines`] : [];
    });
    expect(broken).toEqual([]);
  });
});
