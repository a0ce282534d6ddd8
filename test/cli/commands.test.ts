import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { resultsSchema } from '../../src/study/index.js';
import { emptyFolder, ppmwise, REPOSITORY } from './ppmwise.js';

const folder = emptyFolder();
const demo = join(folder, 'try');
/** Of each kind of output one. */
const WRITTEN = [
  'results.json',
  'report.html',
  'annex.html',
  'card.html',
  'weights.html',
  'report.md',
  'tables/errors.csv',
  'charts/rule-moves.svg',
  'exports/errors.arrow',
];

beforeAll(() => {
  expect(ppmwise(['demo', demo]).code).toBe(0);
});

describe('ppmwise', () => {
  it.each([
    [['--help']],
    [['run', '--help']],
    [['check', '--help']],
    [['demo', '--help']],
    [['new', '--help']],
    [['notebook', '--help']],
    [['watch', '--help']],
  ])('explains itself with %j', (args) => {
    const { code, out } = ppmwise(args);
    expect(code).toBe(0);
    expect(out).toContain('Usage: ppmwise');
  });
  it('tells its version', () => {
    const { version } = JSON.parse(readFileSync(join(REPOSITORY, 'package.json'), 'utf8'));
    expect(ppmwise(['--version']).out.trim()).toBe(version);
  });
  it.each([
    [['rnu', 'x'], 'Did you mean run?'],
    [['run'], "missing required argument 'study'"],
    [['run', 'x', '--ouut', 'y'], 'Did you mean --out?'],
    [['check', 'a', 'b'], 'too many arguments'],
  ])('refuses %j with exit 2', (args, text) => {
    const { code, err } = ppmwise(args);
    expect(code).toBe(2);
    expect(err).toContain(text);
    expect(err).not.toContain('    at ');
  });
});

describe('demo and run', () => {
  const out = join(folder, 'results');
  it('copies a study without the program that makes it', () => {
    expect(readdirSync(demo).sort()).toEqual([
      'README.md',
      'another-layout',
      'bases.csv',
      'indices',
      'jobs',
      'logs',
      'marks.csv',
      'study.yaml',
      'truth.json',
    ]);
    const again = ppmwise(['demo', demo]);
    expect(again.code).toBe(2);
    expect(again.err).toContain('Expected a new or empty folder');
  });
  it('runs it, writes everything and prints the rule first', () => {
    const { code, out: text, err } = ppmwise(['run', join(demo, 'study.yaml'), '--out', out]);
    expect(code).toBe(0);
    expect(err).toBe('');
    expect(text.split('\n')[2]).toMatch(
      /^Up to [\d.]+\u00a0km from the base: 95\u00a0% of horizontal positions within 25\u00a0mm/,
    );
    expect(text).toContain(`Report: ${join(out, 'report.html')}`);
    expect(readdirSync(out).sort()).toEqual([
      'annex.html',
      'annex.md',
      'card.html',
      'card.md',
      'charts',
      'exports',
      'report.html',
      'report.md',
      'results.json',
      'tables',
      'weights.html',
      'weights.md',
    ]);
    expect(readdirSync(join(out, 'exports')).sort()).toEqual([
      'errors.arrow',
      'jobs.geojson',
      'marks.geojson',
      'set-aside-occupations.arrow',
      'visits-without-fix.arrow',
    ]);
    expect(readdirSync(join(out, 'charts')).sort()).toEqual([
      'back-test.svg',
      'days.svg',
      'horizontal-error.svg',
      'hours-and-days-horizontal.svg',
      'hours-and-days-vertical.svg',
      'hours-horizontal.svg',
      'hours-vertical.svg',
      'job-1.svg',
      'job-2.svg',
      'job-3.svg',
      'job-4.svg',
      'job-5.svg',
      'map-1.svg',
      'map-2.svg',
      'mark-means.svg',
      'rule-moves.svg',
      'sky-horizontal-daily-factor.svg',
      'sky-share-without-a-fix.svg',
      'sky-vertical-daily-factor.svg',
      'split-by-age-of-corrections.svg',
      'split-by-base.svg',
      'split-by-crew.svg',
      'split-by-direction-from-the-base.svg',
      'split-by-month.svg',
      'split-by-pdop.svg',
      'split-by-rover.svg',
      'split-by-satellites.svg',
      'split-by-sky-at-the-mark.svg',
      'split-by-solar-hour.svg',
      'vertical-error.svg',
      'wrong-fixes.svg',
    ]);
  });
  it('writes results that its schema accepts, whose account adds up and that hold the truth', () => {
    const results = resultsSchema.parse(JSON.parse(readFileSync(join(out, 'results.json'), 'utf8')));
    const setAside = Object.values(results.rows.setAside).reduce((a, b) => a + b, 0);
    expect(results.rows.read).toBe(results.rows.used + setAside);
    const truth = JSON.parse(readFileSync(join(demo, 'truth.json'), 'utf8'));
    const rests = results.fits.filter(({ basisOfRule }) => basisOfRule);
    expect(rests.map(({ component }) => component)).toEqual(['horizontal', 'vertical']);
    for (const { component, ppm, constantMm } of rests) {
      const { drawnPpm, constantMm: constant } = truth.components[component];
      expect(ppm.low).toBeLessThan(drawnPpm);
      expect(ppm.high).toBeGreaterThan(drawnPpm);
      expect(constantMm.low).toBeLessThan(constant);
      expect(constantMm.high).toBeGreaterThan(constant);
    }
  });
  it('lists every set-aside row with its place', () => {
    const results = JSON.parse(readFileSync(join(out, 'results.json'), 'utf8'));
    const rows = readFileSync(join(out, 'tables/set-aside.csv'), 'utf8').trim().split('\n').slice(1);
    expect(rows).toHaveLength(results.rows.read - results.rows.used);
    for (const row of rows)
      expect(row).toMatch(/^logs\/2025-0[345]\.csv,\d+,(duplicate|not-fixed|unknown-mark),/);
  });
  it('gives the same bytes when run again, over its own old result', () => {
    const read = (name: string): string => readFileSync(join(out, name), 'utf8');
    const before = WRITTEN.map(read);
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', out]).code).toBe(0);
    expect(WRITTEN.map(read)).toEqual(before);
  });
  it('prints results.json with --json, and nothing else', () => {
    const { code, out: text } = ppmwise(['run', join(demo, 'study.yaml'), '--out', out, '--json']);
    expect(code).toBe(0);
    expect(text).toBe(readFileSync(join(out, 'results.json'), 'utf8'));
  });
  it("does not write into a folder of somebody else's", () => {
    const other = join(folder, 'other');
    mkdirSync(other);
    writeFileSync(join(other, 'thesis.txt'), 'mine');
    const refused = ppmwise(['run', join(demo, 'study.yaml'), '--out', other]);
    expect(refused.code).toBe(2);
    expect(refused.err).toContain('no result of ppmwise');
    expect(readdirSync(other)).toEqual(['thesis.txt']);
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', other, '--force']).code).toBe(0);
    expect(readFileSync(join(other, 'thesis.txt'), 'utf8')).toBe('mine');
  });
  it("keeps the user's own files in folders named like its own, also with --force", () => {
    const mine = join(folder, 'mine-too');
    mkdirSync(join(mine, 'charts'), { recursive: true });
    writeFileSync(join(mine, 'charts/site-plan.svg'), 'mine');
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', mine, '--force']).code).toBe(0);
    expect(readFileSync(join(mine, 'charts/site-plan.svg'), 'utf8')).toBe('mine');
  });
  it('keeps the old result when a run fails, and runs again afterwards', () => {
    const kept = join(folder, 'kept');
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', kept]).code).toBe(0);
    const marks = readFileSync(join(demo, 'marks.csv'), 'utf8');
    writeFileSync(join(demo, 'marks.csv'), 'nonsense');
    const before = readFileSync(join(kept, 'results.json'), 'utf8');
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', kept]).code).toBe(2);
    expect(readFileSync(join(kept, 'results.json'), 'utf8')).toBe(before);
    writeFileSync(join(demo, 'marks.csv'), marks);
    expect(ppmwise(['run', join(demo, 'study.yaml'), '--out', kept]).code).toBe(0);
  });
  it('ends quietly when its reader closes the pipe', () => {
    const { status, stderr } = spawnSync(
      'bash',
      [
        '-c',
        `"${process.execPath}" dist/cli/main.js run "${demo}/study.yaml" --out "${out}" --json | head -1`,
      ],
      { cwd: REPOSITORY, encoding: 'utf8' },
    );
    expect(status).toBe(0);
    expect(stderr).toBe('');
  });
});

