import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { demoStudy } from '../../datasets-demo/make.js';
import { dayIndices, localDaySpan, readIndices } from '../../src/ionosphere/index.js';

const folder = join(dirname(fileURLToPath(import.meta.url)), '../../datasets-demo');
const study = demoStudy();

describe('demo study', () => {
  it('stands on disk as it is made', () => {
    for (const [path, text] of study)
      expect(readFileSync(join(folder, path), 'utf8') === text, path).toBe(true);
    const onDisk = readdirSync(folder, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && !entry.name.endsWith('.ts'))
      .map((entry) =>
        join(entry.parentPath, entry.name)
          .slice(folder.length + 1)
          .replaceAll('\\', '/'),
      );
    expect(onDisk.sort()).toEqual([...study.keys()].sort());
  });

  it('is small, and its lines end with line feeds', () => {
    const bytes = [...study.values()].reduce((sum, text) => sum + Buffer.byteLength(text), 0);
    expect(bytes).toBeLessThan(2_000_000);
    for (const text of study.values()) {
      expect(text).not.toContain('\r');
      expect(text.endsWith('\n')).toBe(true);
    }
  });

  it('has a truth that its logs bear out', () => {
    const truth = JSON.parse(study.get('truth.json')!);
    const lines = [...study]
      .filter(([path]) => path.startsWith('logs/'))
      .flatMap(([, text]) => text.trimEnd().split('\n').slice(1));
    const marks = new Set(
      study
        .get('marks.csv')!
        .split('\n')
        .slice(1)
        .map((line) => line.split(',')[0]),
    );
    const cells = lines.map((line) => line.split(','));
    const float = cells.filter((cell) => cell[8] === 'float').length;
    const unknownMark = cells.filter((cell) => !marks.has(cell[2])).length;
    const duplicate = lines.length - new Set(lines).size;
    // Known here only from the truth: in the log it looks like any other occupation.
    const { wrongMark } = truth.rows;
    expect(wrongMark).toBe(truth.settings.epochsPerOccupation);
    expect(truth.rows).toEqual({
      written: lines.length,
      float,
      unknownMark,
      wrongMark,
      duplicate,
      fixed: lines.length - float - unknownMark - wrongMark - duplicate,
    });
    for (const count of [float, unknownMark, duplicate, truth.visits.withoutFix])
      expect(count).toBeGreaterThan(0);
    expect(float / lines.length).toBeLessThan(0.08);
    expect(truth.days).toHaveLength(45);
  });

  it('holds what a season brings', () => {
    const { wrongFixes, visits, days, blunders, marks, setups } = JSON.parse(study.get('truth.json')!);
    expect(wrongFixes.length / visits.withFix).toBeGreaterThan(0.005);
    expect(wrongFixes.length / visits.withFix).toBeLessThan(0.015);
    const bad = [...days.entries()].filter(([, day]: [number, { bad: boolean }]) => day.bad).map(([k]) => k);
    expect(bad).toHaveLength(4);
    expect(bad.filter((k) => bad.includes(k + 1))).toHaveLength(1);
    expect(blunders.map(({ kind }: { kind: string }) => kind).sort()).toEqual(['rod-height', 'wrong-mark']);
    expect(marks.every(({ east }: { east: number }) => east !== 0)).toBe(true);
    // The pillar, and the tripod on each of its days.
    expect(setups).toHaveLength(1 + 9);
  });

  it('has a study file that fits its data', () => {
    const settings = parse(study.get('study.yaml')!);
    const truth = JSON.parse(study.get('truth.json')!);
    expect(Object.keys(settings)).toEqual([
      'title',
      'timeZone',
      'coordinates',
      'heights',
      'marks',
      'bases',
      'logs',
      'period',
      'occupations',
      'tolerances',
      'specSheet',
      'jobs',
      'standards',
      'indices',
      'seed',
    ]);
    expect(settings.timeZone).toBe('Etc/GMT+1');
    expect(truth.settings.utcOffsetHours).toBe(-1);
    expect(settings.period).toEqual({ from: truth.days[0].day, to: truth.days.at(-1).day });
    expect(study.has(settings.marks) && study.has(settings.bases)).toBe(true);
  });

  it('has invented activity that reads like a public file and covers the season', () => {
    const path = 'indices/activity-invented.txt';
    const text = study.get(path)!;
    expect(text.startsWith('# INVENTED')).toBe(true);
    const { rowsRead, rowsUsed, messages, indices } = readIndices(text, path);
    expect(messages).toEqual([]);
    expect(rowsUsed).toBe(rowsRead);
    const { days } = JSON.parse(study.get('truth.json')!) as { days: { day: string; bad: boolean }[] };
    const activity = dayIndices(
      days.map(({ day }) => localDaySpan(day, 'Etc/GMT+1')),
      indices,
    );
    expect(activity.every(({ knownShare }) => knownShare === 1)).toBe(true);
    const stormy = days.filter((_, k) => activity[k]!.kpMax >= 5);
    const bad = days.filter((day) => day.bad);
    // a storm on the two degraded days in a row, none on the single ones, and some on ordinary days
    expect(stormy.filter((day) => day.bad)).toHaveLength(2);
    expect(bad).toHaveLength(4);
    expect(stormy.length).toBeGreaterThan(3);
  });

  it('names every file in its README', () => {
    for (const path of study.keys()) expect(study.get('README.md')).toContain(`\`${path}\``);
  });
});