describe('check', () => {
  it('accounts for the rows and fits nothing', () => {
    const { code, out } = ppmwise(['check', join(demo, 'study.yaml')]);
    expect(code).toBe(0);
    expect(out).toMatch(/Rows: .* read = .* used \+ .* set aside/);
    expect(out).not.toContain('ppm,');
    const json = JSON.parse(ppmwise(['check', join(demo, 'study.yaml'), '--json']).out);
    expect(json.fits).toEqual([]);
    expect(json.rows.read).toBeGreaterThan(10_000);
    expect(readdirSync(demo)).not.toContain('results');
  });
});

describe('new', () => {
  const study = join(folder, 'mine');
  it('lays out a study that works as soon as logs are there', () => {
    const { code, out } = ppmwise(['new', study]);
    expect(code).toBe(0);
    expect(out).toContain('npx ppmwise check');
    const { version } = JSON.parse(readFileSync(join(REPOSITORY, 'package.json'), 'utf8'));
    expect(readdirSync(study).sort()).toEqual([
      '.jupyter',
      'README.md',
      'bases.csv',
      'demo',
      'logs',
      'marks.csv',
      'notebooks',
      'package.json',
      `ppmwise-${version}.tgz`,
      'study.schema.json',
      'study.yaml',
    ]);
    const empty = ppmwise(['run', join(study, 'study.yaml')]);
    expect(empty.code).toBe(2);
    expect(empty.err).toContain('Expected log files that match "logs/*.csv"');
    const position = '44.310886700,-18.400700010,133.7300';
    writeFileSync(
      join(study, 'logs/first.csv'),
      `time,mark,latitude,longitude,height\n2025-03-03T10:00:00Z,EXAMPLE,${position}\n`,
    );
    const checked = ppmwise(['check', join(study, 'study.yaml')]);
    expect(checked.out).toContain('Occupations: 1 formed, 1 used, on 1 day');
    expect(checked.code).toBe(0);
  });
  it('writes a schema that lists the keys of a study file for editors', () => {
    const schema = JSON.parse(readFileSync(join(study, 'study.schema.json'), 'utf8'));
    expect(Object.keys(schema.properties)).toEqual(
      expect.arrayContaining(['marks', 'bases', 'logs', 'tolerances', 'specSheet']),
    );
    expect(schema.required.sort()).toEqual(['bases', 'logs', 'marks']);
    expect(readFileSync(join(study, 'study.yaml'), 'utf8')).toContain('$schema=./study.schema.json');
  });
});
